import { expect, test } from 'vitest';
import { reminderDay } from '#shared/domain/reminders/reminder-day.ts';

const at = (instant: string, zone: string, hour = 6) =>
  reminderDay({ zone, atMs: Date.parse(instant), hour });

test('begins at the hour on the clock of the site', () => {
  expect(at('2026-06-17T04:59:59.999Z', 'Europe/Dublin')).toBeNull();
  expect(at('2026-06-17T05:00:00Z', 'Europe/Dublin')).toBe('2026-06-17');
  expect(at('2026-01-17T05:30:00Z', 'Europe/Dublin')).toBeNull();
  expect(at('2026-01-17T06:00:00Z', 'Europe/Dublin')).toBe('2026-01-17');
});

test('names the day at the site, which may be another than in UTC', () => {
  expect(at('2026-06-18T02:00:00Z', 'America/Toronto')).toBe('2026-06-17');
  expect(at('2026-06-16T21:00:00Z', 'Pacific/Auckland')).toBe('2026-06-17');
});

test('on the days on which the clocks change it is still six on the wall', () => {
  expect(at('2026-03-29T04:59:59Z', 'Europe/Dublin')).toBeNull();
  expect(at('2026-03-29T05:00:00Z', 'Europe/Dublin')).toBe('2026-03-29');
  expect(at('2026-10-25T05:59:59Z', 'Europe/Dublin')).toBeNull();
  expect(at('2026-10-25T06:00:00Z', 'Europe/Dublin')).toBe('2026-10-25');
});

test('an hour that the clock leaves out begins when it goes on, one shown twice at the first', () => {
  expect(at('2026-03-29T00:59:59Z', 'Europe/Dublin', 1)).toBeNull();
  expect(at('2026-03-29T01:00:00Z', 'Europe/Dublin', 1)).toBe('2026-03-29');
  expect(at('2026-10-25T00:00:00Z', 'Europe/Dublin', 1)).toBe('2026-10-25');
});

test('an unknown zone is refused', () => {
  expect(() => at('2026-06-17T05:00:00Z', 'Nowhere/Land')).toThrow(RangeError);
});
