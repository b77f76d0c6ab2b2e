import { and, asc, desc, eq, ilike, inArray, isNull, lt, or, sql } from 'drizzle-orm';
import { alias } from 'drizzle-orm/pg-core';
import type { Reader, Tx } from '#server/db/client.ts';
import { allocationsTable } from '#server/db/tables/allocation.table.ts';
import { bookingsTable } from '#server/db/tables/booking.table.ts';
import {
  calibrationScopesTable,
  calibrationsTable,
  dutiesTable,
} from '#server/db/tables/calibration.table.ts';
import { channelsTable, meterRangesTable } from '#server/db/tables/channel.table.ts';
import { filesTable } from '#server/db/tables/file.table.ts';
import { instrumentsTable } from '#server/db/tables/instrument.table.ts';
import { personsTable } from '#server/db/tables/person.table.ts';
import { unitsTable } from '#server/db/tables/unit.table.ts';
import type { CalibrationState } from '#shared/domain/states.ts';

const c = calibrationsTable;

export async function listDutyRows(reader: Reader, siteId: number) {
  return reader
    .select({
      duty: dutiesTable,
      tag: instrumentsTable.tag,
      kind: instrumentsTable.kind,
      model: instrumentsTable.model,
      custodianName: personsTable.name,
      channelLabel: channelsTable.label,
      rangeLabel: meterRangesTable.label,
    })
    .from(dutiesTable)
    .innerJoin(instrumentsTable, eq(instrumentsTable.id, dutiesTable.instrumentId))
    .leftJoin(personsTable, eq(personsTable.id, dutiesTable.custodianId))
    .leftJoin(channelsTable, eq(channelsTable.id, dutiesTable.channelId))
    .leftJoin(meterRangesTable, eq(meterRangesTable.id, dutiesTable.meterRangeId))
    .where(
      and(
        eq(instrumentsTable.siteId, siteId),
        eq(dutiesTable.kind, 'calibration'),
        isNull(dutiesTable.endedAt),
        sql`${instrumentsTable.state} <> 'retired'`,
      ),
    )
    .orderBy(asc(instrumentsTable.tag), asc(dutiesTable.id));
}
export type DutyRecord = Awaited<ReturnType<typeof listDutyRows>>[number];

/** The latest record of each instrument and state that matters to the due list. */
export async function listNewestRecords(reader: Reader, siteId: number) {
  return reader
    .selectDistinctOn([c.instrumentId, c.state], {
      instrumentId: c.instrumentId,
      state: c.state,
      id: c.id,
    })
    .from(c)
    .innerJoin(instrumentsTable, eq(instrumentsTable.id, c.instrumentId))
    .where(
      and(eq(instrumentsTable.siteId, siteId), inArray(c.state, ['approved', 'awaiting-approval'])),
    )
    .orderBy(asc(c.instrumentId), asc(c.state), desc(c.performedOn), desc(c.id));
}

/** Bookings to come over each instrument, with the end of what they hold of it. */
export async function listBookingsByInstrument(reader: Reader, siteId: number, now: Date) {
  return reader
    .select({
      instrumentId: unitsTable.instrumentId,
      bookingId: bookingsTable.id,
      isAtRisk: bookingsTable.atRisk,
      endsAt: sql<Date>`max(upper(${allocationsTable.during}))`.mapWith(
        (value: string) => new Date(value),
      ),
    })
    .from(allocationsTable)
    .innerJoin(unitsTable, eq(unitsTable.id, allocationsTable.unitId))
    .innerJoin(bookingsTable, eq(bookingsTable.id, allocationsTable.bookingId))
    .where(
      and(
        eq(bookingsTable.siteId, siteId),
        eq(allocationsTable.live, true),
        inArray(bookingsTable.state, ['tentative', 'confirmed', 'running']),
        sql`upper(${allocationsTable.during}) > ${now.toISOString()}`,
      ),
    )
    .groupBy(unitsTable.instrumentId, bookingsTable.id);
}

const recorder = alias(personsTable, 'recorder');
const decider = alias(personsTable, 'decider');

function recordRows(reader: Reader) {
  return reader
    .select({
      record: c,
      tag: instrumentsTable.tag,
      model: instrumentsTable.model,
      siteId: instrumentsTable.siteId,
      recordedBy: recorder.name,
      decidedBy: decider.name,
      replacedById: sql<
        number | null
      >`(select max(newer.id) from calibration newer where newer.replaces_id = ${c.id} and newer.state in ('approved', 'replaced'))`,
      file: {
        id: filesTable.id,
        name: filesTable.name,
        mediaType: filesTable.mediaType,
        sizeBytes: filesTable.sizeBytes,
        sha256: filesTable.sha256,
      },
    })
    .from(c)
    .innerJoin(instrumentsTable, eq(instrumentsTable.id, c.instrumentId))
    .innerJoin(recorder, eq(recorder.id, c.recordedById))
    .leftJoin(decider, eq(decider.id, c.decidedById))
    .leftJoin(filesTable, eq(filesTable.id, c.fileId));
}

