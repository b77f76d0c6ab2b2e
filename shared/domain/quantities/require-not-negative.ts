import { requireFinite } from './require-finite.ts';

/**
 * Refuses a negative value where only zero or more has a meaning (noise, a duration).
 *
 * @returns the value itself
 * @throws RangeError when the value is not finite or below zero
 * @example requireNotNegative(0, 'leadResistanceOhm') // 0
 */
export function requireNotNegative(value: number, name: string): number {
  if (requireFinite(value, name) < 0) {
    throw new RangeError(`${name} must not be negative, not ${value}.`);
  }
  return value;
}
