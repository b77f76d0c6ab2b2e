import { requirePositive } from '#shared/domain/quantities/require-positive.ts';
import { soakToleranceK } from './estimate-assumptions.ts';
import { settlingCurrent } from './settling-current.ts';
import { thermalLagCurrent } from './thermal-lag-current.ts';
import type { EstimateNumbers, HoldRange, SettlingCurve, SettlingPoint } from './types.ts';

/**
 * The settling current ready to draw: for a positive and a negative start mismatch, each with the
 * thermal lag of the soak pushing the same way, so that the slower curve comes inside the band
 * exactly at the model's hold.
 *
 * @param input.numbers the estimate's numbers
 * @param input.hold the estimate's hold
 * @param input.pointCount points along the curve, at least 2 (default 121)
 * @throws RangeError when fewer than 2 points are asked or a figure has no meaning
 * @example settlingCurve({ numbers, hold }).points.length // 121
 */
export function settlingCurve(input: {
  readonly numbers: EstimateNumbers;
  readonly hold: HoldRange;
  readonly pointCount?: number;
}): SettlingCurve {
  const { numbers, hold, pointCount = 121 } = input;
  if (!Number.isInteger(pointCount) || pointCount < 2) {
    throw new RangeError(`A curve needs at least 2 points, not ${pointCount}.`);
  }
  requirePositive(numbers.timeConstantS, 'timeConstantS');
  const endS = Math.max(hold.safeS * 1.1, numbers.timeConstantS);
  const pointAt = (timeS: number): SettlingPoint => {
    const current = (sign: 1 | -1): number =>
      settlingCurrent({
        steadyCurrentA: numbers.expectedCurrentA,
        startMismatchV: sign * numbers.startMismatchV,
        seriesResistanceOhm: numbers.seriesResistanceOhm,
        timeConstantS: numbers.timeConstantS,
        timeS,
      });
    const lagA = Math.abs(
      thermalLagCurrent({
        capacitanceF: numbers.capacitanceF,
        entropicCoefficientVPerK: numbers.entropicCoefficientVPerK,
        lagK: soakToleranceK,
        timeS,
        thermalTimeConstantS: numbers.thermalTimeConstantS,
        timeConstantS: numbers.timeConstantS,
      }),
    );
    return { timeS, positiveA: current(1) + lagA, negativeA: current(-1) - lagA };
  };
  return {
    points: Array.from({ length: pointCount }, (_, index) =>
      pointAt((endS * index) / (pointCount - 1)),
    ),
    steadyCurrentA: numbers.expectedCurrentA,
    bandLowA: numbers.expectedCurrentA - numbers.allowanceA,
    bandHighA: numbers.expectedCurrentA + numbers.allowanceA,
    likelyS: hold.likelyS,
    safeS: hold.safeS,
  };
}