export async function findRecord(reader: Reader, siteId: number, id: number) {
  const [row] = await recordRows(reader).where(
    and(eq(instrumentsTable.siteId, siteId), eq(c.id, id)),
  );
  return row;
}
export type RecordRow = NonNullable<Awaited<ReturnType<typeof findRecord>>>;

export type RecordFilter = {
  readonly siteId: number;
  readonly states?: readonly CalibrationState[];
  readonly tag?: string;
  readonly text?: string;
};

export async function listRecords(
  reader: Reader,
  filter: RecordFilter,
  afterId: number | undefined,
  limit: number,
): Promise<RecordRow[]> {
  const pattern = `%${(filter.text ?? '').trim().replaceAll(/[\\%_]/g, '\\$&')}%`;
  return recordRows(reader)
    .where(
      and(
        eq(instrumentsTable.siteId, filter.siteId),
        filter.states === undefined ? undefined : inArray(c.state, [...filter.states]),
        filter.tag === undefined ? undefined : eq(instrumentsTable.tag, filter.tag),
        filter.text === undefined
          ? undefined
          : or(
              ilike(instrumentsTable.tag, pattern),
              ilike(instrumentsTable.model, pattern),
              ilike(c.certificateNumber, pattern),
              ilike(c.provider, pattern),
            ),
        afterId === undefined ? undefined : lt(c.id, afterId),
      ),
    )
    .orderBy(desc(c.id))
    .limit(limit);
}

export async function listScopes(reader: Reader, calibrationId: number) {
  const s = calibrationScopesTable;
  return reader
    .select({
      channelId: s.channelId,
      function: s.function,
      meterRangeId: s.meterRangeId,
      limitation: s.limitation,
      channelLabel: channelsTable.label,
      rangeLabel: meterRangesTable.label,
    })
    .from(s)
    .leftJoin(channelsTable, eq(channelsTable.id, s.channelId))
    .leftJoin(meterRangesTable, eq(meterRangesTable.id, s.meterRangeId))
    .where(eq(s.calibrationId, calibrationId))
    .orderBy(asc(s.id));
}
export type ScopeRow = Awaited<ReturnType<typeof listScopes>>[number];

type NewRecord = typeof c.$inferInsert;
type NewScope = Omit<typeof calibrationScopesTable.$inferInsert, 'id' | 'calibrationId'>;

export async function insertRecord(
  tx: Tx,
  record: NewRecord,
  scopes: readonly NewScope[],
): Promise<number> {
  const [made] = await tx.insert(c).values(record).returning({ id: c.id });
  if (made === undefined) {
    throw new Error('No calibration was recorded.');
  }
  await tx
    .insert(calibrationScopesTable)
    .values(scopes.map((scope) => ({ ...scope, calibrationId: made.id })));
  return made.id;
}

/** False where the record is no longer at the version seen. */
export async function updateRecord(
  tx: Tx,
  seen: { readonly id: number; readonly version: number },
  change: Partial<NewRecord>,
  at: Date,
): Promise<boolean> {
  const rows = await tx
    .update(c)
    .set({ ...change, updatedAt: at, version: sql`${c.version} + 1` })
    .where(and(eq(c.id, seen.id), eq(c.version, seen.version)))
    .returning({ id: c.id });
  return rows.length === 1;
}

/** False where it is not approved any more: another record has replaced it already. */
export async function markReplaced(tx: Tx, id: number, at: Date): Promise<boolean> {
  const rows = await tx
    .update(c)
    .set({ state: 'replaced', updatedAt: at, version: sql`${c.version} + 1` })
    .where(and(eq(c.id, id), eq(c.state, 'approved')))
    .returning({ id: c.id });
  return rows.length === 1;
}

const d = dutiesTable;

export async function listDutiesOf(reader: Reader, instrumentId: number) {
  return reader
    .select()
    .from(d)
    .where(and(eq(d.instrumentId, instrumentId), eq(d.kind, 'calibration'), isNull(d.endedAt)))
    .orderBy(asc(d.id));
}

export async function updateDutyDueDay(
  tx: Tx,
  dutyId: number,
  nextDueOn: string,
  at: Date,
): Promise<void> {
  await tx
    .update(d)
    .set({ nextDueOn, updatedAt: at, version: sql`${d.version} + 1` })
    .where(eq(d.id, dutyId));
}
