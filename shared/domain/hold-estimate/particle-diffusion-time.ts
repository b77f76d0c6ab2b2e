import { requirePositive } from '#shared/domain/quantities/require-positive.ts';

/**
 * Slowest relaxation of a spherical particle with fixed surface concentration: r²/(π²·D).
 *
 * @param input.radiusM particle radius, m
 * @param input.diffusivityM2PerS solid diffusivity, m²/s
 * @returns s
 * @throws RangeError when an input is not above zero
 * @example particleDiffusionTime({ radiusM: 5.22e-6, diffusivityM2PerS: 4e-15 }) // 690.210035
 */
export function particleDiffusionTime(input: {
  readonly radiusM: number;
  readonly diffusivityM2PerS: number;
}): number {
  return (
    requirePositive(input.radiusM, 'radiusM') ** 2 /
    (Math.PI ** 2 * requirePositive(input.diffusivityM2PerS, 'diffusivityM2PerS'))
  );
}
