import { DateTime } from 'luxon';

export const boardViews = ['day', 'week', 'fortnight'] as const;
export type BoardView = (typeof boardViews)[number];

export type BoardSpan = {
  readonly view: BoardView;
  /** First calendar day at the site, `YYYY-MM-DD`. */
  readonly firstDay: string;
  readonly dayCount: number;
  readonly startMs: number;
  readonly endMs: number;
  /** Length of one column of the ruling. */
  readonly slotHours: number;
  /** Every how many hours a time is written. */
  readonly labelHours: number;
};

const shapes = {
  day: { dayCount: 1, slotHours: 1, labelHours: 2 },
  week: { dayCount: 7, slotHours: 6, labelHours: 6 },
  fortnight: { dayCount: 14, slotHours: 12, labelHours: 12 },
} as const satisfies Record<BoardView, object>;

/** The window that shows a day: the day itself, or the week or fortnight from its Monday. */
export function boardSpan(view: BoardView, day: string, zone: string): BoardSpan {
  const asked = DateTime.fromISO(day, { zone });
  const moment = asked.isValid ? asked : DateTime.fromMillis(0, { zone });
  const first = view === 'day' ? moment.startOf('day') : moment.startOf('week');
  const shape = shapes[view];
  return {
    view,
    ...shape,
    firstDay: first.toFormat('yyyy-MM-dd'),
    startMs: first.toMillis(),
    endMs: first.plus({ days: shape.dayCount }).toMillis(),
  };
}

export function shiftDay(span: BoardSpan, direction: 1 | -1, zone: string): string {
  return DateTime.fromISO(span.firstDay, { zone })
    .plus({ days: direction * span.dayCount })
    .toFormat('yyyy-MM-dd');
}

/** `15 to 21 June 2026`, `29 June to 5 July 2026`, or the one day. */
export function spanTitle(span: BoardSpan, to: string): string {
  const first = DateTime.fromISO(span.firstDay, { zone: 'utc', locale: 'en-GB' });
  const last = first.plus({ days: span.dayCount - 1 });
  if (span.dayCount === 1) {
    return first.toFormat('cccc d LLLL yyyy');
  }
  const firstText =
    first.month === last.month
      ? first.toFormat('d')
      : first.toFormat(first.year === last.year ? 'd LLLL' : 'd LLLL yyyy');
  return `${firstText} ${to} ${last.toFormat('d LLLL yyyy')}`;
}

/**
 * Milliseconds on the board's wall clock. The time axis is ruled in wall time, so a day of 23 or 25
 * hours is drawn as wide as any other and positions are computed here, not from real durations.
 */
export function wallClockMs(instantMs: number, zone: string): number {
  return DateTime.fromMillis(instantMs, { zone })
    .setZone('utc', { keepLocalTime: true })
    .toMillis();
}
