import {
  decimalsForDigits,
  decimalsForUncertainty,
  formatNumber,
  thinSpace,
} from './format-number.ts';

export type Figure = { readonly figure: string; readonly unit: string };

const prefixes = [
  { symbol: 'p', factor: 1e-12 },
  { symbol: 'n', factor: 1e-9 },
  { symbol: 'µ', factor: 1e-6 },
  { symbol: 'm', factor: 1e-3 },
  { symbol: '', factor: 1 },
  { symbol: 'k', factor: 1e3 },
  { symbol: 'M', factor: 1e6 },
  { symbol: 'G', factor: 1e9 },
] as const;
export type Prefix = (typeof prefixes)[number]['symbol'];

export type QuantityFormat = {
  /** Significant digits; default 3. Ignored where `decimals` or `uncertainty` is given. */
  readonly digits?: number | undefined;
  readonly decimals?: number | undefined;
  /** Expanded uncertainty in the base unit: its two digits fix the decimals. */
  readonly uncertainty?: number | undefined;
  readonly signed?: boolean | undefined;
  /** The column's prefix: kept while the value lies between 0.1 and 999 in it. */
  readonly prefix?: Prefix | undefined;
};

/** What a value in the base unit is divided by to stand before the prefix. */
export function prefixFactor(prefix: Prefix): number {
  return prefixes.find((entry) => entry.symbol === prefix)?.factor ?? 1;
}

/** The prefix that leaves 1 to 999 before the unit, or the preferred one from 0.1 on. */
export function choosePrefix(value: number, preferred?: Prefix): Prefix {
  const size = Math.abs(value);
  if (preferred !== undefined) {
    const inPreferred = size / prefixFactor(preferred);
    if (size === 0 || (inPreferred >= 0.1 && inPreferred < 999.5)) {
      return preferred;
    }
  }
  if (size === 0) {
    return '';
  }
  const fitting = prefixes.find((entry) => size / entry.factor < 999.5);
  return fitting?.symbol ?? 'G';
}

function decimalsOf(scaled: number, factor: number, format: QuantityFormat): number {
  if (format.decimals !== undefined) {
    return format.decimals;
  }
  if (format.uncertainty !== undefined && format.uncertainty > 0) {
    return decimalsForUncertainty(format.uncertainty / factor);
  }
  return decimalsForDigits(scaled, format.digits ?? 3);
}

/** Figure and unit apart, for a cell that draws the unit quieter than the figure. */
export function splitQuantity(value: number, unit: string, format: QuantityFormat = {}): Figure {
  const prefix = choosePrefix(value, format.prefix);
  const factor = prefixFactor(prefix);
  const scaled = value / factor;
  const decimals = decimalsOf(scaled, factor, format);
  return {
    figure: formatNumber(scaled, { decimals, signed: format.signed }),
    unit: `${prefix}${unit}`,
  };
}

export function joinFigure({ figure, unit }: Figure): string {
  return `${figure}${thinSpace}${unit}`;
}

export function formatQuantity(value: number, unit: string, format: QuantityFormat = {}): string {
  return joinFigure(splitQuantity(value, unit, format));
}

export function formatCurrentA(currentA: number, format: QuantityFormat = {}): string {
  return formatQuantity(currentA, 'A', format);
}

export function formatVoltageV(voltageV: number, decimals = 4): string {
  return `${formatNumber(voltageV, { decimals })}${thinSpace}V`;
}

export function formatResistanceOhm(resistanceOhm: number, format: QuantityFormat = {}): string {
  return formatQuantity(resistanceOhm, 'Ω', format);
}

/** Capacitances of cells are said in whole farads, never with a prefix. */
export function formatCapacitanceF(capacitanceF: number): string {
  return `${formatNumber(capacitanceF, { decimals: 0 })}${thinSpace}F`;
}

export function formatTemperature(temperatureC: number, decimals = 1): string {
  return `${formatNumber(temperatureC, { decimals })}${thinSpace}°C`;
}

/** Ampere-hours as the cell type states them: up to three digits, no empty decimals. */
export function formatAh(capacityAh: number): string {
  const decimals = decimalsForDigits(capacityAh, 3);
  const figure = formatNumber(capacityAh, { decimals }).replace(/(\.\d*?)0+$/, '$1');
  return `${figure.replace(/\.$/, '')}${thinSpace}Ah`;
}

export function formatPercent(share: number, decimals = 0): string {
  return `${formatNumber(share * 100, { decimals })}${thinSpace}%`;
}

/** `12.34 ± 0.56 µA`: one prefix for both, two digits of the uncertainty. */
export function formatWithUncertainty(value: number, uncertainty: number, unit: string): string {
  const prefix = choosePrefix(Math.max(Math.abs(value), uncertainty));
  const factor = prefixFactor(prefix);
  const decimals = decimalsForUncertainty(uncertainty / factor);
  const figure = formatNumber(value / factor, { decimals });
  const spread = formatNumber(uncertainty / factor, { decimals });
  return `${figure} ±${thinSpace}${spread}${thinSpace}${prefix}${unit}`;
}

const sizes = [
  { unit: 'GB', bytes: 1e9 },
  { unit: 'MB', bytes: 1e6 },
  { unit: 'kB', bytes: 1e3 },
] as const;

export function formatBytes(bytes: number): string {
  const size = sizes.find((entry) => bytes >= entry.bytes);
  if (size === undefined) {
    return `${bytes}${thinSpace}B`;
  }
  const value = bytes / size.bytes;
  return `${formatNumber(value, { decimals: value < 10 ? 1 : 0 })}${thinSpace}${size.unit}`;
}
