import studentQuantile from '@stdlib/stats-base-dists-t-quantile';
import { requireFinite } from '#shared/domain/quantities/require-finite.ts';
import { requirePositive } from '#shared/domain/quantities/require-positive.ts';
import type { RatioPosterior } from './types.ts';

export type RatioPrediction = {
  /** Factor that is long enough with the wanted probability. */
  readonly factor: number;
  /** Scale of the predictive Student-t, in ln(ratio). */
  readonly scale: number;
  readonly degreesOfFreedom: number;
  readonly quantile: number;
};

/**
 * Factor by which the model's hold must be multiplied so that it is long enough with a probability:
 *
 *     y ~ Student-t(2a; m, √(b·(κ + 1)/(a·κ)));   factor = exp(m + t(p, 2a)·scale)
 *
 * @param posterior prior or what runs have taught
 * @param probability p, 0 < p < 1
 * @throws RangeError on a parameter not above zero or a probability out of range
 * @example predictRatio(ratioPrior, 0.9).factor // 1.94234847
 */
export function predictRatio(posterior: RatioPosterior, probability: number): RatioPrediction {
  const kappa = requirePositive(posterior.kappa, 'kappa');
  const shape = requirePositive(posterior.shape, 'shape');
  const rate = requirePositive(posterior.rate, 'rate');
  const mean = requireFinite(posterior.mean, 'mean');
  if (!(probability > 0 && probability < 1)) {
    throw new RangeError(`A probability must lie between 0 and 1, not ${probability}.`);
  }
  const degreesOfFreedom = 2 * shape;
  const scale = Math.sqrt((rate * (kappa + 1)) / (shape * kappa));
  const quantile = probability === 0.5 ? 0 : studentQuantile(probability, degreesOfFreedom);
  return { factor: Math.exp(mean + quantile * scale), scale, degreesOfFreedom, quantile };
}
