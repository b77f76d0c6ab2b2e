import { and, asc, eq, inArray, isNull, sql } from 'drizzle-orm';
import type { Reader } from '#server/db/client.ts';
import { dutiesTable } from '#server/db/tables/calibration.table.ts';
import { cellTypesTable } from '#server/db/tables/cell.table.ts';
import { chamberPositionsTable, chamberSpecsTable } from '#server/db/tables/chamber.table.ts';
import {
  channelPairsTable,
  channelsTable,
  meterRangesTable,
  sourceSpecsTable,
} from '#server/db/tables/channel.table.ts';
import { instrumentsTable } from '#server/db/tables/instrument.table.ts';
import { panelMembersTable, panelsTable } from '#server/db/tables/panel.table.ts';
import { roomsTable } from '#server/db/tables/site.table.ts';
import { stabilityAssessmentsTable } from '#server/db/tables/stability-assessment.table.ts';
import { unattendedPermissionsTable, unitsTable } from '#server/db/tables/unit.table.ts';

/** Every instrument of a site, mainframes included: what befalls one may befall those below it. */
export async function listInstruments(reader: Reader, siteId: number) {
  return reader
    .select({
      id: instrumentsTable.id,
      tag: instrumentsTable.tag,
      kind: instrumentsTable.kind,
      state: instrumentsTable.state,
      parentId: instrumentsTable.parentId,
      roomName: roomsTable.name,
      roomMaxEnergyWh: roomsTable.maxEnergyWh,
    })
    .from(instrumentsTable)
    .leftJoin(roomsTable, eq(roomsTable.id, instrumentsTable.roomId))
    .where(eq(instrumentsTable.siteId, siteId))
    .orderBy(asc(instrumentsTable.id));
}
export type InstrumentRow = Awaited<ReturnType<typeof listInstruments>>[number];

export async function listChamberSpecs(reader: Reader, siteId: number) {
  const rows = await reader
    .select({ spec: chamberSpecsTable })
    .from(chamberSpecsTable)
    .innerJoin(instrumentsTable, eq(instrumentsTable.id, chamberSpecsTable.instrumentId))
    .where(eq(instrumentsTable.siteId, siteId))
    .orderBy(asc(instrumentsTable.tag));
  return rows.map(({ spec }) => spec);
}
export type ChamberSpecRow = Awaited<ReturnType<typeof listChamberSpecs>>[number];

export async function listPositions(reader: Reader, chamberIds: readonly number[]) {
  return reader
    .select({
      unitId: unitsTable.id,
      label: chamberPositionsTable.label,
      chamberId: chamberPositionsTable.chamberId,
      formats: chamberPositionsTable.formats,
      maxAh: chamberPositionsTable.maxAh,
      maxHazard: chamberPositionsTable.maxHazard,
      holderFactor: chamberPositionsTable.holderFactor,
    })
    .from(chamberPositionsTable)
    .innerJoin(unitsTable, eq(unitsTable.positionId, chamberPositionsTable.id))
    .where(inArray(chamberPositionsTable.chamberId, [...chamberIds]))
    .orderBy(asc(chamberPositionsTable.id));
}
export type PositionRow = Awaited<ReturnType<typeof listPositions>>[number];

/** One row per member; a panel without members has none. */
export async function listPanelMembers(reader: Reader, chamberIds: readonly number[]) {
  return reader
    .select({
      panelId: panelsTable.id,
      name: panelsTable.name,
      chamberId: panelsTable.chamberId,
      leadResistanceOhm: panelsTable.leadResistanceOhm,
      guarded: panelsTable.guarded,
      unitId: unitsTable.id,
      unitKind: unitsTable.kind,
    })
    .from(panelsTable)
    .innerJoin(panelMembersTable, eq(panelMembersTable.panelId, panelsTable.id))
    .innerJoin(unitsTable, eq(unitsTable.id, panelMembersTable.unitId))
    .where(inArray(panelsTable.chamberId, [...chamberIds]))
    .orderBy(asc(panelsTable.id), asc(unitsTable.id));
}
export type PanelMemberRow = Awaited<ReturnType<typeof listPanelMembers>>[number];

