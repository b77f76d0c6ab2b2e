import type { CellClass } from './types.ts';

/** Low, typical and high value of one figure. */
export type Range = { readonly low: number; readonly typical: number; readonly high: number };

export type CellClassFigures = {
  readonly cellClass: CellClass;
  readonly label: string;
  /** Capacities of the low, typical and high example cell, Ah. */
  readonly capacityAh: Range;
  /** k = C/Q of the examples, F/Ah. */
  readonly capacitanceFPerAh: Range;
  /** ρ = R·Q of the cell alone (long-time direct current), Ω·Ah. */
  readonly resistanceOhmAh: Range;
  /** Usual leads and contacts, Ω; a booking takes its own path's instead. */
  readonly externalResistanceOhm: Range;
  readonly source: string;
};

const nmcCapacitance: Range = { low: 3000, typical: 4000, high: 6000 };
const estimated =
  'engineering estimate, chosen so that the typical row meets common practice (30 min-2 h cylindrical, 1-2 h for 10-60 Ah)';
const extrapolated = 'engineering estimate, extrapolated: no published settle time above 100 Ah';

/** Size classes with the electrical figures that estimates fall back on. */
export const cellClassFigures: Record<CellClass, CellClassFigures> = {
  coin: {
    cellClass: 'coin',
    label: 'Coin cell',
    capacityAh: { low: 0.02, typical: 0.045, high: 0.12 },
    capacitanceFPerAh: nmcCapacitance,
    resistanceOhmAh: { low: 0.02, typical: 0.03, high: 0.06 },
    externalResistanceOhm: { low: 0.1, typical: 0.3, high: 1 },
    source: 'engineering estimate',
  },
  'small-pouch': {
    cellClass: 'small-pouch',
    label: 'Small pouch cell, 0.5-2 Ah',
    capacityAh: { low: 0.5, typical: 1, high: 2 },
    capacitanceFPerAh: nmcCapacitance,
    resistanceOhmAh: { low: 0.06, typical: 0.12, high: 0.3 },
    externalResistanceOhm: { low: 0.05, typical: 0.1, high: 0.1 },
    source: 'engineering estimate; 0.06-0.30 Ω·Ah spans published large and small cells',
  },
  cylindrical: {
    cellClass: 'cylindrical',
    label: 'Cylindrical cell, 2-5 Ah',
    capacityAh: { low: 2.5, typical: 3.5, high: 5 },
    capacitanceFPerAh: nmcCapacitance,
    resistanceOhmAh: { low: 0.06, typical: 0.12, high: 0.3 },
    externalResistanceOhm: { low: 0.05, typical: 0.06, high: 0.06 },
    source: estimated,
  },
  'large-cylindrical': {
    cellClass: 'large-cylindrical',
    label: 'Large cylindrical cell, 20-26 Ah',
    capacityAh: { low: 20, typical: 23, high: 26 },
    capacitanceFPerAh: nmcCapacitance,
    resistanceOhmAh: { low: 0.07, typical: 0.12, high: 0.2 },
    externalResistanceOhm: { low: 0.01, typical: 0.02, high: 0.025 },
    source: estimated,
  },
  prismatic: {
    cellClass: 'prismatic',
    label: 'Prismatic or pouch cell, 10-60 Ah',
    capacityAh: { low: 10, typical: 35, high: 60 },
    capacitanceFPerAh: nmcCapacitance,
    resistanceOhmAh: { low: 0.07, typical: 0.12, high: 0.2 },
    externalResistanceOhm: { low: 0.02, typical: 0.014, high: 0.012 },
    source: estimated,
  },
  'large-prismatic': {
    cellClass: 'large-prismatic',
    label: 'Large prismatic cell, 100-300 Ah',
    capacityAh: { low: 100, typical: 200, high: 300 },
    capacitanceFPerAh: nmcCapacitance,
    resistanceOhmAh: { low: 0.07, typical: 0.12, high: 0.2 },
    externalResistanceOhm: { low: 0.004, typical: 0.006, high: 0.008 },
    source: extrapolated,
  },
};

/** Large LFP cells on the voltage plateau: an order of magnitude, not a figure to rely on. */
export const largeLfpFigures: CellClassFigures = {
  cellClass: 'large-prismatic',
  label: 'Large prismatic LFP cell, about 280 Ah, on the plateau',
  capacityAh: { low: 280, typical: 280, high: 280 },
  capacitanceFPerAh: { low: 10_000, typical: 30_000, high: 80_000 },
  resistanceOhmAh: { low: 0.1, typical: 0.14, high: 0.2 },
  externalResistanceOhm: { low: 0.004, typical: 0.004, high: 0.004 },
  source:
    'order of magnitude: two-phase plateau with hysteresis, extrapolated; measure LFP at 20-25 % state of charge or rely on learned times',
};
