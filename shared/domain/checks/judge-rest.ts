import type { MeasurementKind } from '#shared/domain/hold-estimate/types.ts';
import type { CheckOutcome } from './types.ts';

const hourMs = 3_600_000;
const dayMs = 24 * hourMs;

/**
 * Was the rest since the last charge or discharge long enough? Settled: under 24 h stop, under
 * 30 days caution. Screening: under 7 days caution. Not stated: caution. The thresholds are an
 * inference from published overhang and relaxation times (Lewerenz 2018, Hildenbrand 2023).
 *
 * @param restMs ms; null = not stated
 * @example judgeRest('settled', 3_600_000) // 'stop'
 */
export function judgeRest(kind: MeasurementKind, restMs: number | null): CheckOutcome {
  if (restMs === null) {
    return 'caution';
  }
  if (kind === 'screening') {
    return restMs < 7 * dayMs ? 'caution' : 'pass';
  }
  return restMs < dayMs ? 'stop' : restMs < 30 * dayMs ? 'caution' : 'pass';
}
