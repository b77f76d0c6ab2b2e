import type { SiteScope } from '#server/actor.ts';
import type { Reader } from '#server/db/client.ts';
import { getSitePolicy, getWorkingCalendar } from '#server/features/settings/settings.service.ts';
import { buildIndex } from '#shared/domain/availability/build-index.ts';
import { siteDay } from '#shared/domain/calendar/site-day.ts';
import type { CalendarIndex } from '#shared/domain/calendar/types.ts';
import type { Chamber, Facility, FacilityIndex, Room } from '#shared/domain/facility/types.ts';
import type { Span } from '#shared/domain/intervals/types.ts';
import { facilityPolicyOf } from '#shared/domain/policies/facility-policy-of.ts';
import type { SitePolicy } from '#shared/domain/policies/site-policy.ts';
import { loadCalibrationFacts } from './calibration-facts.ts';
import {
  listAssessments,
  listChamberSpecs,
  listChannels,
  listInstruments,
  listMappingDuties,
  listMeterRanges,
  listPanelMembers,
  listPositions,
  listSourceSpecs,
  listUnattendedPermissions,
} from './equipment.repository.ts';
import type { ChamberSpecRow, ChannelRow, InstrumentRow } from './equipment.repository.ts';
import { groupBy } from './group-by.ts';
import {
  listAllocations,
  listLoadMembers,
  listLoadPhases,
  listOtherWork,
  listUnavailabilities,
} from './plan.repository.ts';
import type { UnavailabilityRow } from './plan.repository.ts';
import { calendarOf } from './site-calendar.ts';
import {
  isRangeOf,
  stateOf,
  toMeterChannel,
  toPanels,
  toPosition,
  toSourceChannel,
  toStabilityFact,
  toUnattended,
} from './to-equipment.ts';
import { toLoads, toTaken, toUnavailable } from './to-plan.ts';

const dayMs = 86_400_000;

export type FacilityExtent = {
  /** What lies outside this time is left out. */
  readonly window: Span;
  /** Only these chambers, and what shares a limited room with them; all of the site by default. */
  readonly chamberIds?: readonly number[];
};

/** A facility as read at one moment, with its look-ups and the policy the server needs besides. */
export type LoadedFacility = { readonly index: FacilityIndex; readonly policy: SitePolicy };

/**
 * Reads what checks and search decide on. Inside a booking's transaction call it after the locks: it
 * then sees everything that was committed before them.
 */
export async function loadFacility(
  reader: Reader,
  site: Pick<SiteScope, 'id' | 'code' | 'name'>,
  extent: FacilityExtent,
): Promise<LoadedFacility> {
  const policy = await getSitePolicy({ db: reader }, site.id);
  const workingCalendar = await getWorkingCalendar({ db: reader }, site.id);
  const calendar = calendarOf(site.code, workingCalendar);
  const instruments = new Map(
    (await listInstruments(reader, site.id)).map((row) => [row.id, row] as const),
  );
  const specs = selectChambers(await listChamberSpecs(reader, site.id), instruments, extent);
  const chamberIds = specs.map((spec) => spec.instrumentId);
  const equipment = await readEquipment(reader, chamberIds, extent, calendar);
  const plan = await readPlan(reader, { chamberIds, instruments, ...equipment }, extent);
  const validity = await loadCalibrationFacts(reader, {
    site: calendar,
    sinceDay: siteDay(calendar, extent.window.startMs),
    channels: equipment.channels,
    ranges: equipment.ranges,
    chamberIds,
    unavailabilities: plan.unavailabilities,
    instrumentsAbove: (instrumentId) => chainOf(instruments, instrumentId),
  });
  const unitByChannel = new Map(equipment.channels.map((row) => [row.channelId, row.unitId]));
  const context = {
    instruments,
    pairedUnitOf: (channel: ChannelRow) => partnerOf(channel, unitByChannel),
    validityOf: validity.validityOf,
    limitationsOf: validity.limitationsOf,
  };
  const facility: Facility = {
    siteCode: site.code,
    siteName: site.name,
    calendar: workingCalendar,
    policy: facilityPolicyOf(policy),
    chambers: specs.map((spec) =>
      toChamber(spec, { instruments, calendar, ...equipment, ...plan, validity }),
    ),
    panels: toPanels(equipment.panelMembers),
    sourceChannels: equipment.channels
      .filter((row) => row.function === 'source')
      .flatMap((row) => toSourceChannel(row, equipment.sourceSpecs, context) ?? []),
    meterChannels: equipment.channels
      .filter((row) => row.function === 'measure')
      .map((row) =>
        toMeterChannel(
          row,
          equipment.ranges.filter((range) => isRangeOf(range, row)),
          context,
        ),
      ),
    positions: equipment.positions.map((row) =>
      toPosition(row, stateOf(instruments, row.chamberId)),
    ),
    allocations: plan.allocations.map(toTaken),
    unavailabilities: plan.unavailabilities.flatMap((row) =>
      toUnavailable(row, unitsUnder(row, instruments, equipment), calendar),
    ),
    rooms: limitedRooms(instruments),
  };
  return { index: { ...buildIndex(facility), calendar }, policy };
}

