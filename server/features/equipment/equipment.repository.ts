import { and, asc, desc, eq, inArray, isNull, or, sql } from 'drizzle-orm';
import type { Reader, Tx } from '#server/db/client.ts';
import { calibrationsTable } from '#server/db/tables/calibration.table.ts';
import { chamberPositionsTable, chamberSpecsTable } from '#server/db/tables/chamber.table.ts';
import {
  channelsTable,
  meterRangesTable,
  sourceSpecsTable,
} from '#server/db/tables/channel.table.ts';
import { instrumentsTable } from '#server/db/tables/instrument.table.ts';
import { unavailabilitiesTable } from '#server/db/tables/outage.table.ts';
import { personsTable } from '#server/db/tables/person.table.ts';
import { roomsTable } from '#server/db/tables/site.table.ts';
import { stabilityAssessmentsTable } from '#server/db/tables/stability-assessment.table.ts';
import { unitsTable } from '#server/db/tables/unit.table.ts';

const t = instrumentsTable;

function instrumentRows(reader: Reader) {
  return reader
    .select({
      instrument: t,
      roomName: roomsTable.name,
      custodianName: personsTable.name,
      /** Channels, or positions of a chamber. */
      unitCount: sql<number>`(select count(*) from ${unitsTable} where ${unitsTable.instrumentId} = ${t.id})::int`,
    })
    .from(t)
    .leftJoin(roomsTable, eq(roomsTable.id, t.roomId))
    .leftJoin(personsTable, eq(personsTable.id, t.custodianId));
}

export async function listRegister(reader: Reader, siteId: number) {
  return instrumentRows(reader).where(eq(t.siteId, siteId)).orderBy(asc(t.tag));
}
export type RegisterRow = Awaited<ReturnType<typeof listRegister>>[number];

export async function findByTag(reader: Reader, siteId: number, tag: string) {
  const [row] = await instrumentRows(reader).where(and(eq(t.siteId, siteId), eq(t.tag, tag)));
  return row;
}

export async function listRelatives(reader: Reader, instrument: RegisterRow['instrument']) {
  const { id, parentId } = instrument;
  const rows = await reader
    .select({ id: t.id, tag: t.tag })
    .from(t)
    .where(or(eq(t.parentId, id), parentId === null ? undefined : eq(t.id, parentId)))
    .orderBy(asc(t.tag));
  return {
    parentTag: rows.find((row) => row.id === parentId)?.tag ?? null,
    childTags: rows.filter((row) => row.id !== parentId).map((row) => row.tag),
  };
}

export async function getSpecs(reader: Reader, instrumentId: number) {
  const [chamber] = await reader
    .select()
    .from(chamberSpecsTable)
    .where(eq(chamberSpecsTable.instrumentId, instrumentId));
  return {
    chamber: chamber ?? null,
    positions: await reader
      .select()
      .from(chamberPositionsTable)
      .where(eq(chamberPositionsTable.chamberId, instrumentId))
      .orderBy(asc(chamberPositionsTable.id)),
    sources: await reader
      .select({ spec: sourceSpecsTable, channelLabel: channelsTable.label })
      .from(sourceSpecsTable)
      .leftJoin(channelsTable, eq(channelsTable.id, sourceSpecsTable.channelId))
      .where(eq(sourceSpecsTable.instrumentId, instrumentId))
      .orderBy(asc(sourceSpecsTable.id)),
    ranges: await reader
      .select({ range: meterRangesTable, channelLabel: channelsTable.label })
      .from(meterRangesTable)
      .leftJoin(channelsTable, eq(channelsTable.id, meterRangesTable.channelId))
      .where(eq(meterRangesTable.instrumentId, instrumentId))
      .orderBy(asc(meterRangesTable.fullScaleA), asc(meterRangesTable.id)),
  };
}
export type Specs = Awaited<ReturnType<typeof getSpecs>>;

export async function listCalibrationRows(reader: Reader, instrumentId: number) {
  return reader
    .select()
    .from(calibrationsTable)
    .where(eq(calibrationsTable.instrumentId, instrumentId))
    .orderBy(desc(calibrationsTable.performedOn), desc(calibrationsTable.id))
    .limit(100);
}
export type CalibrationRecord = Awaited<ReturnType<typeof listCalibrationRows>>[number];

