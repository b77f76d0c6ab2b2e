import type {
  Chamber,
  Facility,
  FacilityIndex,
  Load,
  MeterChannel,
  MeterRange,
  Panel,
  PhaseSpan,
  Position,
  SourceChannel,
} from '#shared/domain/facility/types.ts';
import type { SlotEstimate } from '#shared/domain/hold-estimate/types.ts';
import type { SlotRequest } from '#shared/domain/availability/types.ts';
import type { Span } from '#shared/domain/intervals/types.ts';

export const checkOutcomes = ['pass', 'caution', 'stop'] as const;
export type CheckOutcome = (typeof checkOutcomes)[number];

export const checkCodes = [
  'double-use',
  'position-fit',
  'path-connects',
  'in-service',
  'calibration-valid',
  'meter-range',
  'source-span',
  'source-stability',
  'burden-known',
  'chamber-span',
  'shared-temperature',
  'still-phase',
  'load-open',
  'stability-logged',
  'temperature-current',
  'mapping',
  'cell-limits',
  'hazard-protection',
  'energy-and-count',
  'unattended',
  'cells-received',
  'rest-time',
  'working-hours',
  'slot-length',
  'needed-by',
] as const;
export type CheckCode = (typeof checkCodes)[number];

/** A figure or record the outcome rests on. */
export type Evidence = {
  readonly label: string;
  readonly value: string;
  /** Where it comes from: a record noun and number, a tag, or a policy name. */
  readonly source: string;
};

/** What a person can do about it. `deviation` is offered only where the check may be lifted. */
export type WayOut = {
  readonly kind:
    | 'later-start'
    | 'other-path'
    | 'other-temperature'
    | 'deviation'
    | 'record-calibration'
    | 'assess-log'
    | 'receive-cells'
    | 'change-request'
    | 'ask-safety';
  readonly sentence: string;
  /** Tag or record number the way out is about, if there is one. */
  readonly subject: string | null;
};

export type CheckResult = {
  readonly code: CheckCode;
  readonly outcome: CheckOutcome;
  /** One plain sentence: what, why, until when. */
  readonly sentence: string;
  readonly evidence: readonly Evidence[];
  readonly waysOut: readonly WayOut[];
  /** How much of the limit is used, 0–1 and above; null where the check has no measure. */
  readonly used: number | null;
  /** Lifted by this deviation: the outcome was stop and counts as caution. */
  readonly liftedByDeviationId: number | null;
};

/** One cell's way: which channels and position, and the meter range used. */
export type PathChoice = {
  readonly panel: Panel;
  readonly source: SourceChannel;
  readonly meter: MeterChannel;
  readonly range: MeterRange;
  readonly position: Position;
};

/** Everything a check may look at for one booking in one place at one time. */
export type PlacementFacts = {
  readonly facility: Facility;
  /** Look-ups over the same facility. */
  readonly index: FacilityIndex;
  readonly request: SlotRequest;
  readonly chamber: Chamber;
  /** The load it joins; null = a new one. */
  readonly joins: Load | null;
  readonly paths: readonly PathChoice[];
  readonly phases: readonly PhaseSpan[];
  readonly span: Span;
  readonly setTemperatureC: number;
  readonly estimate: SlotEstimate;
  readonly nowMs: number;
  /** When a booking is re-checked, its own allocations and load do not count against it. */
  readonly ignoreBookingId: number | null;
};
