import type { CalendarIndex } from '#shared/domain/calendar/types.ts';
import type { LoadPhase } from '#shared/domain/hold-estimate/types.ts';
import type { Span } from '#shared/domain/intervals/types.ts';

/**
 * What one site looks like to the checks and the search: plain values, read once from storage.
 * Everything the search decides on is in here, so that it can run anywhere and be repeated.
 */
export type Facility = {
  readonly siteCode: string;
  readonly siteName: string;
  readonly calendar: WorkingCalendar;
  readonly policy: FacilityPolicy;
  readonly chambers: readonly Chamber[];
  readonly panels: readonly Panel[];
  readonly sourceChannels: readonly SourceChannel[];
  readonly meterChannels: readonly MeterChannel[];
  readonly positions: readonly Position[];
  /** What is already taken, unit by unit: bookings and planned outages. */
  readonly allocations: readonly TakenSpan[];
  /** Breakdowns, withdrawals, failed calibrations: not bookable, though bookings may lie over them. */
  readonly unavailabilities: readonly TakenSpan[];
  /** Rooms whose energy is limited; chambers name their room. Left out = no room is limited. */
  readonly rooms?: readonly Room[];
};

/** A room with a limit on the energy of all cells in its chambers together. */
export type Room = { readonly name: string; readonly maxEnergyWh: number };

/** A facility with the look-ups that checks and search need; made by `availability/build-index.ts`. */
export type FacilityIndex = {
  readonly facility: Facility;
  readonly calendar: CalendarIndex;
  readonly chambers: ReadonlyMap<number, Chamber>;
  readonly sources: ReadonlyMap<number, SourceChannel>;
  readonly meters: ReadonlyMap<number, MeterChannel>;
  readonly positions: ReadonlyMap<number, Position>;
  /** Bookings and planned outages by unit, in order of start. */
  readonly taken: ReadonlyMap<number, readonly TakenSpan[]>;
  /** Breakdowns and the like by unit, in order of start. */
  readonly unavailable: ReadonlyMap<number, readonly TakenSpan[]>;
};

/** Working hours of a site in its own zone; minutes are wall-clock minutes after midnight. */
export type WorkingCalendar = {
  readonly zone: string;
  /** Index 1 = Monday … 7 = Sunday; a day without entry is closed. */
  readonly weekly: Readonly<Record<number, readonly DayHours[]>>;
  readonly exceptions: readonly {
    readonly day: string;
    readonly hours: readonly DayHours[];
    readonly reason: string;
  }[];
};
export type DayHours = { readonly fromMin: number; readonly toMin: number };

/** Site policy as the core needs it; the defaults and limits are in `policies/site-policy.ts`. */
export type FacilityPolicy = {
  /** Probability that the booked hold is long enough, 0.5–0.95. */
  readonly safePercentile: number;
  readonly maxHoldS: number;
  readonly stabilityMaxAgeDays: number;
  readonly stabilityTemperatureWindowK: number;
  /** Outcome of "log cannot tell" for reported work. */
  readonly logCannotTell: 'caution' | 'stop';
  readonly matchAttended: boolean;
  readonly connectFixedMin: number;
  readonly connectPerCellMin: number;
  readonly unloadFixedMin: number;
  readonly unloadPerCellMin: number;
  readonly matchMin: number;
  readonly minimumMeasureMin: number;
  /** How far ahead a slot may be booked. */
  readonly horizonDays: number;
  /** Wiring assumed while no real path is known. */
  readonly referenceLeadResistanceOhm: number;
};

export type ServiceState = 'awaiting-release' | 'in-service' | 'out-of-service' | 'retired';

export type Chamber = {
  readonly id: number;
  readonly tag: string;
  readonly roomName: string;
  readonly state: ServiceState;
  readonly minTemperatureC: number;
  readonly maxTemperatureC: number;
  readonly idleTemperatureC: number;
  readonly rampKPerMin: number;
  /** Strict: no door may open while another load is in a still phase. */
  readonly strictDoor: boolean;
  /** Highest hazard level (0–7) the chamber's protection is meant for. */
  readonly protectionLevel: number;
  readonly maxEnergyWh: number;
  readonly maxCells: number;
  readonly mappingDueOn: string | null;
  readonly unattended: readonly UnattendedPermission[];
  readonly assessments: readonly StabilityFact[];
  readonly loads: readonly Load[];
  /** Chamber calibration: temperature indication in date over these spans. */
  readonly validity: readonly ValiditySpan[];
};

