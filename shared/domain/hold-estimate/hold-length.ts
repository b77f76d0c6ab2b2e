import { requireFinite } from '#shared/domain/quantities/require-finite.ts';
import { requireNotNegative } from '#shared/domain/quantities/require-not-negative.ts';
import { requirePositive } from '#shared/domain/quantities/require-positive.ts';
import { twoPoleKernel } from '#shared/domain/thermal-error/two-pole-kernel.ts';

export type HoldLengthInput = {
  /** |dV0/R_s − I| at the match, A. */
  readonly startResidualA: number;
  readonly capacitanceF: number;
  readonly entropicCoefficientVPerK: number;
  /** Temperature difference left by the soak, K. */
  readonly lagK: number;
  readonly thermalTimeConstantS: number;
  readonly timeConstantS: number;
  readonly toleranceA: number;
};

/** Time of the highest point of E·e^(−t/b) + A·(e^(−t/a) − e^(−t/b))/(a − b); 0 when it only falls. */
function peakTime(electricalA: number, thermalAs: number, a: number, b: number): number {
  if (thermalAs <= electricalA * a) {
    return 0;
  }
  const difference = a - b;
  if (Math.abs(difference) < 1e-6 * a) {
    return a - (electricalA * a ** 2) / thermalAs;
  }
  const logarithm =
    Math.log1p(difference / b) + Math.log1p((-electricalA * difference) / thermalAs);
  return Math.max(0, (logarithm * a * b) / difference);
}

/**
 * Length of the hold: the smallest time from which voltage mismatch and the thermal lag left by the
 * soak together stay inside the tolerance:
 *
 *     E·e^(−t/τ_e) + C·|α|·|D_c|·|e^(−t/τ_th) − e^(−t/τ_e)|/|τ_th − τ_e| ≤ tol   for all later t
 *
 * The sum of two exponentials has at most one maximum and then falls, so after that maximum (known in
 * closed form) the crossing is found by bisection. Signs are taken as adding up.
 *
 * @returns s; 0 when it never leaves the tolerance
 * @throws RangeError on a non-finite or negative input, or C, a time constant or the tolerance not
 *   above zero
 * @example
 * holdLength({ startResidualA: 1.05e-5, capacitanceF: 14000, entropicCoefficientVPerK: 0, lagK: 0.1,
 *   thermalTimeConstantS: 645, timeConstantS: 1320, toleranceA: 1.05e-6 }) // 3039.4 (τ·ln 10)
 */
export function holdLength(input: HoldLengthInput): number {
  const electricalA = requireNotNegative(input.startResidualA, 'startResidualA');
  const toleranceA = requirePositive(input.toleranceA, 'toleranceA');
  const thermalS = requirePositive(input.thermalTimeConstantS, 'thermalTimeConstantS');
  const electricalS = requirePositive(input.timeConstantS, 'timeConstantS');
  const thermalAs = Math.abs(
    requirePositive(input.capacitanceF, 'capacitanceF') *
      requireFinite(input.entropicCoefficientVPerK, 'entropicCoefficientVPerK') *
      requireFinite(input.lagK, 'lagK'),
  );
  const residualA = (timeS: number): number =>
    electricalA * Math.exp(-timeS / electricalS) +
    thermalAs * twoPoleKernel({ timeS, firstS: thermalS, secondS: electricalS });
  const peakS = peakTime(electricalA, thermalAs, thermalS, electricalS);
  if (residualA(peakS) <= toleranceA) {
    return 0;
  }
  let insideS = peakS + thermalS + electricalS;
  while (residualA(insideS) > toleranceA) {
    insideS *= 2;
  }
  let outsideS = peakS;
  for (let round = 0; round < 200 && insideS - outsideS > 1e-9 * insideS; round += 1) {
    const middleS = (insideS + outsideS) / 2;
    if (residualA(middleS) > toleranceA) {
      outsideS = middleS;
    } else {
      insideS = middleS;
    }
  }
  return insideS;
}
