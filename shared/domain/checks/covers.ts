import { validUntil } from '#shared/domain/calibration-validity/valid-until.ts';
import type { ValiditySpan } from '#shared/domain/facility/types.ts';
import type { Span } from '#shared/domain/intervals/types.ts';

/**
 * Is something validly calibrated over a whole span, without a gap?
 *
 * @param validity in order, not overlapping
 * @example covers([], { startMs: 0, endMs: 1 }) // false
 */
export function covers(validity: readonly ValiditySpan[], span: Span): boolean {
  const untilMs = validUntil(validity, span.startMs);
  return untilMs !== null && untilMs >= span.endMs;
}
