import fc from 'fast-check';
import { DateTime } from 'luxon';
import { describe, expect, it } from 'vitest';
import { buildCalendarIndex } from '#shared/domain/calendar/build-calendar-index.ts';
import { findCalendarDay } from '#shared/domain/calendar/find-calendar-day.ts';
import { findWorkingStart } from '#shared/domain/calendar/find-working-start.ts';
import { formatSiteDay } from '#shared/domain/calendar/format-site-day.ts';
import { formatSiteTime } from '#shared/domain/calendar/format-site-time.ts';
import { gridMoments } from '#shared/domain/calendar/grid-moments.ts';
import { isInWorkingHours } from '#shared/domain/calendar/is-in-working-hours.ts';
import { nextWorkingMoment } from '#shared/domain/calendar/next-working-moment.ts';
import { previousWorkingMoment } from '#shared/domain/calendar/previous-working-moment.ts';
import { roundUpToGrid } from '#shared/domain/calendar/round-up-to-grid.ts';
import { siteDay } from '#shared/domain/calendar/site-day.ts';
import { startOfDayMs } from '#shared/domain/calendar/start-of-day-ms.ts';
import { wallClockMs } from '#shared/domain/calendar/wall-clock-ms.ts';
import type { WorkingCalendar } from '#shared/domain/facility/types.ts';

const at = (iso: string): number => Date.parse(iso);
const iso = (ms: number | null): string | null => (ms === null ? null : new Date(ms).toISOString());
const weekdays = { fromMin: 480, toMin: 1080 };
const larkfen: WorkingCalendar = {
  zone: 'Europe/Dublin',
  weekly: { 1: [weekdays], 2: [weekdays], 3: [weekdays], 4: [weekdays], 5: [weekdays] },
  exceptions: [
    { day: '2026-06-01', hours: [], reason: 'June holiday' },
    { day: '2026-06-20', hours: [{ fromMin: 540, toMin: 720 }], reason: 'Saturday service' },
  ],
};
const roundTheClock = (zone: string): WorkingCalendar => ({
  zone,
  weekly: Object.fromEntries(
    [1, 2, 3, 4, 5, 6, 7].map((day) => [day, [{ fromMin: 0, toMin: 1440 }]]),
  ),
  exceptions: [],
});

