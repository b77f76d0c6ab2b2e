import { expect, test } from 'vitest';
import { countFolded, dayWindow, dueWindow } from '#src/features/today/day-window.view.ts';

const dublin = 'Europe/Dublin';
const at = (text: string) => ({ at: text });

test('a quiet day is drawn from six to nine in the evening, wider where a door opens outside', () => {
  const quiet = dayWindow({ day: '2026-06-16', doors: [], staffed: [] }, dublin);
  expect(quiet.startMs).toBe(Date.parse('2026-06-16T05:45:00+01:00'));
  expect(quiet.endMs).toBe(Date.parse('2026-06-16T21:15:00+01:00'));
  const doors = [
    { at: '2026-06-16T03:00:00Z', chamberTag: 'C03', what: 'load' as const },
    { at: '2026-06-16T22:59:00Z', chamberTag: 'C03', what: 'unload' as const },
  ];
  const busy = dayWindow({ day: '2026-06-16', doors, staffed: [] }, dublin);
  expect(busy.startMs).toBe(Date.parse('2026-06-16T02:45:00Z'));
  expect(busy.endMs).toBe(Date.parse('2026-06-17T00:00:00+01:00'));
});

test('a few lines that are over stay, many are folded but for the last two', () => {
  const nowMs = Date.parse('2026-06-16T12:00:00Z');
  const past = ['08', '09', '10', '11'].map((hour) => at(`2026-06-16T${hour}:00:00Z`));
  const later = at('2026-06-16T13:00:00Z');
  expect(countFolded([...past, later], nowMs)).toBe(0);
  expect(countFolded([at('2026-06-16T07:00:00Z'), ...past, later], nowMs)).toBe(3);
  expect(countFolded([], nowMs)).toBe(0);
});

test('the weeks ahead begin a little before now', () => {
  const window = dueWindow(Date.parse('2026-06-16T12:00:00Z'));
  expect(window.startMs).toBeLessThan(Date.parse('2026-06-16T12:00:00Z'));
  expect(window.endMs).toBe(Date.parse('2026-08-11T12:00:00Z'));
});
