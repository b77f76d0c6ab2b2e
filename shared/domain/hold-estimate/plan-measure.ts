import type { CellModel } from './build-cell-model.ts';
import { noiseShare } from './estimate-assumptions.ts';
import { measuringLength } from './measuring-length.ts';
import { readingDeviation } from './reading-deviation.ts';
import type { EstimateInput } from './types.ts';

export type MeasurePlan = {
  readonly measureS: number;
  /** What the noise rule alone asks for, s. */
  readonly noiseRuleS: number;
  readonly singleReadingSdA: number;
  /** Standard deviation of the window mean, A. */
  readonly readingSdA: number;
  readonly targetA: number;
};

/**
 * Length of the measuring window: the longer of the site's minimum and the noise rule with a quarter
 * of the allowance as target, and the deviation of the window mean over it.
 *
 * @throws RangeError on figures out of their range
 * @example planMeasure(input, model).measureS // 3600 where a quiet meter leaves the minimum
 */
export function planMeasure(input: EstimateInput, model: CellModel): MeasurePlan {
  const { wiring } = input;
  const singleReadingSdA = Math.hypot(wiring.meterNoiseA, wiring.meterResolutionA / Math.sqrt(12));
  const targetA = model.allowanceA * noiseShare;
  const noiseRuleS = measuringLength({
    readingSdA: singleReadingSdA,
    targetA,
    sampleIntervalS: wiring.sampleIntervalS,
    lagOneCorrelation: 0,
  });
  const measureS = Math.max(input.process.minimumMeasureMin * 60, noiseRuleS);
  const readingSdA = readingDeviation({
    noiseA: wiring.meterNoiseA,
    resolutionA: wiring.meterResolutionA,
    sampleIntervalS: wiring.sampleIntervalS,
    windowS: measureS,
  });
  return { measureS, noiseRuleS, singleReadingSdA, readingSdA, targetA };
}
