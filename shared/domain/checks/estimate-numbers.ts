import type { EstimateNumbers, SlotEstimate } from '#shared/domain/hold-estimate/types.ts';

/**
 * The physical numbers of an estimate; null where it could not name any.
 *
 * @example estimateNumbers(rangeEstimate) // null
 */
export function estimateNumbers(estimate: SlotEstimate): EstimateNumbers | null {
  return estimate.outcome === 'range' || estimate.outcome === 'unknown' ? null : estimate.numbers;
}
