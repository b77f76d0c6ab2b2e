import type { SlotRequest } from '#shared/domain/availability/types.ts';
import type { SlotEstimate } from '#shared/domain/hold-estimate/types.ts';
import { estimateNumbers } from './estimate-numbers.ts';
import type { MeasuringNeeds } from './judge-meter-range.ts';

/**
 * What every path of a request must be able to measure; null where the estimate names no current. A
 * settled value needs room for one and a half times the expected current (common practice), a
 * screening for a bad cell.
 *
 * @example measuringNeeds(request, estimate)?.largestCurrentA // 1.5 × expected for a settled value
 */
export function measuringNeeds(
  request: Pick<SlotRequest, 'kind' | 'screening'>,
  estimate: SlotEstimate,
): MeasuringNeeds | null {
  const numbers = estimateNumbers(estimate);
  if (numbers === null) {
    return null;
  }
  const room = request.kind === 'screening' ? Math.max(1.5, request.screening.badToGoodRatio) : 1.5;
  return {
    expectedCurrentA: numbers.expectedCurrentA,
    largestCurrentA: room * Math.abs(numbers.expectedCurrentA),
    allowanceA: numbers.allowanceA,
    capacitanceF: numbers.capacitanceF,
  };
}
