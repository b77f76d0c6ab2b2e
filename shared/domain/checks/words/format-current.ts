import { formatFigure } from './format-figure.ts';

/**
 * A current in the unit people use for its size, three significant digits.
 *
 * @param currentA A
 * @example formatCurrent(1.9e-6) // '1.9 µA'
 */
export function formatCurrent(currentA: number): string {
  const magnitude = Math.abs(currentA);
  if (magnitude >= 1e-3) {
    return `${formatFigure(currentA * 1e3)} mA`;
  }
  if (magnitude >= 1e-7 || magnitude === 0) {
    return `${formatFigure(currentA * 1e6)} µA`;
  }
  return magnitude >= 1e-10
    ? `${formatFigure(currentA * 1e9)} nA`
    : `${formatFigure(currentA * 1e12)} pA`;
}
