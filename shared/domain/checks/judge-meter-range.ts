import type { MeterRange } from '#shared/domain/facility/types.ts';
import type { CheckOutcome } from './types.ts';

/** What a path must be able to measure. */
export type MeasuringNeeds = {
  readonly expectedCurrentA: number;
  /** The largest current that must stay on scale. */
  readonly largestCurrentA: number;
  readonly allowanceA: number;
  readonly capacitanceF: number;
};

export type RangeJudgement = {
  readonly outcome: CheckOutcome;
  readonly isOnScale: boolean;
  readonly errorA: number;
  readonly used: number;
};

/**
 * Can a meter range take the current and tell it well enough?
 *
 *     error = ppm of reading·I + ppm of range·full scale
 *     used = max(error, 2·resolution) / allowance
 *
 * Stop where the largest current is off scale or more than the allowance is used; caution above half
 * of it. Derived here.
 *
 * @example judgeMeterRange(range, { expectedCurrentA: 1e-5, largestCurrentA: 1.5e-5, allowanceA: 1e-6, capacitanceF: 14000 }).outcome
 */
export function judgeMeterRange(range: MeterRange, needs: MeasuringNeeds): RangeJudgement {
  const errorA =
    1e-6 *
    (range.accuracyPpmReading * Math.abs(needs.expectedCurrentA) +
      range.accuracyPpmRange * range.fullScaleA);
  const used = Math.max(errorA, 2 * range.resolutionA) / needs.allowanceA;
  const isOnScale = range.fullScaleA >= needs.largestCurrentA;
  const outcome = !isOnScale || used > 1 ? 'stop' : used > 0.5 ? 'caution' : 'pass';
  return { outcome, isOnScale, errorA, used };
}
