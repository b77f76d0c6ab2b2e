import type { WorkingCalendar } from '#shared/domain/facility/types.ts';
import type { Span } from '#shared/domain/intervals/types.ts';

/** One civil day of a site: its true ends in its zone (23, 24 or 25 hours) and its working spans. */
export type CalendarDay = {
  /** `YYYY-MM-DD` in the site's zone. */
  readonly day: string;
  /** Days since 1970-01-01, counted by the site's own calendar. */
  readonly dayNumber: number;
  readonly span: Span;
  readonly working: readonly Span[];
  /** `Wed 17 Jun`. */
  readonly label: string;
  /** Minutes east of UTC at the start; null on a day on which the clock changes. */
  readonly steadyOffsetMin: number | null;
};

/**
 * A calendar with the days already worked out. The map is a cache that belongs to this object alone:
 * the same question always has the same answer, with or without it.
 */
export type CalendarIndex = {
  readonly calendar: WorkingCalendar;
  readonly days: Map<number, CalendarDay>;
};
