import { decimalsForDigits, formatNumber, thinSpace } from '#src/lib/format-number.ts';
import { formatCapacitanceF, formatQuantity } from '#src/lib/format-quantity.ts';

/** Units that take a prefix, and how they are written. */
const prefixed: Readonly<Record<string, string>> = {
  A: 'A',
  'A/Ah': 'A/Ah',
  V: 'V',
  'V/K': 'V/K',
  ohm: 'Ω',
  'ohm·Ah': 'Ω·Ah',
};

/** A figure of an estimate with three digits and its unit, the prefix chosen to read well. */
export function figureText(value: number, unit: string): string {
  const written = prefixed[unit];
  if (written !== undefined) {
    return formatQuantity(value, written);
  }
  if (unit === 'F') {
    return formatCapacitanceF(value);
  }
  const decimals = Number.isInteger(value) ? 0 : decimalsForDigits(value, 3);
  const figure = formatNumber(value, { decimals });
  return unit === '' ? figure : `${figure}${thinSpace}${unit}`;
}
