import { requireNotNegative } from '#shared/domain/quantities/require-not-negative.ts';
import { requirePositive } from '#shared/domain/quantities/require-positive.ts';

/**
 * Electrical time constant of a cell held at its own voltage, by capacity:
 *
 *     τ = k·(ρ + R_ext·Q)   (C = k·Q, R_s = ρ/Q + R_ext)
 *
 * The cell's own part k·ρ does not depend on its size; leads and contacts make big cells slow.
 *
 * @param input.capacitanceFPerAh k, F/Ah
 * @param input.resistanceOhmAh ρ, Ω·Ah
 * @param input.externalResistanceOhm R_ext, Ω
 * @param input.capacityAh Q, Ah
 * @returns s
 * @throws RangeError when k, ρ or Q are not above zero or R_ext is negative
 * @example
 * timeConstant({ capacitanceFPerAh: 4000, resistanceOhmAh: 0.12, externalResistanceOhm: 0.06,
 *   capacityAh: 3.5 }) // 1320
 */
export function timeConstant(input: {
  readonly capacitanceFPerAh: number;
  readonly resistanceOhmAh: number;
  readonly externalResistanceOhm: number;
  readonly capacityAh: number;
}): number {
  const capacitanceFPerAh = requirePositive(input.capacitanceFPerAh, 'capacitanceFPerAh');
  const resistanceOhmAh = requirePositive(input.resistanceOhmAh, 'resistanceOhmAh');
  const externalOhm = requireNotNegative(input.externalResistanceOhm, 'externalResistanceOhm');
  const capacityAh = requirePositive(input.capacityAh, 'capacityAh');
  return capacitanceFPerAh * (resistanceOhmAh + externalOhm * capacityAh);
}