export type UnattendedPermission = {
  readonly maxTemperatureC: number;
  readonly maxHazard: number;
  /** Percent. */
  readonly maxStateOfCharge: number;
  readonly contact: string;
  /** When it holds; left out = always. */
  readonly during?: Span;
  /** The only cell type it is for; left out = any. */
  readonly cellTypeName?: string;
};

/** One judged log of a chamber: what the chamber was shown to do at a temperature. */
export type StabilityFact = {
  readonly id: number;
  readonly setTemperatureC: number;
  readonly assessedAtMs: number;
  readonly hoursLogged: number;
  readonly driftKPerH: number;
  readonly halfBandK: number;
  readonly periodS: number | null;
  readonly resolutionK: number;
  readonly sensorPlace: string;
};

export type PhaseSpan = Span & {
  readonly phase: LoadPhase;
  readonly setTemperatureC: number;
};

export type Load = {
  readonly id: number;
  readonly state: 'open' | 'closed' | 'running' | 'done' | 'cancelled';
  readonly closesAtMs: number | null;
  readonly setTemperatureC: number;
  readonly phases: readonly PhaseSpan[];
  /** The phase lengths each booking in it needs by itself, for joining and lengthening. */
  readonly members: readonly LoadMember[];
};
export type LoadMember = {
  readonly bookingId: number;
  readonly cells: number;
  readonly energyWh: number;
  /** Whole seconds a phase must last for this booking; connect and unload are for its own cells. */
  readonly needsS: Readonly<Partial<Record<LoadPhase, number>>>;
};

/** A span during which a channel × function × range is validly calibrated, and why it ends. */
export type ValiditySpan = Span & {
  readonly calibrationId: number;
  /** Last valid calendar day at the instrument's site; null where the end has another reason. */
  readonly dueOn: string | null;
  readonly limitation: string | null;
};

export type SourceChannel = {
  readonly unitId: number;
  readonly tag: string;
  readonly instrumentId: number;
  readonly instrumentTag: string;
  readonly state: ServiceState;
  readonly minVoltageV: number;
  readonly maxVoltageV: number;
  /** Specified or measured drift; null: never stated. */
  readonly stabilityVPerH: number | null;
  readonly noiseV: number;
  readonly outputResistanceOhm: number;
  readonly temperatureCoefficientVPerK: number | null;
  /** The meter channel of the same instrument that must be taken together with it. */
  readonly pairedUnitId: number | null;
  readonly validity: readonly ValiditySpan[];
};

export type MeterChannel = {
  readonly unitId: number;
  readonly tag: string;
  readonly instrumentId: number;
  readonly instrumentTag: string;
  readonly state: ServiceState;
  readonly pairedUnitId: number | null;
  readonly ranges: readonly MeterRange[];
};
export type MeterRange = {
  readonly id: number;
  readonly label: string;
  readonly fullScaleA: number;
  readonly resolutionA: number;
  readonly noiseA: number;
  readonly accuracyPpmReading: number;
  readonly accuracyPpmRange: number;
  readonly burdenOhm: number | null;
  readonly burdenInsideLoop: boolean | null;
  readonly sampleIntervalS: number;
  readonly validity: readonly ValiditySpan[];
};

export type Position = {
  readonly unitId: number;
  readonly tag: string;
  readonly chamberId: number;
  readonly formats: readonly string[];
  readonly maxCapacityAh: number;
  readonly maxHazard: number;
  readonly holderFactor: number;
  readonly state: ServiceState;
};

/** Source channels, meter channels and positions that can be connected with each other. */
export type Panel = {
  readonly id: number;
  readonly name: string;
  readonly chamberId: number;
  readonly leadResistanceOhm: number | null;
  readonly guarded: boolean;
  readonly sourceUnitIds: readonly number[];
  readonly meterUnitIds: readonly number[];
  readonly positionUnitIds: readonly number[];
};

export type TakenSpan = Span & {
  readonly unitId: number;
  readonly by: 'booking' | 'outage' | 'unavailability';
  /** Number of the booking or outage; null for unavailability. */
  readonly recordId: number | null;
  /** A short sentence fit for a screen, e.g. `booking 2418` or `door seal, repair until Wed 14:00`. */
  readonly label: string;
};
