import { startOfDayMs } from '#shared/domain/calendar/start-of-day-ms.ts';
import { siteDay } from '#shared/domain/calendar/site-day.ts';
import type { CalendarIndex } from '#shared/domain/calendar/types.ts';
import type { ServiceState, ValiditySpan } from '#shared/domain/facility/types.ts';
import type { CalibrationBadge } from '#shared/domain/states.ts';
import { validUntil } from './valid-until.ts';

/** A badge's word, and the instant and the due day it rests on. */
export type BadgeState = {
  readonly word: CalibrationBadge;
  /** End of validity without a gap; null when not valid now. */
  readonly validUntilMs: number | null;
  readonly dueOn: string | null;
};

/**
 * The one word a person reads beside an instrument, a channel or a range. The state of service comes
 * first (retired reads out of service), then overdue or never calibrated, then due soon, then
 * limited, then in date. Due soon means that the due day is at most `dueSoonDays` calendar days off.
 *
 * @param input.spans from `validitySpans`, in order
 * @param input.site calendar of the instrument's site
 * @param input.dueSoonDays whole days, from the site's policy
 * @example calibrationBadge({ ...facts, state: 'in-service', spans: [] }).word // 'not-calibrated'
 */
export function calibrationBadge(input: {
  readonly state: ServiceState;
  readonly spans: readonly ValiditySpan[];
  readonly nowMs: number;
  readonly site: CalendarIndex;
  readonly dueSoonDays: number;
}): BadgeState {
  const untilMs = validUntil(input.spans, input.nowMs);
  const last = input.spans.findLast((span) =>
    untilMs === null ? span.startMs <= input.nowMs : span.endMs === untilMs,
  );
  return {
    word: chooseWord(input, untilMs),
    validUntilMs: untilMs,
    dueOn: last?.dueOn ?? null,
  };
}

function chooseWord(
  input: Parameters<typeof calibrationBadge>[0],
  untilMs: number | null,
): CalibrationBadge {
  if (input.state === 'awaiting-release') {
    return 'awaiting-release';
  }
  if (input.state !== 'in-service') {
    return 'out-of-service';
  }
  if (untilMs === null) {
    return input.spans.some((span) => span.startMs <= input.nowMs) ? 'overdue' : 'not-calibrated';
  }
  const today = siteDay(input.site, input.nowMs);
  if (untilMs <= startOfDayMs(input.site, today, input.dueSoonDays + 1)) {
    return 'due-soon';
  }
  const current = input.spans.find(
    (span) => span.startMs <= input.nowMs && input.nowMs < span.endMs,
  );
  return current?.limitation === null ? 'in-date' : 'limited';
}
