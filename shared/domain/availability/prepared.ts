import type { CheckCode } from '#shared/domain/checks/types.ts';
import type {
  Chamber,
  MeterChannel,
  MeterRange,
  Panel,
  Position,
  SourceChannel,
} from '#shared/domain/facility/types.ts';
import type { SingleEstimate, TooLongEstimate } from '#shared/domain/hold-estimate/types.ts';
import type { PhaseNeeds } from './needs-of-estimate.ts';

/** One kind of wiring in a chamber: all paths with equal electrical and thermal figures. */
export type WiringClass = {
  readonly estimate: SingleEstimate | TooLongEstimate;
  /** Lengths for this wiring and all faster ones together. */
  readonly needsS: PhaseNeeds;
};

export type PreparedSource = {
  readonly channel: SourceChannel;
  readonly group: number;
  /** What stops it whatever the time, as bits of check codes. */
  readonly stops: number;
};
export type PreparedMeter = {
  readonly channel: MeterChannel;
  readonly range: MeterRange;
  readonly group: number;
  readonly stops: number;
};
export type PreparedPosition = {
  readonly position: Position;
  readonly group: number;
  readonly stops: number;
};
export type PreparedPanel = {
  readonly panel: Panel;
  readonly sources: readonly PreparedSource[];
  readonly meters: readonly PreparedMeter[];
  readonly positions: readonly PreparedPosition[];
  /** Place of the wiring in the chamber's list, by group of source, meter, position; -1 = unusable. */
  readonly wiringOf: readonly (readonly (readonly number[])[])[];
};

/** A chamber at one set temperature as one request sees it. */
export type PreparedChamber = {
  readonly chamber: Chamber;
  readonly setTemperatureC: number;
  readonly panels: readonly PreparedPanel[];
  /** From the fastest to the slowest. */
  readonly wirings: readonly WiringClass[];
  /** How many paths are wired, able or not. */
  readonly wiredCount: number;
  /** Why wired paths have no length, as sentences: unknown wiring, or an aim that waiting cannot reach. */
  readonly withoutLength: readonly string[];
  /** What about the chamber and the request stops whatever the time, as bits. */
  readonly placeStops: number;
  /** When its mapping falls due, epoch ms; Infinity where none is recorded. */
  readonly mappedUntilMs: number;
  /** Are there enough able paths if all of them are free, in service and in calibration? */
  readonly hasEnoughPaths: boolean;
  /** Rules about paths that, if one alone is lifted, may leave enough. */
  readonly helpfulCodes: readonly CheckCode[];
};
