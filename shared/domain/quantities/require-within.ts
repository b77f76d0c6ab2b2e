import { requireFinite } from './require-finite.ts';

/**
 * Refuses a value outside a closed range.
 *
 * @returns the value itself
 * @throws RangeError when the value is not finite or outside [low, high]
 * @example requireWithin(50, 'stateOfChargePct', { low: 0, high: 100 }) // 50
 */
export function requireWithin(
  value: number,
  name: string,
  range: { readonly low: number; readonly high: number },
): number {
  requireFinite(value, name);
  if (value < range.low || value > range.high) {
    throw new RangeError(`${name} must lie between ${range.low} and ${range.high}, not ${value}.`);
  }
  return value;
}
