import type { Grade } from '#shared/domain/availability/types.ts';
import type { FacilityPolicy } from '#shared/domain/facility/types.ts';
import type { ForecastVerdict } from '#shared/domain/thermal-error/types.ts';
import type { CheckOutcome } from './types.ts';

/**
 * The one place where the three-valued forecast becomes a check's outcome. Where the log cannot
 * tell, indicative work is warned and reported work follows the site's policy.
 *
 * @example judgeForecast('cannot-tell', 'reported', { logCannotTell: 'stop' }) // 'stop'
 */
export function judgeForecast(
  verdict: ForecastVerdict,
  grade: Grade,
  policy: Pick<FacilityPolicy, 'logCannotTell'>,
): CheckOutcome {
  switch (verdict) {
    case 'ok':
      return 'pass';
    case 'disturbed':
      return 'stop';
    case 'cannot-tell':
      return grade === 'indicative' ? 'caution' : policy.logCannotTell;
  }
}
