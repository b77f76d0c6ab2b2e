import { requireFinite } from '#shared/domain/quantities/require-finite.ts';
import { toKelvin } from '#shared/domain/quantities/to-kelvin.ts';
import { molarGasConstantJPerMolK } from './arrhenius-factor.ts';

/**
 * Relative change of the leakage by kelvin at a temperature: Ea/(R·T²), 1/K.
 *
 * @throws RangeError on a non-finite input or a temperature below absolute zero
 * @example arrheniusSensitivity({ temperatureC: 25, activationEnergyJPerMol: 60_000 }) // 0.0811796992
 */
export function arrheniusSensitivity(input: {
  readonly temperatureC: number;
  readonly activationEnergyJPerMol: number;
}): number {
  const energy = requireFinite(input.activationEnergyJPerMol, 'activationEnergyJPerMol');
  return energy / (molarGasConstantJPerMolK * toKelvin(input.temperatureC) ** 2);
}