describe('working hours', () => {
  const index = buildCalendarIndex(larkfen);

  it('a span inside a working day is inside; touching both ends counts', () => {
    const day = { startMs: at('2026-06-17T07:00:00Z'), endMs: at('2026-06-17T17:00:00Z') };
    expect(isInWorkingHours(index, day)).toBe(true);
    expect(isInWorkingHours(index, { ...day, startMs: day.startMs - 1 })).toBe(false);
    expect(isInWorkingHours(index, { ...day, endMs: day.endMs + 1 })).toBe(false);
  });

  it('a night between two working days is outside', () => {
    expect(
      isInWorkingHours(index, {
        startMs: at('2026-06-17T16:00:00Z'),
        endMs: at('2026-06-18T08:00:00Z'),
      }),
    ).toBe(false);
  });

  it('a holiday closes a Monday and an exception opens a Saturday', () => {
    expect(iso(nextWorkingMoment(index, at('2026-05-29T17:00:00Z')))).toBe(
      '2026-06-02T07:00:00.000Z',
    );
    expect(iso(nextWorkingMoment(index, at('2026-06-19T20:00:00Z')))).toBe(
      '2026-06-20T08:00:00.000Z',
    );
  });

  it('the next and the previous working moment of an instant in working hours are itself', () => {
    const noon = at('2026-06-17T11:00:00Z');
    expect(nextWorkingMoment(index, noon)).toBe(noon);
    expect(previousWorkingMoment(index, noon)).toBe(noon);
  });

  it('before a weekend the previous working moment is Friday evening', () => {
    expect(iso(previousWorkingMoment(index, at('2026-06-14T12:00:00Z')))).toBe(
      '2026-06-12T17:00:00.000Z',
    );
  });

  it('hours to midnight and on from midnight are one stretch', () => {
    const open = buildCalendarIndex(roundTheClock('Europe/Dublin'));
    expect(
      isInWorkingHours(open, {
        startMs: at('2026-06-17T20:00:00Z'),
        endMs: at('2026-06-19T20:00:00Z'),
      }),
    ).toBe(true);
  });

  it('a site that never works has no working moment', () => {
    const never = buildCalendarIndex({ zone: 'Europe/Dublin', weekly: {}, exceptions: [] });
    expect(nextWorkingMoment(never, 0)).toBeNull();
    expect(previousWorkingMoment(never, 0)).toBeNull();
    expect(findWorkingStart(never, { fromMs: 0, lengthMs: 900_000, untilMs: 1e12 })).toBeNull();
  });

  it('work that does not fit before closing starts the next morning', () => {
    expect(
      iso(
        findWorkingStart(index, {
          fromMs: at('2026-06-17T16:40:00Z'),
          lengthMs: 1_800_000,
          untilMs: at('2026-06-30T00:00:00Z'),
        }),
      ),
    ).toBe('2026-06-18T07:00:00.000Z');
  });

  it('a zone or hours that make no sense are refused with a sentence', () => {
    expect(() => buildCalendarIndex({ ...larkfen, zone: 'Larkfen' })).toThrow(/no time zone/);
    expect(() =>
      buildCalendarIndex({ ...larkfen, weekly: { 1: [{ fromMin: 600, toMin: 600 }] } }),
    ).toThrow(/end after they start/);
    expect(() => startOfDayMs(index, '17 June')).toThrow(/YYYY-MM-DD/);
    expect(() => findCalendarDay(index, Number.NaN)).toThrow(/finite/);
  });
});

