import { expect, test } from 'vitest';
import { daysUntil } from '#shared/domain/reminders/days-until.ts';

test('counts calendar days, also over a change of the clocks and a leap day', () => {
  expect(daysUntil('2026-03-28', '2026-03-30')).toBe(2);
  expect(daysUntil('2028-02-28', '2028-03-01')).toBe(2);
  expect(daysUntil('2026-12-31', '2027-01-01')).toBe(1);
});

test('is nothing on the day itself and negative after it', () => {
  expect(daysUntil('2026-03-20', '2026-03-20')).toBe(0);
  expect(daysUntil('2026-03-20', '2026-03-11')).toBe(-9);
});
