import { DateTime } from 'luxon';
import type { Today } from '#shared/contracts/board.contract.ts';

export type Window = { readonly startMs: number; readonly endMs: number };

const firstHour = 6;
const lastHour = 21;
const hourMs = 3_600_000;

/** The part of the day that is drawn: 6 to 21, wider where something happens outside. */
export function dayWindow(today: Pick<Today, 'day' | 'doors' | 'staffed'>, zone: string): Window {
  const day = DateTime.fromISO(today.day, { zone });
  const moments = [
    ...today.doors.map(({ at }) => Date.parse(at)),
    ...today.staffed.flatMap(({ startAt, endAt }) => [Date.parse(startAt), Date.parse(endAt)]),
  ];
  const start = day.set({ hour: firstHour }).toMillis();
  const end = day.set({ hour: lastHour }).toMillis();
  return {
    startMs: Math.max(day.startOf('day').toMillis(), Math.min(start, ...moments) - hourMs / 4),
    endMs: Math.min(
      day.plus({ days: 1 }).startOf('day').toMillis(),
      Math.max(end, ...moments) + hourMs / 4,
    ),
  };
}

const pastKept = 2;
const mostUnfolded = 4;

/** How many of the day's first lines are over and folded away, once they are more than a few. */
export function countFolded(
  happenings: readonly Pick<Today['happenings'][number], 'at'>[],
  nowMs: number,
): number {
  const past = happenings.filter(({ at }) => Date.parse(at) < nowMs).length;
  return past > mostUnfolded ? past - pastKept : 0;
}

/** `08:00 to 18:00`, or several such spans. */
export function staffedText(
  staffed: Today['staffed'],
  clock: (at: string) => string,
  to: string,
): string {
  return staffed.map((span) => `${clock(span.startAt)} ${to} ${clock(span.endAt)}`).join(', ');
}

const weekMs = 7 * 24 * hourMs;

/** The weeks a due strip shows, from a little before now. */
export function dueWindow(nowMs: number, weeks = 8): Window {
  return { startMs: nowMs - weekMs / 4, endMs: nowMs + weeks * weekMs };
}
