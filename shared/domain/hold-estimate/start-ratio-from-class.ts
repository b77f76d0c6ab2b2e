import { requirePositive } from '#shared/domain/quantities/require-positive.ts';
import type { RatioPosterior } from './types.ts';

/**
 * What a new cell type starts from: its class's posterior with the weight of at most four runs
 * (κ ≤ 4, a ≤ 4, b scaled to keep b/a).
 *
 * @throws RangeError when a parameter is not above zero
 * @example
 * startRatioFromClass({ mean: 0.2, kappa: 40, shape: 20, rate: 2, runCount: 38 })
 * // { mean: 0.2, kappa: 4, shape: 4, rate: 0.4, runCount: 0 }
 */
export function startRatioFromClass(classPosterior: RatioPosterior): RatioPosterior {
  const shape = requirePositive(classPosterior.shape, 'shape');
  const startShape = Math.min(4, shape);
  return {
    mean: classPosterior.mean,
    kappa: Math.min(4, requirePositive(classPosterior.kappa, 'kappa')),
    shape: startShape,
    rate: (requirePositive(classPosterior.rate, 'rate') * startShape) / shape,
    runCount: 0,
  };
}
