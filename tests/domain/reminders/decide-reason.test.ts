import fc from 'fast-check';
import { DateTime } from 'luxon';
import { describe, expect, test } from 'vitest';
import { decideReason } from '#shared/domain/reminders/decide-reason.ts';

const leadDays = [30, 14, 7, 1];
const dueOn = '2026-03-20';
const shift = (days: number) =>
  DateTime.fromISO(dueOn, { zone: 'utc' }).plus({ days }).toISODate() ?? '';
/** The reason `days` after the due day; negative is before. */
const reasonOn = (days: number, sent: readonly string[] = [], leads = leadDays) =>
  decideReason({ dueOn, today: shift(days), leadDays: leads, sent });

describe('on the very days', () => {
  test.each([
    [-31, null],
    [-30, 'lead-30'],
    [-14, 'lead-14'],
    [-7, 'lead-7'],
    [-1, 'lead-1'],
    [0, 'due'],
    [7, 'overdue-1'],
    [14, 'overdue-2'],
    [364, 'overdue-52'],
  ])('%d days after the due day it is %s', (days, reason) => {
    expect(reasonOn(days)).toBe(reason);
  });
});

describe('between them only the nearest reason counts', () => {
  test.each([
    [-29, 'lead-30'],
    [-15, 'lead-30'],
    [-13, 'lead-14'],
    [-10, 'lead-14'],
    [-6, 'lead-7'],
    [-2, 'lead-7'],
    [1, 'due'],
    [6, 'due'],
    [13, 'overdue-1'],
  ])('%d days after the due day it is %s', (days, reason) => {
    expect(reasonOn(days)).toBe(reason);
  });

  test('after two months of silence it is one reminder, not six', () => {
    expect(reasonOn(31, ['lead-30'])).toBe('overdue-4');
    expect(reasonOn(31, ['lead-30', 'overdue-4'])).toBeNull();
  });
});

test('a reason that was sent is not given again, whatever else was sent', () => {
  expect(reasonOn(-7, ['lead-7'])).toBeNull();
  expect(reasonOn(-5, ['lead-7', 'lead-14'])).toBeNull();
  expect(reasonOn(-7, ['lead-14'])).toBe('lead-7');
});

test('lead times come from the site, in any order', () => {
  expect(reasonOn(-4, [], [2, 90, 5])).toBe('lead-5');
  expect(reasonOn(-60, [], [2, 90, 5])).toBe('lead-90');
  expect(reasonOn(-1, [], [])).toBeNull();
  expect(reasonOn(0, [], [])).toBe('due');
});

test('a text that is no calendar day is refused', () => {
  for (const bad of ['2026-02-30', '20260320', '2026-03-20T00:00Z', '']) {
    expect(() => decideReason({ dueOn: bad, today: dueOn, leadDays, sent: [] })).toThrow(
      RangeError,
    );
    expect(() => decideReason({ dueOn, today: bad, leadDays, sent: [] })).toThrow(RangeError);
  }
});

test('a day by day sweep gives each reason exactly once, and one with gaps none twice', () => {
  fc.assert(
    fc.property(
      fc.uniqueArray(fc.integer({ min: 1, max: 60 }), { maxLength: 6 }),
      fc.uniqueArray(fc.integer({ min: -70, max: 40 }), { maxLength: 100 }),
      (leads, skipped) => {
        const everyDay = sweep(leads, []);
        const weeks = ['due', 'overdue-1', 'overdue-2', 'overdue-3', 'overdue-4', 'overdue-5'];
        const expected = [...leads].sort((a, b) => b - a).map((lead) => `lead-${lead}`);
        expect(everyDay).toEqual([...expected, ...weeks]);

        const withGaps = sweep(leads, skipped);
        expect(new Set(withGaps).size).toBe(withGaps.length);
        expect(everyDay.filter((reason) => withGaps.includes(reason))).toEqual(withGaps);
      },
    ),
    { numRuns: 60 },
  );
});

function sweep(leads: readonly number[], skipped: readonly number[]): string[] {
  const sent: string[] = [];
  for (let days = -70; days <= 40; days += 1) {
    const reason = skipped.includes(days) ? null : reasonOn(days, sent, [...leads]);
    if (reason !== null) {
      sent.push(reason);
    }
  }
  return sent;
}
