import { expect, test } from 'vitest';
import { remarkOn } from '#server/features/offers/offer-remark.ts';
import { buildCalendarIndex } from '#shared/domain/calendar/build-calendar-index.ts';
import type { PhaseSpan } from '#shared/domain/facility/types.ts';
import { officeHours } from '#tests/support/build-facility.ts';

const calendar = buildCalendarIndex(officeHours);

function remark(
  holdFrom: string,
  holdTo: string,
  change: Partial<Parameters<typeof remarkOn>[0]> = {},
) {
  const hold: PhaseSpan = {
    phase: 'hold',
    startMs: Date.parse(holdFrom),
    endMs: Date.parse(holdTo),
    setTemperatureC: 25,
  };
  const offer = { joinsLoadId: null, phases: [hold], waitS: 0, endMs: hold.endMs, ...change };
  return (neededByMs: number | null) => remarkOn(offer, calendar, neededByMs);
}

test('a slot inside one working day has nothing particular about it', () => {
  expect(remark('2026-06-17T09:00:00Z', '2026-06-17T15:00:00Z')(null)).toBe('');
});

test('evenings, nights and closed days in the hold are named', () => {
  expect(remark('2026-06-17T14:00:00Z', '2026-06-17T20:00:00Z')(null)).toBe(
    'Settles after working hours.',
  );
  expect(remark('2026-06-17T14:00:00Z', '2026-06-18T06:00:00Z')(null)).toBe('Settles overnight.');
  expect(remark('2026-06-16T14:00:00Z', '2026-06-18T06:00:00Z')(null)).toBe(
    'Settles over 2 nights.',
  );
  expect(remark('2026-06-19T14:00:00Z', '2026-06-22T06:00:00Z')(null)).toBe(
    'Settles over days on which nobody works.',
  );
});

test('the load it joins, a long wait and the needed date are told in this order', () => {
  const say = remark('2026-06-17T09:00:00Z', '2026-06-17T15:00:00Z', {
    joinsLoadId: 14,
    waitS: 7200,
    endMs: Date.parse('2026-06-17T16:00:00Z'),
  });
  expect(say(Date.parse('2026-06-17T18:30:00Z'))).toBe(
    'Joins load 14. Waits 2 h 00 min for the door before it is unloaded. Ends 2 h 30 min before it is needed.',
  );
  expect(say(Date.parse('2026-06-14T15:00:00Z'))).toMatch(/Ends 3 days after it is needed\.$/);
});
