import { describe, expect, test } from 'vitest';
import { foldUnsettledRuns } from '#shared/domain/hold-estimate/fold-unsettled-runs.ts';
import { predictRatio } from '#shared/domain/hold-estimate/predict-ratio.ts';
import { ratioPrior } from '#shared/domain/hold-estimate/ratio-prior.ts';
import { updateRatioPosterior } from '#shared/domain/hold-estimate/update-ratio-posterior.ts';

const learned = updateRatioPosterior(ratioPrior, [1.3, 1.55, 1.1, 1.42, 1.25]);

/** Small seeded generator (mulberry32), so that the sampling check is the same every time. */
function buildUniform(seed: number): () => number {
  let state = seed;
  return () => {
    state = (state + 0x6d2b79f5) | 0;
    let mixed = Math.imul(state ^ (state >>> 15), 1 | state);
    mixed = (mixed + Math.imul(mixed ^ (mixed >>> 7), 61 | mixed)) ^ mixed;
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 2 ** 32;
  };
}

describe('runs that ended unsettled (derived here)', () => {
  test('none of them changes nothing', () => {
    expect(foldUnsettledRuns(learned, [])).toBe(learned);
  });

  test('a run ended far too early teaches nothing: the grid agrees with Student-t', () => {
    const folded = foldUnsettledRuns(learned, [1e-6]);
    for (const probability of [0.5, 0.9]) {
      expect(predictRatio(folded, probability).factor).toBeCloseTo(
        predictRatio(learned, probability).factor,
        3,
      );
    }
    expect(folded.runCount).toBe(6);
  });

  test('a run ended late lengthens median and safe ratio, the later the more', () => {
    const factors = [0.5, 1.5, 3].map(
      (ended) => predictRatio(foldUnsettledRuns(learned, [ended]), 0.9).factor,
    );
    const [early = NaN, middle = NaN, late = NaN] = factors;
    expect(early).toBeGreaterThanOrEqual(predictRatio(learned, 0.9).factor * 0.999);
    expect(middle).toBeGreaterThan(early);
    expect(late).toBeGreaterThan(middle);
  });

  test('median and 90 % point agree with weighted sampling', () => {
    const uniform = buildUniform(7);
    const normal = (): number =>
      Math.sqrt(-2 * Math.log(1 - uniform())) * Math.cos(2 * Math.PI * uniform());
    // shape 4.5 is half of nine squared normals, so 1/sigma² needs no gamma generator; the run
    // itself is drawn too and kept when it lasts longer than the time it was ended at.
    const ended = Math.log(1.6);
    const kept: number[] = [];
    for (let draw = 0; draw < 200_000; draw += 1) {
      const chiSquared = Array.from({ length: 9 }, normal).reduce((sum, z) => sum + z * z, 0);
      const sigma = Math.sqrt((2 * learned.rate) / chiSquared);
      const mu = learned.mean + (normal() * sigma) / Math.sqrt(learned.kappa);
      if (mu + normal() * sigma > ended) {
        kept.push(mu + normal() * sigma);
      }
    }
    kept.sort((first, second) => first - second);
    const folded = foldUnsettledRuns(learned, [1.6]);
    for (const probability of [0.5, 0.9]) {
      const sampled = Math.exp(kept[Math.floor(probability * kept.length)] ?? NaN);
      expect(Math.abs(predictRatio(folded, probability).factor / sampled - 1)).toBeLessThan(0.012);
    }
  });

  test('a ratio of zero is refused', () => {
    expect(() => foldUnsettledRuns(learned, [0])).toThrow(RangeError);
  });
});
