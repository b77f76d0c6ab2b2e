import type { CalendarIndex } from '#shared/domain/calendar/types.ts';
import { startOfDayMs } from '#shared/domain/calendar/start-of-day-ms.ts';
import type { ValidityKey } from '#shared/domain/calibration-validity/types.ts';
import type {
  MeterChannel,
  MeterRange,
  Panel,
  Position,
  ServiceState,
  SourceChannel,
  StabilityFact,
  UnattendedPermission,
  ValiditySpan,
} from '#shared/domain/facility/types.ts';
import type { LimitationRow } from './calibration-records.repository.ts';
import type {
  AssessmentRow,
  ChannelRow,
  InstrumentRow,
  MeterRangeRow,
  PanelMemberRow,
  PositionRow,
  SourceSpecRow,
  UnattendedRow,
} from './equipment.repository.ts';
import { groupBy } from './group-by.ts';
import { openEndMs } from './open-end.ts';
import { limitSpans } from './to-validity.ts';

const microPerOne = 1e6;

/** What is mounted in something is in service only as long as that is. */
export function stateOf(
  instruments: ReadonlyMap<number, InstrumentRow>,
  instrumentId: number,
): ServiceState {
  const instrument = instruments.get(instrumentId);
  if (instrument === undefined) {
    throw new Error(`Instrument ${instrumentId} belongs to another site than what uses it.`);
  }
  if (instrument.state !== 'in-service' || instrument.parentId === null) {
    return instrument.state;
  }
  return stateOf(instruments, instrument.parentId);
}

export type ChannelContext = {
  readonly instruments: ReadonlyMap<number, InstrumentRow>;
  /** Unit of the channel that is taken together with this one. */
  readonly pairedUnitOf: (channel: ChannelRow) => number | null;
  readonly validityOf: (instrumentId: number, key: ValidityKey) => readonly ValiditySpan[];
  readonly limitationsOf: (unitId: number) => readonly LimitationRow[];
};

/** Null where the source has no specification on record: it cannot be offered. */
export function toSourceChannel(
  channel: ChannelRow,
  specs: readonly SourceSpecRow[],
  context: ChannelContext,
): SourceChannel | null {
  const { instrumentId, channelId, unitId } = channel;
  const own = specs.find((row) => row.channelId === channelId);
  const spec =
    own ?? specs.find((row) => row.channelId === null && row.instrumentId === instrumentId);
  if (spec === undefined) {
    return null;
  }
  const key: ValidityKey = { channelId, function: 'source', rangeId: null };
  return {
    ...commonOf(channel, context),
    minVoltageV: spec.minV,
    maxVoltageV: spec.maxV,
    stabilityVPerH: spec.stabilityVPerH,
    noiseV: spec.noiseV,
    outputResistanceOhm: spec.outputOhm,
    temperatureCoefficientVPerK: spec.tempcoVPerK,
    validity: limitSpans(context.validityOf(instrumentId, key), context.limitationsOf(unitId)),
  };
}

export function toMeterChannel(
  channel: ChannelRow,
  ranges: readonly MeterRangeRow[],
  context: ChannelContext,
): MeterChannel {
  return {
    ...commonOf(channel, context),
    ranges: ranges.map((range) => toMeterRange(range, channel, context)),
  };
}

export function isRangeOf(range: MeterRangeRow, channel: ChannelRow): boolean {
  return (
    range.instrumentId === channel.instrumentId &&
    (range.channelId === null || range.channelId === channel.channelId)
  );
}

function toMeterRange(
  range: MeterRangeRow,
  channel: ChannelRow,
  context: ChannelContext,
): MeterRange {
  const limitations = context.limitationsOf(channel.unitId);
  const key: ValidityKey = {
    channelId: channel.channelId,
    function: 'measure',
    rangeId: range.id,
  };
  return {
    id: range.id,
    label: range.label,
    fullScaleA: Math.min(range.fullScaleA, ...limitations.flatMap((row) => row.maxCurrentA ?? [])),
    resolutionA: range.resolutionA,
    noiseA: range.noiseA,
    accuracyPpmReading: range.accuracyPpmReading,
    // An absolute part is the same at every reading, and so is the part of the range.
    accuracyPpmRange: range.accuracyPpmRange + (range.accuracyA / range.fullScaleA) * microPerOne,
    burdenOhm: range.burdenOhm,
    burdenInsideLoop: range.burdenInsideLoop,
    sampleIntervalS: range.sampleIntervalS,
    validity: limitSpans(context.validityOf(channel.instrumentId, key), limitations),
  };
}

function commonOf(channel: ChannelRow, context: ChannelContext) {
  const instrument = context.instruments.get(channel.instrumentId);
  return {
    unitId: channel.unitId,
    tag: channel.label,
    instrumentId: channel.instrumentId,
    instrumentTag: instrument?.tag ?? '',
    state: stateOf(context.instruments, channel.instrumentId),
    pairedUnitId: context.pairedUnitOf(channel),
  };
}

export function toPosition(row: PositionRow, state: ServiceState): Position {
  return {
    unitId: row.unitId,
    tag: row.label,
    chamberId: row.chamberId,
    formats: row.formats,
    maxCapacityAh: row.maxAh,
    maxHazard: row.maxHazard,
    holderFactor: row.holderFactor,
    state,
  };
}

export function toPanels(members: readonly PanelMemberRow[]): Panel[] {
  return [...groupBy(members, (row) => row.panelId).values()].flatMap((rows) => {
    const [panel] = rows;
    if (panel === undefined) {
      return [];
    }
    const unitsOf = (kind: PanelMemberRow['unitKind']) =>
      rows.filter((row) => row.unitKind === kind).map((row) => row.unitId);
    return {
      id: panel.panelId,
      name: panel.name,
      chamberId: panel.chamberId,
      leadResistanceOhm: panel.leadResistanceOhm,
      guarded: panel.guarded,
      sourceUnitIds: unitsOf('source-channel'),
      meterUnitIds: unitsOf('meter-channel'),
      positionUnitIds: unitsOf('chamber-position'),
    };
  });
}

export function toUnattended({ permission, cellTypeName }: UnattendedRow): UnattendedPermission {
  return {
    maxTemperatureC: permission.maxTemperatureC,
    maxHazard: permission.maxHazard,
    maxStateOfCharge: permission.maxStateOfChargePct,
    contact: permission.contact,
    during: {
      startMs: permission.startsAt.getTime(),
      endMs: permission.endsAt?.getTime() ?? openEndMs,
    },
    ...(cellTypeName === null ? {} : { cellTypeName }),
  };
}

/** The age of a log counts from its end; where only the day of the assessment is known, from that. */
export function toStabilityFact(row: AssessmentRow, site: CalendarIndex): StabilityFact {
  return {
    id: row.id,
    setTemperatureC: row.setTempMdegc / 1000,
    assessedAtMs: row.logToAt?.getTime() ?? startOfDayMs(site, row.assessedOn),
    hoursLogged: row.hoursLogged,
    driftKPerH: row.driftKPerH,
    halfBandK: row.halfBandK,
    periodS: row.periodS,
    resolutionK: row.resolutionK,
    sensorPlace: row.sensorPlace,
  };
}