/** The channels that the panels of the chambers can reach, each with its partner if it has one. */
export async function listChannels(reader: Reader, chamberIds: readonly number[]) {
  const reached = reader
    .select({ unitId: panelMembersTable.unitId })
    .from(panelMembersTable)
    .innerJoin(panelsTable, eq(panelsTable.id, panelMembersTable.panelId))
    .where(inArray(panelsTable.chamberId, [...chamberIds]));
  return reader
    .select({
      unitId: unitsTable.id,
      channelId: channelsTable.id,
      label: channelsTable.label,
      function: channelsTable.function,
      instrumentId: channelsTable.instrumentId,
      pairSourceId: channelPairsTable.sourceChannelId,
      pairMeterId: channelPairsTable.meterChannelId,
    })
    .from(channelsTable)
    .innerJoin(unitsTable, eq(unitsTable.channelId, channelsTable.id))
    .leftJoin(
      channelPairsTable,
      sql`${channelsTable.id} in (${channelPairsTable.sourceChannelId}, ${channelPairsTable.meterChannelId})`,
    )
    .where(inArray(unitsTable.id, reached))
    .orderBy(asc(channelsTable.id));
}
export type ChannelRow = Awaited<ReturnType<typeof listChannels>>[number];

export async function listMeterRanges(reader: Reader, instrumentIds: readonly number[]) {
  return reader
    .select()
    .from(meterRangesTable)
    .where(inArray(meterRangesTable.instrumentId, [...instrumentIds]))
    .orderBy(asc(meterRangesTable.fullScaleA), asc(meterRangesTable.id));
}
export type MeterRangeRow = Awaited<ReturnType<typeof listMeterRanges>>[number];

export async function listSourceSpecs(reader: Reader, instrumentIds: readonly number[]) {
  return reader
    .select()
    .from(sourceSpecsTable)
    .where(inArray(sourceSpecsTable.instrumentId, [...instrumentIds]));
}
export type SourceSpecRow = Awaited<ReturnType<typeof listSourceSpecs>>[number];

export async function listUnattendedPermissions(reader: Reader, chamberIds: readonly number[]) {
  return reader
    .select({ permission: unattendedPermissionsTable, cellTypeName: cellTypesTable.name })
    .from(unattendedPermissionsTable)
    .leftJoin(cellTypesTable, eq(cellTypesTable.id, unattendedPermissionsTable.cellTypeId))
    .where(inArray(unattendedPermissionsTable.chamberId, [...chamberIds]))
    .orderBy(asc(unattendedPermissionsTable.id));
}
export type UnattendedRow = Awaited<ReturnType<typeof listUnattendedPermissions>>[number];

/** Assessments old enough to count for no policy are left out. */
export async function listAssessments(
  reader: Reader,
  chamberIds: readonly number[],
  sinceDay: string,
) {
  const t = stabilityAssessmentsTable;
  return reader
    .select()
    .from(t)
    .where(and(inArray(t.chamberId, [...chamberIds]), sql`${t.assessedOn} >= ${sinceDay}`))
    .orderBy(asc(t.assessedOn), asc(t.id));
}
export type AssessmentRow = Awaited<ReturnType<typeof listAssessments>>[number];

export async function listMappingDuties(reader: Reader, chamberIds: readonly number[]) {
  return reader
    .select({ instrumentId: dutiesTable.instrumentId, nextDueOn: dutiesTable.nextDueOn })
    .from(dutiesTable)
    .where(
      and(
        inArray(dutiesTable.instrumentId, [...chamberIds]),
        eq(dutiesTable.kind, 'mapping'),
        isNull(dutiesTable.endedAt),
      ),
    );
}
export type MappingDutyRow = Awaited<ReturnType<typeof listMappingDuties>>[number];
