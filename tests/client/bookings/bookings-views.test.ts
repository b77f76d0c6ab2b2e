import { expect, test } from 'vitest';
import type { CheckResultDto } from '#shared/contracts/check.schemas.ts';
import { slipLines, sortChecks, stopReason } from '#src/features/bookings/check-lines.view.ts';
import { listQuery } from '#src/features/bookings/list-filters.view.ts';
import { dayWindow, staffedText } from '#src/features/today/day-window.view.ts';

function check(
  code: CheckResultDto['code'],
  outcome: CheckResultDto['outcome'],
  liftedByDeviationId: number | null = null,
): CheckResultDto {
  return {
    code,
    outcome,
    sentence: `${code} says so.`,
    evidence: [],
    waysOut: [],
    used: null,
    liftedByDeviationId,
  };
}
const checks = [
  check('double-use', 'pass'),
  check('rest-time', 'caution'),
  check('path-connects', 'pass'),
  check('mapping', 'stop'),
];

test('a slip tells stops, then cautions, then counts what passes', () => {
  expect(sortChecks(checks).map(({ outcome }) => outcome)).toEqual([
    'stop',
    'caution',
    'pass',
    'pass',
  ]);
  expect(slipLines(checks).map(({ key }) => key)).toEqual(['mapping', 'rest-time', 'passes']);
});

test('a rule that a deviation lifts stops nothing', () => {
  expect(stopReason(checks)).toBe('1 rule stops it');
  expect(stopReason([check('mapping', 'stop', 4)])).toBeUndefined();
});

test('the list asks for what still takes a place, and for days at the site', () => {
  const filters = {
    state: 'live',
    from: '2026-03-29',
    to: '',
    tag: ' c03 ',
    atRisk: '',
    mine: 'true',
    sort: 'start',
  } as const;
  // On this day the clock goes forward in Dublin; its midnight is still at 00:00 UTC.
  expect(listQuery(filters, 'Europe/Dublin')).toEqual({
    sort: 'start',
    state: 'tentative,confirmed,running',
    from: '2026-03-29T00:00:00.000Z',
    tag: 'C03',
    mine: 'true',
  });
  expect(listQuery({ ...filters, state: 'all', from: '', mine: '' }, 'Europe/Dublin')).toEqual({
    sort: 'start',
    tag: 'C03',
  });
});

test('the day is drawn from 6 to 21, wider where a door opens earlier', () => {
  const day = { day: '2026-03-02', doors: [], staffed: [] };
  const usual = dayWindow(day, 'Europe/Dublin');
  expect(new Date(usual.startMs).toISOString()).toBe('2026-03-02T05:45:00.000Z');
  const early = dayWindow(
    { ...day, doors: [{ at: '2026-03-02T04:00:00Z', chamberTag: 'C03', what: 'load' }] },
    'Europe/Dublin',
  );
  expect(new Date(early.startMs).toISOString()).toBe('2026-03-02T03:45:00.000Z');
  expect(staffedText([{ startAt: 'a', endAt: 'b' }], (at) => at.toUpperCase(), 'to')).toBe(
    'A to B',
  );
});
