/**
 * Refuses NaN and infinities at the door of the core.
 *
 * @returns the value itself
 * @throws RangeError when the value is not a finite number
 * @example requireFinite(2, 'windowS') // 2
 */
export function requireFinite(value: number, name: string): number {
  if (!Number.isFinite(value)) {
    throw new RangeError(`${name} must be a finite number, not ${value}.`);
  }
  return value;
}
