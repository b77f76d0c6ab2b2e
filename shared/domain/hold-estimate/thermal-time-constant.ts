import { requirePositive } from '#shared/domain/quantities/require-positive.ts';
import { requireNotNegative } from '#shared/domain/quantities/require-not-negative.ts';

/** Shape of a cell for the conduction inside it. */
export type BodyShape = 'plate' | 'cylinder';

export type ThermalTimeConstant = {
  /** With the correction for conduction inside the cell, s. */
  readonly timeConstantS: number;
  /** m·c_p/(h·A), s. */
  readonly lumpedS: number;
  readonly biot: number;
  /** 1 + Bi/3 for a plate, 1 + Bi/4 for a cylinder. */
  readonly correction: number;
};

/**
 * Thermal time constant of a cell in moving air, corrected for conduction inside it:
 *
 *     τ_th = m·c_p/(h·A)·f,   Bi = h·L/k,   f = 1 + Bi/3 (plate), 1 + Bi/4 (cylinder)
 *
 * L is half the thickness of a plate or the radius of a cylinder. Against the exact slowest mode the
 * correction is within 0.5 % for Bi ≤ 0.5 (derived here).
 *
 * @param input.massKg m, kg
 * @param input.heatCapacityJPerKgK c_p, J/(kg·K)
 * @param input.filmCoefficientWPerM2K h, W/(m²·K)
 * @param input.surfaceM2 A, m²
 * @param input.characteristicLengthM L, m; 0 for a lumped body
 * @param input.conductivityWPerMK k, W/(m·K)
 * @throws RangeError when an input is not above zero (L may be zero)
 * @example
 * thermalTimeConstant({ massKg: 0.069, heatCapacityJPerKgK: 1000, filmCoefficientWPerM2K: 20,
 *   surfaceM2: 0.00535, characteristicLengthM: 0, conductivityWPerMK: 1, shape: 'cylinder' }).lumpedS // 644.859813
 */
export function thermalTimeConstant(input: {
  readonly massKg: number;
  readonly heatCapacityJPerKgK: number;
  readonly filmCoefficientWPerM2K: number;
  readonly surfaceM2: number;
  readonly characteristicLengthM: number;
  readonly conductivityWPerMK: number;
  readonly shape: BodyShape;
}): ThermalTimeConstant {
  const filmWPerM2K = requirePositive(input.filmCoefficientWPerM2K, 'filmCoefficientWPerM2K');
  const lumpedS =
    (requirePositive(input.massKg, 'massKg') *
      requirePositive(input.heatCapacityJPerKgK, 'heatCapacityJPerKgK')) /
    (filmWPerM2K * requirePositive(input.surfaceM2, 'surfaceM2'));
  const biot =
    (filmWPerM2K * requireNotNegative(input.characteristicLengthM, 'characteristicLengthM')) /
    requirePositive(input.conductivityWPerMK, 'conductivityWPerMK');
  const correction = 1 + biot / (input.shape === 'plate' ? 3 : 4);
  return { timeConstantS: lumpedS * correction, lumpedS, biot, correction };
}
