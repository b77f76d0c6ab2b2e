import { startOfDayMs } from '#shared/domain/calendar/start-of-day-ms.ts';
import type { CalendarIndex } from '#shared/domain/calendar/types.ts';
import type { ValiditySpan } from '#shared/domain/facility/types.ts';
import { subtractSpans } from '#shared/domain/intervals/subtract-spans.ts';
import type { ApprovedCalibration, CalibrationScope, ValidityBreak, ValidityKey } from './types.ts';

type Entry = { readonly record: ApprovedCalibration; readonly scope: CalibrationScope };

/**
 * The one place where calibration validity is worked out: when a channel × function × range is
 * validly calibrated, and why each stretch ends.
 *
 * A calibration counts from the start of the day it was performed until the start of the day after
 * it is due (an approved extension moves that day), both at the instrument's site. The next
 * calibration of the same thing takes over on its own day, whatever it found: left not conforming,
 * nothing is valid from that day on. One that another corrects does not count at all. Where nothing
 * was stated about conformity the stretch is limited. Unavailable times are cut out.
 *
 * @param input.site calendar of the instrument's site
 * @param input.calibrations approved records, in any order
 * @returns stretches in order, not overlapping; `dueOn` is null where something else ends one
 * @throws RangeError when a day is not a calendar day
 * @example
 * validitySpans({ site, key, calibrations: [performed on 2026-01-10, due on 2027-01-09], breaks: [] })
 * // one span, 2026-01-10 00:00 to 2027-01-10 00:00 at the site
 */
export function validitySpans(input: {
  readonly site: CalendarIndex;
  readonly key: ValidityKey;
  readonly calibrations: readonly ApprovedCalibration[];
  readonly breaks: readonly ValidityBreak[];
}): readonly ValiditySpan[] {
  const entries = entriesFor(input.key, input.calibrations);
  const breaks = input.breaks
    .filter((gap) => gap.channelId === null || gap.channelId === input.key.channelId)
    .map((gap) => ({ startMs: gap.startMs, endMs: gap.endMs ?? Number.MAX_SAFE_INTEGER }));
  return entries.flatMap(({ record, scope }, position) => {
    if (scope.conformityAsLeft === 'does-not-conform') {
      return [];
    }
    const dueOn = record.extendedDueOn ?? record.dueOn;
    const startMs = startOfDayMs(input.site, record.performedOn);
    const dueMs = startOfDayMs(input.site, dueOn, 1);
    const next = entries[position + 1];
    const nextMs = next === undefined ? dueMs : startOfDayMs(input.site, next.record.performedOn);
    return subtractSpans({ startMs, endMs: Math.min(dueMs, nextMs) }, breaks).map((span) => ({
      ...span,
      calibrationId: record.id,
      dueOn: span.endMs === dueMs ? dueOn : null,
      limitation: scope.limitation ?? unstated(scope),
    }));
  });
}

function entriesFor(key: ValidityKey, records: readonly ApprovedCalibration[]): readonly Entry[] {
  const replaced = new Set(records.map((record) => record.replacesId));
  const entries = records
    .filter((record) => !replaced.has(record.id))
    .flatMap((record) => record.scopes.map((scope) => ({ record, scope })))
    .filter(
      ({ scope }) =>
        scope.channelId === key.channelId &&
        scope.function === key.function &&
        scope.rangeId === key.rangeId,
    );
  return entries.toSorted(
    (first, second) =>
      first.record.performedOn.localeCompare(second.record.performedOn) ||
      first.record.approvedAtMs - second.record.approvedAtMs ||
      first.record.id - second.record.id,
  );
}

function unstated(scope: CalibrationScope): string | null {
  return scope.conformityAsLeft === 'not-stated' ? 'no statement of conformity was made' : null;
}
