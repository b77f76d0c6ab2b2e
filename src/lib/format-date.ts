import { DateTime } from 'luxon';
import { t } from '#src/texts/t.ts';

type DayFormat = {
  /** The year that needs no saying; leave out in records, where the year always stands. */
  readonly currentYear?: number | undefined;
};

type InstantFormat = DayFormat & { readonly zone: string };

function inZone(instant: string | number, zone: string): DateTime {
  return typeof instant === 'number'
    ? DateTime.fromMillis(instant, { zone, locale: 'en-GB' })
    : DateTime.fromISO(instant, { zone, locale: 'en-GB' });
}

function dayText(moment: DateTime, currentYear: number | undefined): string {
  return moment.toFormat(moment.year === currentYear ? 'ccc d LLL' : 'ccc d LLL yyyy');
}

/** A calendar day: `Wed 17 Jun`, with the year outside the current one. */
export function formatDay(day: string, { currentYear }: DayFormat = {}): string {
  return dayText(DateTime.fromISO(day, { zone: 'utc', locale: 'en-GB' }), currentYear);
}

/** An instant at the site: `Wed 17 Jun 08:30`. */
export function formatInstant(instant: string | number, format: InstantFormat): string {
  const moment = inZone(instant, format.zone);
  return t.ui.dayAndTime(dayText(moment, format.currentYear), moment.toFormat('HH:mm'));
}

/** The day at the site on which an instant falls: `Wed 17 Jun`. */
export function formatInstantDay(instant: string | number, format: InstantFormat): string {
  return dayText(inZone(instant, format.zone), format.currentYear);
}

/** The clock at the site: `08:30`. */
export function formatClock(instant: string | number, zone: string): string {
  return inZone(instant, zone).toFormat('HH:mm');
}

/** A half-open span; the day stands once where both ends share it. */
export function formatSpan(
  start: string | number,
  end: string | number,
  format: InstantFormat,
): string {
  const sameDay = inZone(start, format.zone).hasSame(inZone(end, format.zone), 'day');
  const to = sameDay ? formatClock(end, format.zone) : formatInstant(end, format);
  return t.ui.spanTo(formatInstant(start, format), to);
}

/** A due day ends at its midnight: `Wed 17 Jun 24:00`. */
export function formatDue(day: string, format: DayFormat = {}): string {
  return t.ui.dayAndTime(formatDay(day, format), '24:00');
}

/** `today`, `tomorrow`, `in 5 d`, `3 d ago`, both as calendar days at the site. */
export function formatRelativeDays(day: string, today: string): string {
  const days = Math.round(
    DateTime.fromISO(day, { zone: 'utc' }).diff(DateTime.fromISO(today, { zone: 'utc' }), 'days')
      .days,
  );
  if (days === 0) {
    return t.ui.today;
  }
  if (Math.abs(days) === 1) {
    return days === 1 ? t.ui.tomorrow : t.ui.yesterday;
  }
  return days > 0 ? t.ui.inDays(days) : t.ui.daysAgo(-days);
}

/** The year and the calendar day at the site, which the formats above want to know. */
export function siteCalendar(nowMs: number, zone: string): { today: string; currentYear: number } {
  const now = inZone(nowMs, zone);
  return { today: now.toFormat('yyyy-MM-dd'), currentYear: now.year };
}
