import { expect } from 'vitest';

/** Asserts agreement to a number of significant digits (half a unit of the last one). */
export function expectDigits(actual: number, expected: number, digits = 6): void {
  const scale = 10 ** (Math.floor(Math.log10(Math.abs(expected))) - digits + 1);
  expect(Math.abs(actual - expected), `${actual} against ${expected}`).toBeLessThanOrEqual(
    scale * 0.5 * 1.0001,
  );
}