function selectChambers(
  specs: readonly ChamberSpecRow[],
  instruments: ReadonlyMap<number, InstrumentRow>,
  extent: FacilityExtent,
): readonly ChamberSpecRow[] {
  const { chamberIds } = extent;
  if (chamberIds === undefined) {
    return specs;
  }
  const rooms = new Set(chamberIds.map((id) => limitedRoomOf(instruments.get(id))));
  return specs.filter((spec) => {
    const room = limitedRoomOf(instruments.get(spec.instrumentId));
    return chamberIds.includes(spec.instrumentId) || (room !== null && rooms.has(room));
  });
}

function limitedRoomOf(instrument: InstrumentRow | undefined): string | null {
  return instrument === undefined || instrument.roomMaxEnergyWh === null
    ? null
    : instrument.roomName;
}

function limitedRooms(instruments: ReadonlyMap<number, InstrumentRow>): Room[] {
  const rooms = new Map<string, Room>();
  for (const { roomName, roomMaxEnergyWh } of instruments.values()) {
    if (roomName !== null && roomMaxEnergyWh !== null) {
      rooms.set(roomName, { name: roomName, maxEnergyWh: roomMaxEnergyWh });
    }
  }
  return [...rooms.values()];
}

async function readEquipment(
  reader: Reader,
  chamberIds: readonly number[],
  extent: FacilityExtent,
  calendar: CalendarIndex,
) {
  const positions = await listPositions(reader, chamberIds);
  const panelMembers = await listPanelMembers(reader, chamberIds);
  const channels = await listChannels(reader, chamberIds);
  const instrumentIds = distinct(channels.map((row) => row.instrumentId));
  // Logs count by their end, which lies before the day of the assessment: a year is the policy's most.
  const oldestDay = siteDay(calendar, extent.window.startMs - 400 * dayMs);
  return {
    positions,
    panelMembers,
    channels,
    ranges: await listMeterRanges(reader, instrumentIds),
    sourceSpecs: await listSourceSpecs(reader, instrumentIds),
    permissions: groupBy(
      await listUnattendedPermissions(reader, chamberIds),
      ({ permission }) => permission.chamberId,
    ),
    assessments: groupBy(
      await listAssessments(reader, chamberIds, oldestDay),
      (row) => row.chamberId,
    ),
    mappings: new Map(
      (await listMappingDuties(reader, chamberIds)).map((row) => [row.instrumentId, row.nextDueOn]),
    ),
  };
}
type Equipment = Awaited<ReturnType<typeof readEquipment>>;

