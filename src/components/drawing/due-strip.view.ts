import { DateTime } from 'luxon';
import { timeScale, type TimeWindow } from './tide-line.view.ts';

export type StripSpan = { readonly x: number; readonly width: number };

/** The part of a span that lies in the window, in pixels; `undefined` where none does. */
export function cutSpan(
  span: TimeWindow,
  window: TimeWindow,
  width: number,
): StripSpan | undefined {
  const x = timeScale(window, width);
  const from = Math.max(0, x(span.startMs));
  const to = Math.min(width, x(span.endMs));
  return to > from ? { x: from, width: to - from } : undefined;
}

export type WeekTick = { readonly x: number; readonly text: string };

/** The beginnings of weeks at the site inside the window: `15 Jun`. */
export function weekTicks(window: TimeWindow, zone: string, width: number): readonly WeekTick[] {
  const x = timeScale(window, width);
  const first = DateTime.fromMillis(window.startMs, { zone, locale: 'en-GB' }).startOf('week');
  const weeks = Math.ceil((window.endMs - window.startMs) / (7 * 86_400_000)) + 1;
  return Array.from({ length: weeks }, (_, index) => first.plus({ weeks: index }))
    .map((week) => ({ x: x(week.toMillis()), text: week.toFormat('d LLL') }))
    .filter((tick) => tick.x >= 0 && tick.x < width - 4);
}
