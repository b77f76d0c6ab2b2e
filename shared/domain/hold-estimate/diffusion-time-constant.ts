import { requireNotNegative } from '#shared/domain/quantities/require-not-negative.ts';
import { requirePositive } from '#shared/domain/quantities/require-positive.ts';

/**
 * Slowest settling mode when diffusion adds a finite-length reflecting Warburg resistance R_D:
 *
 *     τ ≈ C·(R_s + R_D/3)     (exact: R_D·C/y², y·tan y = R_D/R_s; within 0.5 % at R_D = R_s/2)
 *
 * This is why "R_s" must be the long-time direct-current resistance, not the 1 kHz value.
 *
 * @returns s
 * @throws RangeError when C or R_s are not above zero or R_D is negative
 * @example
 * diffusionTimeConstant({ capacitanceF: 14000, seriesResistanceOhm: 0.1,
 *   diffusionResistanceOhm: 0.05 }) // 1633.333...
 */
export function diffusionTimeConstant(input: {
  readonly capacitanceF: number;
  readonly seriesResistanceOhm: number;
  readonly diffusionResistanceOhm: number;
}): number {
  const diffusionOhm = requireNotNegative(input.diffusionResistanceOhm, 'diffusionResistanceOhm');
  return (
    requirePositive(input.capacitanceF, 'capacitanceF') *
    (requirePositive(input.seriesResistanceOhm, 'seriesResistanceOhm') + diffusionOhm / 3)
  );
}
