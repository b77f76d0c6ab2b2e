/** Revision of the model behind every estimate; it is frozen in a booking beside the inputs. */
export const estimateModelVersion = '1';

/** What is asked: tell bad cells from good ones, or wait for the settled value. */
export const measurementKinds = ['settled', 'screening'] as const;
export type MeasurementKind = (typeof measurementKinds)[number];

/** Size classes of cells, each with its own low, typical and high figures. */
export const cellClasses = [
  'coin',
  'small-pouch',
  'cylindrical',
  'large-cylindrical',
  'prismatic',
  'large-prismatic',
] as const;
export type CellClass = (typeof cellClasses)[number];

/** Outer shapes; a position takes formats, and the thermal figures follow them. */
export const cellFormats = ['coin', 'pouch', '18650', '21700', '4680', 'prismatic'] as const;
export type CellFormat = (typeof cellFormats)[number];

/** Cell chemistries with published or estimated figures; `nmc` is NMC of unknown grade. */
export const chemistries = ['nmc811', 'nmc111', 'nmc', 'nca', 'lco', 'lfp', 'lto'] as const;
export type Chemistry = (typeof chemistries)[number];

/**
 * Phases in the order of a load. The estimate never returns `wait` (availability decides it), and a
 * phase of zero length is left out.
 */
export const loadPhases = [
  'connect',
  'ramp',
  'soak',
  'match',
  'hold',
  'measure',
  'return',
  'wait',
  'unload',
] as const;
export type LoadPhase = (typeof loadPhases)[number];

/** Where a figure comes from. */
export const figureOrigins = [
  'measured',
  'learned',
  'class',
  'record',
  'policy',
  'assumption',
] as const;
export type FigureOrigin = (typeof figureOrigins)[number];

/** Figures measured on this cell type; `null` means not measured. */
export type MeasuredCellFigures = {
  /** Differential capacitance by capacity, F/Ah. */
  readonly capacitanceFPerAh: number | null;
  /** Long-time direct-current resistance of the cell alone, ohm (not the 1 kHz value). */
  readonly resistanceOhm: number | null;
  /** Thermal time constant as mounted, s (includes the holder). */
  readonly thermalTimeConstantS: number | null;
  /** Entropic coefficient dU/dT, V/K, with its sign. */
  readonly entropicCoefficientVPerK: number | null;
  readonly massKg: number | null;
  readonly surfaceM2: number | null;
  /** Leakage current by capacity at 25 °C, A/Ah. */
  readonly selfDischargeAPerAh: number | null;
};

export type EstimateCell = {
  readonly cellClass: CellClass;
  readonly format: CellFormat;
  readonly chemistry: Chemistry;
  readonly capacityAh: number;
  /** State of charge, 0-100 %; `null` when not stated. */
  readonly stateOfChargePct: number | null;
  readonly measured: MeasuredCellFigures | null;
};

/** Settled tolerance: a fraction of the expected current, or amperes. */
export type Tolerance =
  | { readonly kind: 'relative'; readonly fraction: number }
  | { readonly kind: 'absolute'; readonly currentA: number };

export type ScreeningAim = {
  /** Current of a bad cell divided by that of a good one, > 1 (default 3). */
  readonly badToGoodRatio: number;
  /** Probability that a good cell is called bad (default 0.01). */
  readonly falseAlarm: number;
  /** Probability that a bad cell is called good (default 0.01). */
  readonly miss: number;
};

/** The path's electrical figures; an estimate for a request takes the site's reference wiring. */
export type Wiring = {
  /** What the reader sees: "reference wiring of Larkfen", "S05/1 to C03/4". */
  readonly label: string;
  /** Leads and contacts, both conductors, ohm. */
  readonly leadResistanceOhm: number;
  readonly sourceOutputOhm: number;
  /** Burden of the meter's range, ohm; `null` when not recorded (the estimate then stops). */
  readonly burdenOhm: number | null;
  /** Is the burden inside the sense loop (and so compensated)? `null` when not recorded. */
  readonly burdenInsideLoop: boolean | null;
  /** Standard deviation of one reading, A. */
  readonly meterNoiseA: number;
  /** Smallest displayed step, A. */
  readonly meterResolutionA: number;
  readonly sampleIntervalS: number;
};

export type ProcessTimes = {
  readonly connectFixedMin: number;
  readonly connectPerCellMin: number;
  readonly unloadFixedMin: number;
  readonly unloadPerCellMin: number;
  readonly recabledPaths: number;
  readonly recableMinPerPath: number;
  readonly matchMin: number;
  /** Does the site want a person at the voltage match? */
  readonly matchAttended: boolean;
  readonly minimumMeasureMin: number;
  /** Probability that the booked hold is long enough, 0.5-0.95. */
  readonly safePercentile: number;
};

/**
 * What the runs have taught about observed hold / model hold: normal-inverse-gamma parameters of
 * y = ln(ratio), y ~ N(mu, s2), mu|s2 ~ N(mean, s2/kappa), s2 ~ InvGamma(shape, rate).
 */
export type RatioPosterior = {
  readonly mean: number;
  readonly kappa: number;
  readonly shape: number;
  readonly rate: number;
  /** Number of runs learned from; 0 for the prior. */
  readonly runCount: number;
};

