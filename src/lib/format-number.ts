/** Narrow no-break space: the thin space that never lets a figure part from its unit. */
export const thinSpace = '\u202f';
export const minus = '\u2212';

type NumberFormat = {
  readonly decimals: number;
  /** `true`: a plus is written before a positive figure, as for errors. */
  readonly signed?: boolean | undefined;
};

function groupDigits(whole: string): string {
  return whole.length < 5 ? whole : whole.replace(/\B(?=(\d{3})+$)/g, thinSpace);
}

/** True minus, digits in threes from 10 000 on, a fixed number of decimals. */
export function formatNumber(value: number, { decimals, signed }: NumberFormat): string {
  const [whole = '0', fraction] = Math.abs(value).toFixed(decimals).split('.');
  const figure = fraction === undefined ? groupDigits(whole) : `${groupDigits(whole)}.${fraction}`;
  const isZero = !/[1-9]/.test(figure);
  if (isZero) {
    return figure;
  }
  if (value < 0) {
    return `${minus}${figure}`;
  }
  return signed ? `+${figure}` : figure;
}

/** How many decimals show `significant` digits of the value. */
export function decimalsForDigits(value: number, significant: number): number {
  if (value === 0) {
    return 0;
  }
  const [, exponent = '0'] = Math.abs(value)
    .toExponential(significant - 1)
    .split('e');
  return Math.max(0, significant - 1 - Number(exponent));
}

/** Decimals follow the uncertainty: two digits of U, the value to match. */
export function decimalsForUncertainty(uncertainty: number): number {
  return decimalsForDigits(uncertainty, 2);
}

/**
 * Reads a typed figure: comma or point as the decimal mark, spaces between digits, a true minus.
 * `undefined` where it is not one number (`1,234.5` could be two things and is refused).
 */
export function parseFigure(text: string): number | undefined {
  const plain = text
    .trim()
    .replace(/[\s\u2009\u202f\u00a0]/g, '')
    .replace(minus, '-')
    .replace(',', '.');
  return /^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i.test(plain) ? Number(plain) : undefined;
}
