import { requirePositive } from '#shared/domain/quantities/require-positive.ts';
import { predictRatio } from './predict-ratio.ts';
import type { RatioPosterior } from './types.ts';
import { updateRatioPosterior } from './update-ratio-posterior.ts';

export type LearnedRatio = {
  readonly posterior: RatioPosterior;
  /** The run lay further than four scales from the expected ratio and was pulled in to that. */
  readonly wasWinsorised: boolean;
  readonly usedRatio: number;
};

const forgetting = 0.98;
const leastShape = 1.5;
const winsorScales = 4;

/**
 * Learns from one more run, with slow forgetting so that the estimate can follow a change:
 * κ, a and b × 0.98 before the update (a not below 1.5), and a ratio further than four predictive
 * scales from the expected one counts as four scales (told in the result, so that it can be logged).
 *
 * @param posterior what was believed before the run
 * @param ratio observed settle time / model time, > 0
 * @throws RangeError when the ratio or a parameter is not above zero
 * @example learnRatio(ratioPrior, 100).wasWinsorised // true
 */
export function learnRatio(posterior: RatioPosterior, ratio: number): LearnedRatio {
  const y = Math.log(requirePositive(ratio, 'ratio'));
  const { scale } = predictRatio(posterior, 0.5);
  const reach = winsorScales * scale;
  const usedY = Math.min(Math.max(y, posterior.mean - reach), posterior.mean + reach);
  const faded: RatioPosterior = {
    ...posterior,
    kappa: posterior.kappa * forgetting,
    shape: Math.max(leastShape, posterior.shape * forgetting),
    rate: posterior.rate * forgetting,
  };
  return {
    posterior: updateRatioPosterior(faded, [Math.exp(usedY)]),
    wasWinsorised: usedY !== y,
    usedRatio: Math.exp(usedY),
  };
}