describe('clock changes', () => {
  it('Dublin in October: Monday 08:00 is one hour later in UTC than the Friday before', () => {
    const index = buildCalendarIndex(larkfen);
    expect(iso(nextWorkingMoment(index, at('2026-10-23T06:00:00Z')))).toBe(
      '2026-10-23T07:00:00.000Z',
    );
    expect(iso(nextWorkingMoment(index, at('2026-10-25T06:00:00Z')))).toBe(
      '2026-10-26T08:00:00.000Z',
    );
  });

  it('Dublin: the day of the change has 25 hours in October and 23 in March', () => {
    const index = buildCalendarIndex(roundTheClock('Europe/Dublin'));
    const hours = (instant: string): number => {
      const { span } = findCalendarDay(index, at(instant));
      return (span.endMs - span.startMs) / 3_600_000;
    };
    expect(hours('2026-10-25T12:00:00Z')).toBe(25);
    expect(hours('2026-03-29T12:00:00Z')).toBe(23);
    expect(hours('2026-03-30T12:00:00Z')).toBe(24);
  });

  it('Dublin in October: 01:30 is shown twice; opening takes the first, closing the last', () => {
    const twice = { zone: 'Europe/Dublin', day: '2026-10-25', minute: 90 };
    expect(iso(wallClockMs({ ...twice, edge: 'opening' }))).toBe('2026-10-25T00:30:00.000Z');
    expect(iso(wallClockMs({ ...twice, edge: 'closing' }))).toBe('2026-10-25T01:30:00.000Z');
  });

  it('Dublin in March: 01:30 is never shown and 02:00 takes its place', () => {
    expect(
      iso(wallClockMs({ zone: 'Europe/Dublin', day: '2026-03-29', minute: 90, edge: 'opening' })),
    ).toBe('2026-03-29T01:00:00.000Z');
  });

  it('Toronto: 08:00 is 13:00 UTC before the second Sunday of March and 12:00 after', () => {
    const index = buildCalendarIndex({ ...larkfen, zone: 'America/Toronto', exceptions: [] });
    expect(iso(nextWorkingMoment(index, at('2026-03-06T06:00:00Z')))).toBe(
      '2026-03-06T13:00:00.000Z',
    );
    expect(iso(nextWorkingMoment(index, at('2026-03-08T06:00:00Z')))).toBe(
      '2026-03-09T12:00:00.000Z',
    );
  });

  it('times are written by the clock of the site, also in the repeated hour', () => {
    const dublin = buildCalendarIndex(larkfen);
    expect(formatSiteTime(dublin, at('2026-06-17T07:30:00Z'))).toBe('Wed 17 Jun 08:30');
    expect(formatSiteTime(dublin, at('2026-10-25T00:30:00Z'))).toBe('Sun 25 Oct 01:30');
    expect(formatSiteTime(dublin, at('2026-10-25T01:30:00Z'))).toBe('Sun 25 Oct 01:30');
    expect(formatSiteDay('2026-06-17')).toBe('17 Jun 2026');
    const toronto = buildCalendarIndex({ ...larkfen, zone: 'America/Toronto' });
    expect(formatSiteTime(toronto, at('2026-06-17T03:30:00Z'))).toBe('Tue 16 Jun 23:30');
  });

  it('a due date ends at midnight of the site, not of UTC', () => {
    const toronto = buildCalendarIndex({ ...larkfen, zone: 'America/Toronto' });
    expect(iso(startOfDayMs(toronto, '2026-03-08', 1))).toBe('2026-03-09T04:00:00.000Z');
    expect(iso(startOfDayMs(toronto, '2026-03-07', 1))).toBe('2026-03-08T05:00:00.000Z');
  });

  it('the day of any instant is the day luxon says, in both zones', () => {
    fc.assert(
      fc.property(
        fc.constantFrom('Europe/Dublin', 'America/Toronto', 'Pacific/Chatham', 'Asia/Kolkata'),
        fc.integer({ min: at('2024-01-01T00:00:00Z'), max: at('2028-01-01T00:00:00Z') }),
        (zone, instant) => {
          const index = buildCalendarIndex(roundTheClock(zone));
          const shown = DateTime.fromMillis(instant, { zone, locale: 'en-GB' });
          expect(siteDay(index, instant)).toBe(shown.toFormat('yyyy-MM-dd'));
          expect(formatSiteTime(index, instant)).toBe(shown.toFormat('ccc d LLL HH:mm'));
        },
      ),
      { numRuns: 200 },
    );
  });
});

describe('the grid', () => {
  it('rounds up to quarter hours of UTC and leaves quarter hours alone', () => {
    expect(roundUpToGrid(0)).toBe(0);
    expect(roundUpToGrid(1)).toBe(900_000);
    expect(roundUpToGrid(900_000)).toBe(900_000);
  });

  it('lists the quarter hours of a half-open span', () => {
    expect([...gridMoments({ startMs: 1, endMs: 1_800_001 })]).toEqual([900_000, 1_800_000]);
    expect([...gridMoments({ startMs: 0, endMs: 900_000 })]).toEqual([0]);
  });

  it('the next working moment is working and nothing before it is', () => {
    const index = buildCalendarIndex(larkfen);
    fc.assert(
      fc.property(
        fc.integer({ min: at('2026-03-01T00:00:00Z'), max: at('2026-11-30T00:00:00Z') }),
        (instant) => {
          const foundMs = nextWorkingMoment(index, instant) ?? Number.NaN;
          expect(isInWorkingHours(index, { startMs: foundMs, endMs: foundMs + 1 })).toBe(true);
          for (const moment of gridMoments({ startMs: instant, endMs: foundMs })) {
            expect(isInWorkingHours(index, { startMs: moment, endMs: moment + 1 })).toBe(false);
          }
        },
      ),
      { numRuns: 100 },
    );
  });
});
