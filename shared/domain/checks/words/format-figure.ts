/**
 * A figure with at most three significant digits and no trailing zeros, for a sentence.
 *
 * @example formatFigure(1.9004) // '1.9'
 */
export function formatFigure(value: number): string {
  const magnitude = Math.abs(value);
  return magnitude >= 1000 ? String(Math.round(value)) : String(Number(value.toPrecision(3)));
}
