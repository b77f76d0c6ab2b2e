import { DateTime } from 'luxon';
import { timeScale, type TimeWindow } from './tide-line.view.ts';

export type DayHour = { readonly x: number; readonly text: string };

/** Whole hours of the site's clock inside the window, every hour or fewer where it is narrow. */
export function dayHours(window: TimeWindow, zone: string, width: number): readonly DayHour[] {
  const x = timeScale(window, width);
  const hours = (window.endMs - window.startMs) / 3_600_000;
  const step = [1, 2, 3, 6].find((each) => (width / hours) * each >= 34) ?? 6;
  const first = DateTime.fromMillis(window.startMs, { zone }).startOf('hour');
  return Array.from({ length: Math.ceil(hours) + 1 }, (_, index) => first.plus({ hours: index }))
    .filter((hour) => hour.toMillis() >= window.startMs && hour.toMillis() < window.endMs)
    .filter((hour) => hour.hour % step === 0)
    .map((hour) => ({ x: x(hour.toMillis()), text: hour.toFormat('HH') }));
}

export type DoorEvent = { readonly atMs: number; readonly label: string };
export type PlacedDoor = {
  readonly x: number;
  readonly label: string;
  readonly side: 'left' | 'right' | 'none';
};

const letter = 5.9;

/**
 * Door uprights with their words left or right of them, or none where neither side is free;
 * `reserved` spans are already written on.
 */
export function placeDoors(
  doors: readonly DoorEvent[],
  window: TimeWindow,
  width: number,
  reserved: readonly (readonly [number, number])[] = [],
): readonly PlacedDoor[] {
  const x = timeScale(window, width);
  const taken: (readonly [number, number])[] = [...reserved];
  const uprights = doors.map((door) => x(door.atMs));
  const isFree = (from: number, to: number) =>
    from >= 0 &&
    to <= width &&
    taken.every(([start, end]) => to < start || from > end) &&
    uprights.every((upright) => upright < from || upright > to);
  return doors.map((door, index) => {
    const at = uprights[index] ?? 0;
    const length = door.label.length * letter;
    const sides = [
      { side: 'left' as const, from: at - 12 - length, to: at - 4 },
      { side: 'right' as const, from: at + 4, to: at + 12 + length },
    ];
    const free = sides.find(({ from, to }) => isFree(from, to));
    if (free !== undefined) {
      taken.push([free.from, free.to]);
    }
    return { x: at, label: door.label, side: free?.side ?? 'none' };
  });
}
