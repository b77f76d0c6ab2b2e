import type { SlotRequest } from '#shared/domain/availability/types.ts';
import type {
  Chamber,
  Facility,
  FacilityPolicy,
  Load,
  MeterChannel,
  MeterRange,
  Panel,
  PhaseSpan,
  Position,
  SourceChannel,
  StabilityFact,
  ValiditySpan,
  WorkingCalendar,
} from '#shared/domain/facility/types.ts';

/** Monday 1 June 2026, 00:00 in Dublin. */
export const mondayMs = Date.parse('2026-05-31T23:00:00Z');
export const hourMs = 3_600_000;
export const dayMs = 24 * hourMs;

const officeDay = [{ fromMin: 480, toMin: 1080 }];
export const officeHours: WorkingCalendar = {
  zone: 'Europe/Dublin',
  weekly: { 1: officeDay, 2: officeDay, 3: officeDay, 4: officeDay, 5: officeDay },
  exceptions: [],
};

export const sitePolicy: FacilityPolicy = {
  safePercentile: 0.9,
  maxHoldS: 72 * 3600,
  stabilityMaxAgeDays: 90,
  stabilityTemperatureWindowK: 0.5,
  logCannotTell: 'caution',
  matchAttended: false,
  connectFixedMin: 10,
  connectPerCellMin: 3,
  unloadFixedMin: 10,
  unloadPerCellMin: 3,
  matchMin: 20,
  minimumMeasureMin: 60,
  horizonDays: 120,
  referenceLeadResistanceOhm: 0.05,
};

export function buildValidity(change: Partial<ValiditySpan> = {}): ValiditySpan {
  return {
    startMs: mondayMs - 100 * dayMs,
    endMs: mondayMs + 300 * dayMs,
    calibrationId: 1,
    dueOn: '2027-03-28',
    limitation: null,
    ...change,
  };
}

export function buildStability(change: Partial<StabilityFact> = {}): StabilityFact {
  return {
    id: 1,
    setTemperatureC: 25,
    assessedAtMs: mondayMs - 10 * dayMs,
    hoursLogged: 72,
    driftKPerH: 0.0005,
    halfBandK: 0.0005,
    periodS: 600,
    resolutionK: 0.001,
    sensorPlace: 'air',
    ...change,
  };
}

export function buildChamber(change: Partial<Chamber> = {}): Chamber {
  return {
    id: 1,
    tag: 'C01',
    roomName: 'Room 1',
    state: 'in-service',
    minTemperatureC: -20,
    maxTemperatureC: 80,
    idleTemperatureC: 25,
    rampKPerMin: 1,
    strictDoor: true,
    protectionLevel: 5,
    maxEnergyWh: 2000,
    maxCells: 100,
    mappingDueOn: '2027-03-28',
    unattended: [
      { maxTemperatureC: 60, maxHazard: 5, maxStateOfCharge: 100, contact: 'the duty phone' },
    ],
    assessments: [buildStability()],
    loads: [],
    validity: [buildValidity()],
    ...change,
  };
}

export function buildSource(change: Partial<SourceChannel> = {}): SourceChannel {
  return {
    unitId: 1001,
    tag: 'S01/1',
    instrumentId: 1,
    instrumentTag: 'S01',
    state: 'in-service',
    minVoltageV: 0,
    maxVoltageV: 6,
    stabilityVPerH: 5e-8,
    noiseV: 1e-6,
    outputResistanceOhm: 0.01,
    temperatureCoefficientVPerK: 1e-6,
    pairedUnitId: null,
    validity: [buildValidity()],
    ...change,
  };
}

export function buildRange(change: Partial<MeterRange> = {}): MeterRange {
  return {
    id: 1,
    label: '100 µA',
    fullScaleA: 1e-4,
    resolutionA: 1e-9,
    noiseA: 1e-8,
    accuracyPpmReading: 500,
    accuracyPpmRange: 100,
    burdenOhm: 10,
    burdenInsideLoop: true,
    sampleIntervalS: 1,
    validity: [buildValidity()],
    ...change,
  };
}

export function buildMeter(change: Partial<MeterChannel> = {}): MeterChannel {
  return {
    unitId: 2001,
    tag: 'M01/1',
    instrumentId: 2,
    instrumentTag: 'M01',
    state: 'in-service',
    pairedUnitId: null,
    ranges: [buildRange()],
    ...change,
  };
}

export function buildPosition(change: Partial<Position> = {}): Position {
  return {
    unitId: 3001,
    tag: 'C01/1',
    chamberId: 1,
    formats: ['18650', '21700'],
    maxCapacityAh: 6,
    maxHazard: 5,
    holderFactor: 1,
    state: 'in-service',
    ...change,
  };
}

export function buildPanel(change: Partial<Panel> = {}): Panel {
  return {
    id: 1,
    name: 'P01',
    chamberId: 1,
    leadResistanceOhm: 0.05,
    guarded: true,
    sourceUnitIds: [1001],
    meterUnitIds: [2001],
    positionUnitIds: [3001],
    ...change,
  };
}

