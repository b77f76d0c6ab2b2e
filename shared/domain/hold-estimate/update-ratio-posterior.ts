import { requirePositive } from '#shared/domain/quantities/require-positive.ts';
import type { RatioPosterior } from './types.ts';

/**
 * Learns from observed ratios (observed settle time / model time), y = ln(ratio), by the conjugate
 * normal-inverse-gamma update:
 *
 *     κn = κ + n;  mn = (κ·m + n·ȳ)/κn;  an = a + n/2;  bn = b + ½Σ(y − ȳ)² + κ·n·(ȳ − m)²/(2κn)
 *
 * Formulas: K. Murphy 2007, "Conjugate Bayesian analysis of the Gaussian distribution".
 *
 * @param prior what was believed before
 * @param ratios observed / model, each > 0; none leaves the prior as it is
 * @throws RangeError when a ratio or a parameter is not above zero
 * @example updateRatioPosterior(ratioPrior, [1.3, 1.55, 1.1, 1.42, 1.25]).mean // 0.195675685
 */
export function updateRatioPosterior(
  prior: RatioPosterior,
  ratios: readonly number[],
): RatioPosterior {
  requirePositive(prior.kappa, 'kappa');
  requirePositive(prior.shape, 'shape');
  requirePositive(prior.rate, 'rate');
  const logs = ratios.map((ratio) => Math.log(requirePositive(ratio, 'ratio')));
  const count = logs.length;
  if (count === 0) {
    return prior;
  }
  const average = logs.reduce((sum, y) => sum + y, 0) / count;
  const scatter = logs.reduce((sum, y) => sum + (y - average) ** 2, 0);
  const kappa = prior.kappa + count;
  return {
    kappa,
    mean: (prior.kappa * prior.mean + count * average) / kappa,
    shape: prior.shape + count / 2,
    rate:
      prior.rate + scatter / 2 + (prior.kappa * count * (average - prior.mean) ** 2) / (2 * kappa),
    runCount: prior.runCount + count,
  };
}