export type EstimateInput = {
  readonly kind: MeasurementKind;
  readonly cellCount: number;
  readonly cell: EstimateCell;
  /** Multiplies the thermal time constant; 1 when the holder's record says nothing. */
  readonly holderFactor: number;
  readonly setTemperatureC: number;
  readonly chamber: { readonly idleTemperatureC: number; readonly rampKPerMin: number };
  readonly tolerance: Tolerance;
  readonly screening: ScreeningAim;
  readonly wiring: Wiring;
  readonly process: ProcessTimes;
  /** `null`: no runs yet, the prior is used. */
  readonly learnedRatios: RatioPosterior | null;
};

export type FigureInput = {
  readonly label: string;
  readonly value: number;
  readonly unit: string;
};

/** One number of an estimate with the way it was reached. */
export type Figure = {
  readonly key: string;
  readonly label: string;
  readonly value: number;
  readonly unit: string;
  readonly formula: string;
  readonly inputs: readonly FigureInput[];
  readonly source: string;
  readonly origin: FigureOrigin;
};

export type PhaseEstimate = {
  readonly phase: LoadPhase;
  /** Whole minutes, in seconds. */
  readonly likelyS: number;
  readonly safeS: number;
  readonly isAttended: boolean;
  /** Temperature the chamber must keep (ramp and return: the plateau's). */
  readonly setTemperatureC: number;
};

/** Lengths of the hold alone, s, before rounding. */
export type HoldRange = {
  /** What the physics gives; runs are compared with this: learned ratio = observed / model. */
  readonly modelS: number;
  /** Model × learned median ratio (the same as the model until runs have taught otherwise). */
  readonly likelyS: number;
  /** Model × the ratio that is long enough with the policy's probability. */
  readonly safeS: number;
  /** Low class figures, everything else as likely. */
  readonly lowS: number;
  /** High class figures, everything else as likely. */
  readonly highS: number;
  /** Typical class figures with the bound of dU/dT and a 10 uV mismatch. */
  readonly worstS: number;
};

/** What decides the length of the hold. */
export const holdLimits = ['already-settled', 'electrical', 'thermal', 'noise'] as const;
export type HoldLimit = (typeof holdLimits)[number];

/** The physical numbers behind a length; every caller may show or check them. */
export type EstimateNumbers = {
  /** Expected leakage of one cell at the set temperature, A. */
  readonly expectedCurrentA: number;
  /** Tolerance of the settled current, or the screening difference D, A. */
  readonly toleranceA: number;
  /** What disturbances may take: the tolerance, or D/4 for screening, A. */
  readonly allowanceA: number;
  readonly capacitanceF: number;
  /** Cell and external resistance together, ohm. */
  readonly seriesResistanceOhm: number;
  readonly externalResistanceOhm: number;
  readonly timeConstantS: number;
  readonly thermalTimeConstantS: number;
  /** Default (or measured) dU/dT, V/K, with sign. */
  readonly entropicCoefficientVPerK: number;
  /** Bound on |dU/dT| (equals the measured magnitude when measured), V/K. */
  readonly entropicBoundVPerK: number;
  /** Start mismatch used for likely and safe, V. */
  readonly startMismatchV: number;
  /** Standard deviation of the window-mean reading, A. */
  readonly readingSdA: number;
};

/** A question whose answer turns a range into a single figure. */
export type EstimateQuestion = { readonly field: 'stateOfChargePct'; readonly text: string };

type EstimateBase = {
  readonly modelVersion: string;
  readonly figures: readonly Figure[];
  /** Sentences the reader must see: assumptions, cautions about the figures used. */
  readonly notes: readonly string[];
};

/** Lengths known: phases in order, sums, the hold's range and what limits it. */
export type SingleEstimate = EstimateBase & {
  readonly outcome: 'ok';
  readonly phases: readonly PhaseEstimate[];
  readonly likelyTotalS: number;
  readonly safeTotalS: number;
  readonly hold: HoldRange;
  readonly limitedBy: HoldLimit;
  /** One sentence: what makes it as long as it is. */
  readonly limitText: string;
  readonly numbers: EstimateNumbers;
};

/** Longer than the longest hold on offer: all numbers, and why. */
export type TooLongEstimate = Omit<SingleEstimate, 'outcome'> & {
  readonly outcome: 'too-long';
  readonly reason: string;
};

/** State of charge missing where the capacitance depends on it: no single figure. */
export type RangeEstimate = EstimateBase & {
  readonly outcome: 'range';
  readonly reason: string;
  readonly question: EstimateQuestion;
  /** Shortest and longest totals and holds over the possible states of charge, safe, s. */
  readonly shortest: { readonly holdS: number; readonly totalS: number; readonly label: string };
  readonly longest: { readonly holdS: number; readonly totalS: number; readonly label: string };
};

/** A record is missing (burden or its place): nothing can be said. */
export type UnknownEstimate = EstimateBase & {
  readonly outcome: 'unknown';
  readonly reason: string;
};

/** The aim cannot be reached by waiting, whatever the length. */
export type ImpossibleEstimate = EstimateBase & {
  readonly outcome: 'impossible';
  readonly reason: string;
  readonly numbers: EstimateNumbers;
};

export type SlotEstimate =
  SingleEstimate | TooLongEstimate | RangeEstimate | UnknownEstimate | ImpossibleEstimate;

/** One point of the settling curve. */
export type SettlingPoint = {
  readonly timeS: number;
  /** Current after a positive start mismatch, A. */
  readonly positiveA: number;
  /** Current after a negative start mismatch, A. */
  readonly negativeA: number;
};

/** The settling current, ready to draw. */
export type SettlingCurve = {
  readonly points: readonly SettlingPoint[];
  readonly steadyCurrentA: number;
  readonly bandLowA: number;
  readonly bandHighA: number;
  readonly likelyS: number;
  readonly safeS: number;
};
