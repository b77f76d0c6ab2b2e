import normalCdf from '@stdlib/stats-base-dists-normal-cdf';
import { requirePositive } from '#shared/domain/quantities/require-positive.ts';
import { predictRatio } from './predict-ratio.ts';
import type { RatioPosterior } from './types.ts';

/** One point of the grid over mean and standard deviation of ln(ratio), with its weight. */
type GridPoint = { readonly mu: number; readonly sigma: number; readonly weight: number };

const muSteps = 61;
const sigmaSteps = 41;

function chanceOfLasting(logs: readonly number[], mu: number, sigma: number): number {
  return logs.reduce((product, y) => product * (1 - normalCdf(y, mu, sigma)), 1);
}

/**
 * The grid: mu = mean + u·sigma/√κ with u from −6 to 12 (unsettled runs push upwards), and ln sigma
 * five standard deviations around its centre. In these variables the posterior's weight is
 * exp(−u²/2)·sigma^(−2a)·exp(−b/sigma²).
 */
function buildGrid(posterior: RatioPosterior, logs: readonly number[]): readonly GridPoint[] {
  const { mean, kappa, shape, rate } = posterior;
  const centre = Math.log(rate / shape) / 2;
  const reach = 5 * (0.5 / Math.sqrt(Math.max(0.5, shape - 0.5)));
  const points: GridPoint[] = [];
  for (let row = 0; row < sigmaSteps; row += 1) {
    const sigma = Math.exp(centre + reach * ((2 * row) / (sigmaSteps - 1) - 1));
    const logWeight = shape - 2 * shape * (Math.log(sigma) - centre) - rate / sigma ** 2;
    for (let column = 0; column < muSteps; column += 1) {
      const u = -6 + (18 * column) / (muSteps - 1);
      const mu = mean + (u * sigma) / Math.sqrt(kappa);
      const weight = Math.exp(logWeight - u ** 2 / 2) * chanceOfLasting(logs, mu, sigma);
      points.push({ mu, sigma, weight });
    }
  }
  return points;
}

function findQuantile(grid: readonly GridPoint[], probability: number): number {
  const total = grid.reduce((sum, point) => sum + point.weight, 0);
  requirePositive(total, 'weight of the unsettled runs');
  const heavy = grid.filter((point) => point.weight > 1e-9 * total);
  let low = Math.min(...heavy.map((point) => point.mu - 9 * point.sigma));
  let high = Math.max(...heavy.map((point) => point.mu + 9 * point.sigma));
  for (let round = 0; round < 48; round += 1) {
    const middle = (low + high) / 2;
    const below = heavy.reduce(
      (sum, point) => sum + point.weight * normalCdf(middle, point.mu, point.sigma),
      0,
    );
    [low, high] = below < probability * total ? [middle, high] : [low, middle];
  }
  return (low + high) / 2;
}

/**
 * Takes runs that ended before they settled into what has been learned. Dropping them, or counting
 * them as settled, would both make the estimate too short. The exact posterior is integrated on a
 * 61 × 41 grid with the weight Π[1 − Φ((ln c − μ)/σ)]; its median and 90 % point are then carried by
 * a posterior of the usual form, so that every later estimate stays fast.
 *
 * Assumes that a run was ended for a reason unrelated to how its current looked; runs stopped because
 * they looked nearly done, or bad, do not belong here.
 *
 * @param posterior learned from the settled runs
 * @param endedRatios time at which each unsettled run ended / model time, each > 0
 * @throws RangeError when a ratio or a parameter is not above zero
 * @example foldUnsettledRuns(ratioPrior, []) // the posterior itself
 */
export function foldUnsettledRuns(
  posterior: RatioPosterior,
  endedRatios: readonly number[],
): RatioPosterior {
  const logs = endedRatios.map((ratio) => Math.log(requirePositive(ratio, 'ended ratio')));
  if (logs.length === 0) {
    return posterior;
  }
  const { quantile } = predictRatio(posterior, 0.9);
  const grid = buildGrid(posterior, logs);
  const median = findQuantile(grid, 0.5);
  const scale = (findQuantile(grid, 0.9) - median) / quantile;
  const { kappa, shape } = posterior;
  return {
    mean: median,
    kappa,
    shape,
    rate: (scale ** 2 * shape * kappa) / (kappa + 1),
    runCount: posterior.runCount + logs.length,
  };
}
