import type { Reader } from '#server/db/client.ts';
import type { CalendarIndex } from '#shared/domain/calendar/types.ts';
import type { ValidityKey } from '#shared/domain/calibration-validity/types.ts';
import type { ValiditySpan } from '#shared/domain/facility/types.ts';
import {
  listApprovedCalibrations,
  listCalibrationScopes,
  listLimitations,
} from './calibration-records.repository.ts';
import type { LimitationRow } from './calibration-records.repository.ts';
import type { ChannelRow, MeterRangeRow } from './equipment.repository.ts';
import { groupBy } from './group-by.ts';
import type { UnavailabilityRow } from './plan.repository.ts';
import { buildValidity, toBreaks } from './to-validity.ts';

export type CalibrationFacts = {
  readonly validityOf: (instrumentId: number, key: ValidityKey) => readonly ValiditySpan[];
  readonly limitationsOf: (unitId: number) => readonly LimitationRow[];
};

/** Reads the calibration records of channels and chambers and works out what they vouch for. */
export async function loadCalibrationFacts(
  reader: Reader,
  input: {
    readonly site: CalendarIndex;
    /** Records that no longer matter on this day are left out. */
    readonly sinceDay: string;
    readonly channels: readonly ChannelRow[];
    readonly ranges: readonly MeterRangeRow[];
    readonly chamberIds: readonly number[];
    readonly unavailabilities: readonly UnavailabilityRow[];
    readonly instrumentsAbove: (instrumentId: number) => readonly number[];
  },
): Promise<CalibrationFacts> {
  const channelsOf = groupBy(input.channels, (row) => row.instrumentId);
  const rangesOf = groupBy(input.ranges, (row) => row.instrumentId);
  const instrumentIds = [...channelsOf.keys(), ...input.chamberIds];
  const calibrations = await listApprovedCalibrations(reader, instrumentIds, input.sinceDay);
  const scopes = groupBy(
    await listCalibrationScopes(
      reader,
      calibrations.map((row) => row.id),
    ),
    (row) => row.calibrationId,
  );
  const limitations = groupBy(
    await listLimitations(
      reader,
      input.channels.map((row) => row.unitId),
    ),
    (row) => row.unitId,
  );
  const calibrationsOf = groupBy(calibrations, (row) => row.instrumentId);
  const channelIdOfUnit = new Map(input.channels.map((row) => [row.unitId, row.channelId]));
  const known = new Map<number, (key: ValidityKey) => readonly ValiditySpan[]>();
  const build = (instrumentId: number) => {
    const channels = channelsOf.get(instrumentId) ?? [];
    const above = input.instrumentsAbove(instrumentId);
    const unitIds = new Set(channels.map((row) => row.unitId));
    return buildValidity({
      instrumentId,
      things: toThings(channels, rangesOf.get(instrumentId) ?? []),
      calibrations: calibrationsOf.get(instrumentId) ?? [],
      scopes,
      breaks: toBreaks(
        input.unavailabilities.filter(
          (row) =>
            (row.instrumentId !== null && above.includes(row.instrumentId)) ||
            (row.unitId !== null && unitIds.has(row.unitId)),
        ),
        (unitId) => channelIdOfUnit.get(unitId) ?? null,
      ),
      site: input.site,
    });
  };
  return {
    validityOf: (instrumentId, key) => {
      const validity = known.get(instrumentId) ?? build(instrumentId);
      known.set(instrumentId, validity);
      return validity(key);
    },
    limitationsOf: (unitId) => limitations.get(unitId) ?? [],
  };
}

function toThings(channels: readonly ChannelRow[], ranges: readonly MeterRangeRow[]) {
  const meters = channels.filter((row) => row.function === 'measure');
  return {
    sourceChannelIds: channels
      .filter((row) => row.function === 'source')
      .map((row) => row.channelId),
    meterChannelIds: meters.map((row) => row.channelId),
    rangeIdsByChannel: new Map(
      meters.map((meter) => [
        meter.channelId,
        ranges
          .filter((range) => range.channelId === null || range.channelId === meter.channelId)
          .map((range) => range.id),
      ]),
    ),
  };
}