async function readPlan(
  reader: Reader,
  places: Pick<Equipment, 'positions' | 'panelMembers' | 'channels'> & {
    readonly chamberIds: readonly number[];
    readonly instruments: ReadonlyMap<number, InstrumentRow>;
  },
  extent: FacilityExtent,
) {
  const unitIds = distinct([
    ...places.positions.map((row) => row.unitId),
    ...places.panelMembers.map((row) => row.unitId),
  ]);
  const instrumentIds = distinct(
    [...places.chamberIds, ...places.channels.map((row) => row.instrumentId)].flatMap((id) =>
      chainOf(places.instruments, id),
    ),
  );
  const phases = await listLoadPhases(reader, places.chamberIds, extent.window);
  const loadIds = distinct(phases.map((row) => row.loadId));
  return {
    allocations: await listAllocations(reader, unitIds, extent.window),
    unavailabilities: await listUnavailabilities(reader, { instrumentIds, unitIds }, extent.window),
    loads: toLoads(
      phases,
      await listLoadMembers(reader, loadIds),
      await listOtherWork(reader, loadIds),
    ),
  };
}
type Plan = Awaited<ReturnType<typeof readPlan>>;

function toChamber(
  spec: ChamberSpecRow,
  facts: Equipment &
    Plan & {
      readonly instruments: ReadonlyMap<number, InstrumentRow>;
      readonly calendar: CalendarIndex;
      readonly validity: Awaited<ReturnType<typeof loadCalibrationFacts>>;
    },
): Chamber {
  const id = spec.instrumentId;
  const instrument = facts.instruments.get(id);
  return {
    id,
    tag: instrument?.tag ?? '',
    roomName: instrument?.roomName ?? 'no room',
    state: stateOf(facts.instruments, id),
    minTemperatureC: spec.minSetTempMdegc / 1000,
    maxTemperatureC: spec.maxSetTempMdegc / 1000,
    idleTemperatureC: spec.idleTempMdegc / 1000,
    rampKPerMin: spec.rampKPerMin,
    strictDoor: spec.strict,
    protectionLevel: spec.protectionLevel,
    maxEnergyWh: spec.maxEnergyWh,
    maxCells: spec.maxCells,
    mappingDueOn: facts.mappings.get(id) ?? null,
    unattended: (facts.permissions.get(id) ?? []).map(toUnattended),
    assessments: (facts.assessments.get(id) ?? []).map((row) =>
      toStabilityFact(row, facts.calendar),
    ),
    loads: facts.loads.get(id) ?? [],
    validity: facts.validity.validityOf(id, {
      channelId: id,
      function: 'temperature',
      rangeId: null,
    }),
  };
}

/** The instrument and everything it is mounted in. */
function chainOf(instruments: ReadonlyMap<number, InstrumentRow>, instrumentId: number): number[] {
  const parentId = instruments.get(instrumentId)?.parentId ?? null;
  return parentId === null ? [instrumentId] : [instrumentId, ...chainOf(instruments, parentId)];
}

function partnerOf(channel: ChannelRow, unitByChannel: ReadonlyMap<number, number>): number | null {
  const { channelId, pairSourceId, pairMeterId } = channel;
  const partnerId = pairSourceId === channelId ? pairMeterId : pairSourceId;
  return partnerId === null ? null : (unitByChannel.get(partnerId) ?? null);
}

function unitsUnder(
  row: UnavailabilityRow,
  instruments: ReadonlyMap<number, InstrumentRow>,
  equipment: Pick<Equipment, 'positions' | 'channels'>,
): number[] {
  const { instrumentId, unitId } = row;
  if (instrumentId === null) {
    return unitId === null ? [] : [unitId];
  }
  const isUnder = (id: number) => chainOf(instruments, id).includes(instrumentId);
  return [
    ...equipment.positions.filter((position) => isUnder(position.chamberId)),
    ...equipment.channels.filter((channel) => isUnder(channel.instrumentId)),
  ].map((unit) => unit.unitId);
}

function distinct(ids: readonly number[]): number[] {
  return [...new Set(ids)];
}
