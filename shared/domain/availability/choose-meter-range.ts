import { judgeMeterRange } from '#shared/domain/checks/judge-meter-range.ts';
import type { MeasuringNeeds } from '#shared/domain/checks/judge-meter-range.ts';
import type { MeterChannel, MeterRange } from '#shared/domain/facility/types.ts';

/**
 * The tightest range of a meter that is good enough and whose burden is recorded; failing that the
 * tightest that the current fits into, failing that the widest. Null for a meter without ranges.
 *
 * @example chooseMeterRange({ ranges: [] }, needs) // null
 */
export function chooseMeterRange(
  meter: Pick<MeterChannel, 'ranges'>,
  needs: MeasuringNeeds,
): MeterRange | null {
  const ordered = meter.ranges.toSorted(
    (first, second) => first.fullScaleA - second.fullScaleA || first.id - second.id,
  );
  const isKnown = (range: MeterRange): boolean =>
    range.burdenOhm !== null && range.burdenInsideLoop !== null;
  return (
    ordered.find((range) => isKnown(range) && judgeMeterRange(range, needs).outcome !== 'stop') ??
    ordered.find((range) => judgeMeterRange(range, needs).isOnScale) ??
    ordered.at(-1) ??
    null
  );
}
