/**
 * A temperature to the millikelvin at most, without trailing zeros.
 *
 * @param temperatureC °C
 * @example formatTemperature(45) // '45 °C'
 */
export function formatTemperature(temperatureC: number): string {
  return `${Number(temperatureC.toFixed(3))} °C`;
}
