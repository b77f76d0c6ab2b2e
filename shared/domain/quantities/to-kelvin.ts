import { requireFinite } from './require-finite.ts';

/** Zero degrees Celsius in kelvin (exact by definition of the Celsius scale). */
export const zeroCelsiusK = 273.15;

/**
 * Converts a Celsius temperature to kelvin: T = t + 273.15.
 *
 * @throws RangeError when not finite or below absolute zero
 * @example toKelvin(25) // 298.15
 */
export function toKelvin(temperatureC: number): number {
  const temperatureK = requireFinite(temperatureC, 'temperatureC') + zeroCelsiusK;
  if (temperatureK <= 0) {
    throw new RangeError(`${temperatureC} °C lies below absolute zero; check the temperature.`);
  }
  return temperatureK;
}
