import type { FacilityPolicy } from '#shared/domain/facility/types.ts';
import type { SitePolicy } from './site-policy.ts';

const secondsPerHour = 3600;

/**
 * The part of a site's policy that checks and search decide on, in their units: the percentile as a
 * fraction, the longest hold in seconds.
 *
 * @example
 * facilityPolicyOf(sitePolicyFrom([])).safePercentile; // 0.9
 */
export function facilityPolicyOf(policy: SitePolicy): FacilityPolicy {
  return {
    safePercentile: policy.safePercentile / 100,
    maxHoldS: policy.maxHoldHours * secondsPerHour,
    stabilityMaxAgeDays: policy.stabilityMaxAgeDays,
    stabilityTemperatureWindowK: policy.stabilityTemperatureWindowK,
    logCannotTell: policy.logCannotTellOutcome,
    matchAttended: policy.matchAttended,
    connectFixedMin: policy.connectFixedMin,
    connectPerCellMin: policy.connectPerCellMin,
    unloadFixedMin: policy.unloadFixedMin,
    unloadPerCellMin: policy.unloadPerCellMin,
    matchMin: policy.matchMin,
    minimumMeasureMin: policy.minimumMeasureMin,
    horizonDays: policy.horizonDays,
    referenceLeadResistanceOhm: policy.referenceLeadResistanceOhm,
  };
}