export function buildFacility(change: Partial<Facility> = {}): Facility {
  return {
    siteCode: 'larkfen',
    siteName: 'Larkfen',
    calendar: officeHours,
    policy: sitePolicy,
    chambers: [buildChamber()],
    panels: [buildPanel()],
    sourceChannels: [buildSource()],
    meterChannels: [buildMeter()],
    positions: [buildPosition()],
    allocations: [],
    unavailabilities: [],
    ...change,
  };
}

/** One panel of `size` equal paths in a chamber; unit numbers and tags follow the panel's number. */
export function buildWiredPanel(
  input: {
    readonly id: number;
    readonly chamber: Chamber;
    readonly size: number;
    readonly leadResistanceOhm?: number;
  },
  change: {
    readonly source?: Partial<SourceChannel>;
    readonly meter?: Partial<MeterChannel>;
    readonly position?: Partial<Position>;
  } = {},
): Pick<Facility, 'panels' | 'sourceChannels' | 'meterChannels' | 'positions'> {
  const { id, chamber, size } = input;
  const places = Array.from({ length: size }, (_, place) => place + 1);
  const number = String(id).padStart(2, '0');
  const unit = (kind: number, place: number): number => kind * 100_000 + id * 100 + place;
  return {
    panels: [
      buildPanel({
        id,
        name: `P${number}`,
        chamberId: chamber.id,
        leadResistanceOhm: input.leadResistanceOhm ?? 0.05,
        sourceUnitIds: places.map((place) => unit(1, place)),
        meterUnitIds: places.map((place) => unit(2, place)),
        positionUnitIds: places.map((place) => unit(3, place)),
      }),
    ],
    sourceChannels: places.map((place) =>
      buildSource({
        unitId: unit(1, place),
        tag: `S${number}/${place}`,
        instrumentTag: `S${number}`,
        ...change.source,
      }),
    ),
    meterChannels: places.map((place) =>
      buildMeter({
        unitId: unit(2, place),
        tag: `M${number}/${place}`,
        instrumentTag: `M${number}`,
        ...change.meter,
      }),
    ),
    positions: places.map((place) =>
      buildPosition({
        unitId: unit(3, place),
        tag: `${chamber.tag}/${id}-${place}`,
        chamberId: chamber.id,
        ...change.position,
      }),
    ),
  };
}

/** A facility of chambers and the panels wired to them. */
export function buildWiredFacility(
  chambers: readonly Chamber[],
  panels: readonly ReturnType<typeof buildWiredPanel>[],
  change: Partial<Facility> = {},
): Facility {
  return buildFacility({
    chambers,
    panels: panels.flatMap((panel) => panel.panels),
    sourceChannels: panels.flatMap((panel) => panel.sourceChannels),
    meterChannels: panels.flatMap((panel) => panel.meterChannels),
    positions: panels.flatMap((panel) => panel.positions),
    ...change,
  });
}

/** Phases laid end to end from a start; minutes each, a phase without minutes is left out. */
export function buildPhaseSpans(
  startMs: number,
  setTemperatureC: number,
  minutes: readonly (readonly [PhaseSpan['phase'], number])[],
  idleTemperatureC = 25,
): readonly PhaseSpan[] {
  let cursorMs = startMs;
  return minutes.map(([phase, length]) => {
    const span = { startMs: cursorMs, endMs: cursorMs + length * 60_000 };
    cursorMs = span.endMs;
    const isIdle = phase === 'connect' || phase === 'wait' || phase === 'unload';
    return { ...span, phase, setTemperatureC: isIdle ? idleTemperatureC : setTemperatureC };
  });
}

export function buildLoad(change: Partial<Load> = {}): Load {
  return {
    id: 31,
    state: 'open',
    closesAtMs: null,
    setTemperatureC: 25,
    phases: [],
    members: [],
    ...change,
  };
}

/** Two 3.5 Ah cylindrical cells at 25 °C, settled, well rested, from Monday on. */
export function buildSlotRequest(change: Partial<SlotRequest> = {}): SlotRequest {
  return {
    requestId: 1,
    kind: 'settled',
    grade: 'reported',
    cellTypeName: 'LF-35',
    cellCount: 1,
    cell: {
      cellClass: 'cylindrical',
      format: '18650',
      chemistry: 'nmc811',
      capacityAh: 3.5,
      stateOfChargePct: 50,
      measured: null,
    },
    limits: {
      released: true,
      hazardLevel: 4,
      minTemperatureC: -10,
      maxTemperatureC: 60,
      minVoltageV: 2.5,
      maxVoltageV: 4.2,
      openCircuitVoltageV: 3.7,
      energyWh: 12.6,
      maxHoldStateOfCharge: 80,
    },
    tolerance: { kind: 'relative', fraction: 0.1 },
    screening: { badToGoodRatio: 3, falseAlarm: 0.01, miss: 0.01 },
    setTemperatureC: 25,
    setToleranceK: 0.5,
    earliestStartMs: mondayMs,
    neededByMs: null,
    cellsReceived: true,
    cellsDamaged: false,
    restedSinceMs: mondayMs - 60 * dayMs,
    deviations: [],
    ...change,
  };
}
