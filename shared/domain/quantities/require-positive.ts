import { requireFinite } from './require-finite.ts';

/**
 * Refuses a quantity that has no meaning at or below zero (capacity, resistance, a time constant).
 *
 * @returns the value itself
 * @throws RangeError when the value is not finite or not above zero
 * @example requirePositive(3.5, 'capacityAh') // 3.5
 */
export function requirePositive(value: number, name: string): number {
  if (requireFinite(value, name) <= 0) {
    throw new RangeError(`${name} must be greater than zero, not ${value}.`);
  }
  return value;
}
