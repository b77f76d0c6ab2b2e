import type { Range } from './cell-class-figures.ts';
import type { Chemistry } from './types.ts';

/** Figures that hold up to (not including) a state of charge, %; the last band holds to the end. */
export type CapacitanceBand = {
  readonly belowPct: number;
  readonly label: string;
  readonly capacitanceFPerAh: Range;
  readonly source: string;
};

export type EntropicBand = {
  readonly belowPct: number;
  /** Default dU/dT, V/K, with sign. */
  readonly defaultVPerK: number;
  /** Bound on |dU/dT|, V/K. */
  readonly boundVPerK: number;
  readonly source: string;
};

export type ChemistryFigures = {
  readonly label: string;
  readonly capacitance: readonly CapacitanceBand[];
  readonly entropic: readonly EntropicBand[];
  /** Does the default capacitance change with the state of charge so much that it must be known? */
  readonly needsStateOfCharge: boolean;
};

const chen = 'Chen 2020, J. Electrochem. Soc. 167 080534 (published open-circuit curves)';
const bpxNmc = 'BPX example set NMC111/graphite 12.5 Ah pouch';
const bpxLfp = 'BPX example set LFP/graphite 2 Ah 18650';
const oRegan =
  "O'Regan 2022, Electrochim. Acta 425 140700 with the windows of Chen 2020; steep below 20 % state of charge";
const lfpEntropy = "BPX example set (Gerver & Meyers 2011; anode O'Regan 2022)";
const nmcBand: CapacitanceBand = {
  belowPct: 85,
  label: 'up to 85 %',
  capacitanceFPerAh: { low: 3000, typical: 4000, high: 6000 },
  source: chen,
};
const nmcBands: readonly CapacitanceBand[] = [
  nmcBand,
  {
    belowPct: Infinity,
    label: '85 % and above',
    capacitanceFPerAh: { low: 3000, typical: 4000, high: 12_300 },
    source: `${chen}: 12 300 F/Ah at 90 %, so the range is wide here`,
  },
];
const nmc111Bands: readonly CapacitanceBand[] = nmcBands.map((band) => ({
  ...band,
  capacitanceFPerAh: {
    ...band.capacitanceFPerAh,
    high: Math.max(10_600, band.capacitanceFPerAh.high),
  },
  source: `${bpxNmc}: 2994-10 604 F/Ah over the state of charge`,
}));

/** Capacitance and entropic figures by chemistry and state of charge. */
export const chemistryFigures: Record<Chemistry, ChemistryFigures> = {
  nmc811: {
    label: 'NMC 811 / graphite (with silicon oxide)',
    capacitance: nmcBands,
    entropic: [
      { belowPct: 20, defaultVPerK: -5e-5, boundVPerK: 4.5e-4, source: oRegan },
      { belowPct: Infinity, defaultVPerK: -5e-5, boundVPerK: 1.5e-4, source: oRegan },
    ],
    needsStateOfCharge: false,
  },
  nmc111: {
    label: 'NMC 111 / graphite',
    capacitance: nmc111Bands,
    entropic: [
      {
        belowPct: 20,
        defaultVPerK: -1e-4,
        boundVPerK: 5e-4,
        source: `${bpxNmc}: -0.48 mV/K at 10 %; bound derived here`,
      },
      {
        belowPct: Infinity,
        defaultVPerK: -1e-4,
        boundVPerK: 2.5e-4,
        source: `${bpxNmc} (Viswanathan 2010 cathode, O'Regan 2022 anode)`,
      },
    ],
    needsStateOfCharge: false,
  },
  nmc: {
    label: 'NMC of unknown grade / graphite',
    capacitance: nmcBands,
    entropic: [
      {
        belowPct: 20,
        defaultVPerK: -5e-5,
        boundVPerK: 5e-4,
        source: `${oRegan}; widest of the NMC grades`,
      },
      {
        belowPct: Infinity,
        defaultVPerK: -5e-5,
        boundVPerK: 3e-4,
        source: `${oRegan}; bound from Zheng 2024 (50 Ah prismatic, sign not verified)`,
      },
    ],
    needsStateOfCharge: false,
  },
  nca: {
    label: 'NCA / graphite',
    capacitance: nmcBands.map((band) => ({
      ...band,
      source: 'engineering estimate after NMC: no curve computed',
    })),
    entropic: [
      {
        belowPct: 20,
        defaultVPerK: -5e-5,
        boundVPerK: 4e-4,
        source: 'engineering estimate, about -0.4 to +0.1 mV/K over the state of charge',
      },
      {
        belowPct: Infinity,
        defaultVPerK: -5e-5,
        boundVPerK: 3e-4,
        source: 'engineering estimate, about -0.4 to +0.1 mV/K over the state of charge',
      },
    ],
    needsStateOfCharge: false,
  },
  lco: {
    label: 'LCO / graphite',
    capacitance: [
      {
        belowPct: Infinity,
        label: 'any',
        capacitanceFPerAh: { low: 4000, typical: 10_000, high: 14_000 },
        source:
          'Ai 2020, J. Electrochem. Soc. 167 013512: 4315-13 793 F/Ah over the state of charge',
      },
    ],
    entropic: [
      {
        belowPct: Infinity,
        defaultVPerK: -3.5e-4,
        boundVPerK: 5.5e-4,
        source: 'Ai 2020; full charge Huang 2006, J. Power Sources 156 541',
      },
    ],
    needsStateOfCharge: false,
  },
  lfp: {
    label: 'LFP / graphite',
    capacitance: [
      {
        belowPct: 25.5,
        label: 'up to 25 %',
        capacitanceFPerAh: { low: 6500, typical: 8000, high: 10_000 },
        source: `${bpxLfp}: 6619 F/Ah at 20 %`,
      },
      {
        belowPct: Infinity,
        label: 'on the plateau',
        capacitanceFPerAh: { low: 10_000, typical: 30_000, high: 80_000 },
        source: `${bpxLfp}: 21 075-107 000 F/Ah; two-phase with hysteresis, so an order of magnitude`,
      },
    ],
    entropic: [
      { belowPct: 30, defaultVPerK: 0, boundVPerK: 5e-4, source: lfpEntropy },
      { belowPct: Infinity, defaultVPerK: 0, boundVPerK: 1e-4, source: lfpEntropy },
    ],
    needsStateOfCharge: true,
  },
  lto: {
    label: 'NMC / LTO',
    capacitance: [
      {
        belowPct: Infinity,
        label: 'any',
        capacitanceFPerAh: { low: 3000, typical: 4000, high: 8000 },
        source: 'engineering estimate: the flat anode leaves the slope of the NMC cathode',
      },
    ],
    entropic: [
      {
        belowPct: Infinity,
        defaultVPerK: 0,
        boundVPerK: 2e-4,
        source: 'engineering estimate, about -0.2 to +0.2 mV/K; Madani 2019, Energies 12 2685',
      },
    ],
    needsStateOfCharge: false,
  },
};

/** Leakage by capacity at 25 °C, A/Ah. */
export const selfDischargeAPerAh: Range = { low: 1e-6, typical: 3e-6, high: 1e-5 };

/** Where the leakage by capacity comes from. */
export const selfDischargeSource =
  '0.2-0.4 % in 30 days at 25 °C, published for 18650 NMC cells (2019), seen second-hand; 0.2 % is 2.8 µA/Ah';