export async function listAssessmentRows(reader: Reader, chamberId: number) {
  return reader
    .select({ assessment: stabilityAssessmentsTable, assessedBy: personsTable.name })
    .from(stabilityAssessmentsTable)
    .innerJoin(personsTable, eq(personsTable.id, stabilityAssessmentsTable.assessedById))
    .where(eq(stabilityAssessmentsTable.chamberId, chamberId))
    .orderBy(
      desc(stabilityAssessmentsTable.assessedOn),
      asc(stabilityAssessmentsTable.setTempMdegc),
      desc(stabilityAssessmentsTable.id),
    )
    .limit(100);
}
export type AssessmentRecord = Awaited<ReturnType<typeof listAssessmentRows>>[number];

/** What is not usable now or will not be: of the instrument, its units and what it is mounted in. */
export async function listOpenUnavailability(
  reader: Reader,
  instrumentIds: readonly number[],
  at: Date,
) {
  const u = unavailabilitiesTable;
  const units = reader
    .select({ id: unitsTable.id })
    .from(unitsTable)
    .where(inArray(unitsTable.instrumentId, [...instrumentIds]));
  return reader
    .select({ row: u, reportedBy: personsTable.name })
    .from(u)
    .innerJoin(personsTable, eq(personsTable.id, u.reportedById))
    .where(
      and(
        or(inArray(u.instrumentId, [...instrumentIds]), inArray(u.unitId, units)),
        or(isNull(u.endsAt), sql`${u.endsAt} > ${at.toISOString()}`),
      ),
    )
    .orderBy(asc(u.startsAt), asc(u.id));
}
export type UnavailabilityRecord = Awaited<ReturnType<typeof listOpenUnavailability>>[number];

/** False where the row is no longer at the version seen. */
export async function updateInstrumentState(
  tx: Tx,
  seen: { readonly id: number; readonly version: number },
  change: Pick<typeof t.$inferInsert, 'state' | 'releasedById' | 'releasedAt'>,
  at: Date,
): Promise<boolean> {
  const rows = await tx
    .update(t)
    .set({ ...change, updatedAt: at, version: sql`${t.version} + 1` })
    .where(and(eq(t.id, seen.id), eq(t.version, seen.version)))
    .returning({ id: t.id });
  return rows.length === 1;
}

type NewUnavailability = typeof unavailabilitiesTable.$inferInsert;

export async function insertUnavailability(tx: Tx, row: NewUnavailability): Promise<number> {
  const [made] = await tx
    .insert(unavailabilitiesTable)
    .values(row)
    .returning({ id: unavailabilitiesTable.id });
  if (made === undefined) {
    throw new Error('No unavailability was written.');
  }
  return made.id;
}

/** Ends what is open on the instrument itself and its units; gives how many there were. */
export async function endUnavailability(
  tx: Tx,
  instrumentId: number,
  endedById: number,
  at: Date,
): Promise<number> {
  const open = await listOpenUnavailability(tx, [instrumentId], at);
  const ids = open.map(({ row }) => row.id);
  if (ids.length > 0) {
    // What was announced for later has not begun: it ends where it would have started.
    await tx
      .update(unavailabilitiesTable)
      .set({
        endsAt: sql`greatest(${unavailabilitiesTable.startsAt}, ${at.toISOString()}::timestamptz)`,
        endedById,
        updatedAt: at,
        version: sql`${unavailabilitiesTable.version} + 1`,
      })
      .where(inArray(unavailabilitiesTable.id, ids));
  }
  return ids.length;
}

export async function insertAssessment(
  tx: Tx,
  row: typeof stabilityAssessmentsTable.$inferInsert,
): Promise<number> {
  const [made] = await tx
    .insert(stabilityAssessmentsTable)
    .values(row)
    .returning({ id: stabilityAssessmentsTable.id });
  if (made === undefined) {
    throw new Error('No assessment was written.');
  }
  return made.id;
}

export async function listUnitIds(reader: Reader, instrumentId: number) {
  return reader
    .select({
      unitId: unitsTable.id,
      label: sql<string>`coalesce(${channelsTable.label}, ${chamberPositionsTable.label})`,
    })
    .from(unitsTable)
    .leftJoin(channelsTable, eq(channelsTable.id, unitsTable.channelId))
    .leftJoin(chamberPositionsTable, eq(chamberPositionsTable.id, unitsTable.positionId))
    .where(eq(unitsTable.instrumentId, instrumentId))
    .orderBy(asc(unitsTable.id));
}
