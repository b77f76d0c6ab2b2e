import { requireFinite } from '#shared/domain/quantities/require-finite.ts';
import { toKelvin } from '#shared/domain/quantities/to-kelvin.ts';

/** Molar gas constant, J/(mol·K), exact since the 2019 revision of the SI. */
export const molarGasConstantJPerMolK = 8.31446261815324;

/** Activation energy of the leakage current, J/mol (Theiler 2021, Batteries 7(2) 22: about 60 kJ/mol). */
export const leakageActivationEnergyJPerMol = 60_000;

/**
 * How much larger the leakage is at a temperature than at a reference temperature:
 *
 *     factor = exp(Ea/R·(1/T_ref − 1/T))
 *
 * @param input.activationEnergyJPerMol Ea, J/mol
 * @throws RangeError on a non-finite input or a temperature below absolute zero
 * @example
 * arrheniusFactor({ temperatureC: 25, referenceC: 25, activationEnergyJPerMol: 60_000 }) // 1
 */
export function arrheniusFactor(input: {
  readonly temperatureC: number;
  readonly referenceC: number;
  readonly activationEnergyJPerMol: number;
}): number {
  const energy = requireFinite(input.activationEnergyJPerMol, 'activationEnergyJPerMol');
  const inverseK = 1 / toKelvin(input.referenceC) - 1 / toKelvin(input.temperatureC);
  return Math.exp((energy / molarGasConstantJPerMolK) * inverseK);
}
