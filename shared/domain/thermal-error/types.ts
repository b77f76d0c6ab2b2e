/** Where the logging sensor sits: in the chamber's air, on a dummy or holder, or on the cell. */
export const sensorPlaces = ['air', 'dummy', 'cell'] as const;
export type SensorPlace = (typeof sensorPlaces)[number];

/** What a metrologist read from a chamber log at one set temperature. */
export type StabilityAssessment = {
  /** Slow drift, K/h; its sign does not matter to a forecast. */
  readonly driftKPerH: number;
  /** Half of the band the temperature swings in around the drift, K. */
  readonly halfBandK: number;
  /** Period of the swing, s; `null` when none was found. */
  readonly periodS: number | null;
  readonly resolutionK: number;
  readonly hoursLogged: number;
  readonly sensorPlace: SensorPlace;
};

/** One reading of a temperature log; seconds from any origin. */
export type TemperatureSample = { readonly timeS: number; readonly temperatureC: number };

export const forecastVerdicts = ['ok', 'disturbed', 'cannot-tell'] as const;
export type ForecastVerdict = (typeof forecastVerdicts)[number];

/** One contribution to a forecast, with both figures of dU/dT, A. */
export type ForecastTerm = {
  readonly key: 'chamber-drift' | 'chamber-swing' | 'source-drift' | 'log-resolution';
  readonly label: string;
  readonly formula: string;
  /** With the default (or measured) dU/dT. */
  readonly defaultA: number;
  /** With the bound on dU/dT. */
  readonly boundA: number;
};

export type ForecastAssessment = {
  readonly verdict: ForecastVerdict;
  /** Temperature-induced window mean with the default dU/dT, A. */
  readonly forecastA: number;
  /** The same with the bound on dU/dT, A. */
  readonly boundForecastA: number;
  /** Current from the source's drift, A. */
  readonly driftA: number;
  /** Half-width U of what the log's resolution leaves open, default dU/dT, A. */
  readonly whiskerA: number;
  readonly boundWhiskerA: number;
  readonly allowanceA: number;
  readonly terms: readonly ForecastTerm[];
  /** Measuring length from which this log would decide, s; `null`: decided already, or never. */
  readonly lengthAtWhichLogCouldTellS: number | null;
  /** One sentence for the reader. */
  readonly reason: string;
};
