import { requireNotNegative } from '#shared/domain/quantities/require-not-negative.ts';
import { requirePositive } from '#shared/domain/quantities/require-positive.ts';
import { requireWithin } from '#shared/domain/quantities/require-within.ts';

/**
 * False current while the anode overhang equalises after the last charge or discharge:
 *
 *     i = ±(f·ΔSoC·Q·3600/τ)·e^(−t/τ),   + after a charge, − after a discharge
 *
 * Flat over a booking, so no settle test sees it: this is why cells must rest. The fraction, step and
 * time constant are engineering estimates; the effect is published (Lewerenz 2018, Hildenbrand 2023).
 *
 * @param input.overhangFraction f, 0-1
 * @param input.stateOfChargeStep ΔSoC, 0-1
 * @param input.timeConstantDays τ, days
 * @param input.restDays time since the charge or discharge, days
 * @returns A, positive into the cell
 * @throws RangeError on a value out of its range
 * @example
 * overhangCurrent({ overhangFraction: 0.03, stateOfChargeStep: 0.2, capacityAh: 5,
 *   timeConstantDays: 20, restDays: 0, lastWas: 'charge' }) // 62.5e-6
 */
export function overhangCurrent(input: {
  readonly overhangFraction: number;
  readonly stateOfChargeStep: number;
  readonly capacityAh: number;
  readonly timeConstantDays: number;
  readonly restDays: number;
  readonly lastWas: 'charge' | 'discharge';
}): number {
  const unit = { low: 0, high: 1 };
  const fraction = requireWithin(input.overhangFraction, 'overhangFraction', unit);
  const step = requireWithin(input.stateOfChargeStep, 'stateOfChargeStep', unit);
  const chargeC = fraction * step * requirePositive(input.capacityAh, 'capacityAh') * 3600;
  const timeConstantDays = requirePositive(input.timeConstantDays, 'timeConstantDays');
  const decay = Math.exp(-requireNotNegative(input.restDays, 'restDays') / timeConstantDays);
  const currentA = (chargeC / (timeConstantDays * 86_400)) * decay;
  return input.lastWas === 'charge' ? currentA : -currentA;
}
