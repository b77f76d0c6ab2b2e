import { and, asc, desc, eq, exists, gt, inArray, lt, or, sql, type SQL } from 'drizzle-orm';
import type { Reader } from '#server/db/client.ts';
import { formatRange } from '#server/db/range-text.ts';
import { allocationsTable } from '#server/db/tables/allocation.table.ts';
import { bookingCellsTable, bookingsTable } from '#server/db/tables/booking.table.ts';
import { cellTypesTable, cellsTable } from '#server/db/tables/cell.table.ts';
import { chamberPositionsTable } from '#server/db/tables/chamber.table.ts';
import { channelsTable, meterRangesTable } from '#server/db/tables/channel.table.ts';
import { checkResultsTable, deviationsTable } from '#server/db/tables/check-result.table.ts';
import { instrumentsTable } from '#server/db/tables/instrument.table.ts';
import { chamberLoadsTable, loadPhasesTable } from '#server/db/tables/load.table.ts';
import { panelsTable } from '#server/db/tables/panel.table.ts';
import { personsTable } from '#server/db/tables/person.table.ts';
import { projectsTable } from '#server/db/tables/project.table.ts';
import { requestLotsTable, requestsTable } from '#server/db/tables/request.table.ts';
import { unitsTable } from '#server/db/tables/unit.table.ts';
import type { Span } from '#shared/domain/intervals/types.ts';
import type { BookingState } from '#shared/domain/states.ts';

const t = bookingsTable;

function bookingRows(reader: Reader) {
  return reader
    .select({
      booking: t,
      requesterId: requestsTable.requesterId,
      requesterName: personsTable.name,
      kind: requestsTable.kind,
      cellCount: requestLotsTable.cellCount,
      cellTypeName: cellTypesTable.name,
      projectName: projectsTable.name,
      chamberId: chamberLoadsTable.chamberId,
      chamberTag: instrumentsTable.tag,
      setTempMdegc: chamberLoadsTable.setTempMdegc,
      loadState: chamberLoadsTable.state,
    })
    .from(t)
    .innerJoin(requestsTable, eq(requestsTable.id, t.requestId))
    .innerJoin(personsTable, eq(personsTable.id, requestsTable.requesterId))
    .innerJoin(requestLotsTable, eq(requestLotsTable.id, t.lotId))
    .leftJoin(cellTypesTable, eq(cellTypesTable.id, requestLotsTable.cellTypeId))
    .innerJoin(projectsTable, eq(projectsTable.id, t.projectId))
    .innerJoin(chamberLoadsTable, eq(chamberLoadsTable.id, t.loadId))
    .innerJoin(instrumentsTable, eq(instrumentsTable.id, chamberLoadsTable.chamberId));
}
export type BookingRecord = Awaited<ReturnType<typeof listBookingsOfLoad>>[number];

export async function findBooking(reader: Reader, siteId: number, bookingId: number) {
  const [row] = await bookingRows(reader).where(and(eq(t.siteId, siteId), eq(t.id, bookingId)));
  return row;
}

export async function listBookingsOfLoad(reader: Reader, loadId: number) {
  return bookingRows(reader).where(eq(t.loadId, loadId)).orderBy(asc(t.id));
}

export async function listBookingsByIds(
  reader: Reader,
  siteId: number,
  bookingIds: readonly number[],
) {
  return bookingRows(reader)
    .where(and(eq(t.siteId, siteId), inArray(t.id, [...bookingIds])))
    .orderBy(asc(sql`lower(${t.during})`), asc(t.id));
}

export async function findLiveBookingOfLot(reader: Reader, lotId: number) {
  const [row] = await reader
    .select({ id: t.id })
    .from(t)
    .where(and(eq(t.lotId, lotId), inArray(t.state, ['tentative', 'confirmed', 'running', 'done'])))
    .orderBy(asc(t.id))
    .limit(1);
  return row;
}

export type BookingFilter = {
  readonly siteId: number;
  readonly states?: readonly BookingState[];
  readonly isAtRisk?: boolean;
  readonly requesterId?: number;
  readonly window?: Span;
  /** Of a chamber, an instrument, a channel or a position. */
  readonly tag?: string;
};

export async function listBookingRecords(
  reader: Reader,
  filter: BookingFilter,
  sort: 'start' | 'newest',
  after: { readonly startMs: number; readonly id: number } | undefined,
  limit: number,
) {
  const start = sql`lower(${t.during})`;
  const goesOn =
    after === undefined
      ? undefined
      : sort === 'newest'
        ? lt(t.id, after.id)
        : sql`(${start}, ${t.id}) > (${new Date(after.startMs).toISOString()}::timestamptz, ${after.id})`;
  return bookingRows(reader)
    .where(and(...conditionsOf(reader, filter), goesOn))
    .orderBy(...(sort === 'newest' ? [desc(t.id)] : [asc(start), asc(t.id)]))
    .limit(limit);
}

function conditionsOf(reader: Reader, filter: BookingFilter): (SQL | undefined)[] {
  const { states, isAtRisk, requesterId, window, tag } = filter;
  return [
    eq(t.siteId, filter.siteId),
    states === undefined ? undefined : inArray(t.state, [...states]),
    isAtRisk === undefined ? undefined : eq(t.atRisk, isAtRisk),
    requesterId === undefined ? undefined : eq(requestsTable.requesterId, requesterId),
    window === undefined ? undefined : sql`${t.during} && ${formatRange(window)}::tstzrange`,
    tag === undefined
      ? undefined
      : or(eq(instrumentsTable.tag, tag), exists(unitsWithTag(reader, tag))),
  ];
}

function unitsWithTag(reader: Reader, tag: string) {
  const below = `${tag}/%`;
  return reader
    .select({ id: allocationsTable.id })
    .from(allocationsTable)
    .innerJoin(unitsTable, eq(unitsTable.id, allocationsTable.unitId))
    .leftJoin(channelsTable, eq(channelsTable.id, unitsTable.channelId))
    .leftJoin(chamberPositionsTable, eq(chamberPositionsTable.id, unitsTable.positionId))
    .where(
      and(
        eq(allocationsTable.bookingId, t.id),
        sql`(coalesce(${channelsTable.label}, ${chamberPositionsTable.label}) = ${tag} or coalesce(${channelsTable.label}, ${chamberPositionsTable.label}) like ${below})`,
      ),
    );
}

/** The paths of a booking with the cell on each, in the order of its cells. */
export async function listBookingPaths(reader: Reader, bookingIds: readonly number[]) {
  if (bookingIds.length === 0) {
    return [];
  }
  const c = bookingCellsTable;
  const label = (unitId: SQL) =>
    sql<string>`(select coalesce(ch.label, po.label) from unit u left join channel ch on ch.id = u.channel_id left join chamber_position po on po.id = u.position_id where u.id = ${unitId})`;
  return reader
    .select({
      bookingId: c.bookingId,
      cellId: c.cellId,
      serial: cellsTable.serial,
      panelId: c.panelId,
      panelName: panelsTable.name,
      sourceUnitId: c.sourceUnitId,
      sourceTag: label(sql`${c.sourceUnitId}`),
      meterUnitId: c.meterUnitId,
      meterTag: label(sql`${c.meterUnitId}`),
      meterRangeId: c.meterRangeId,
      meterRangeLabel: meterRangesTable.label,
      positionUnitId: c.positionUnitId,
      positionTag: label(sql`${c.positionUnitId}`),
    })
    .from(c)
    .innerJoin(cellsTable, eq(cellsTable.id, c.cellId))
    .innerJoin(panelsTable, eq(panelsTable.id, c.panelId))
    .innerJoin(meterRangesTable, eq(meterRangesTable.id, c.meterRangeId))
    .where(inArray(c.bookingId, [...bookingIds]))
    .orderBy(asc(c.bookingId), asc(c.id));
}
export type BookingPathRow = Awaited<ReturnType<typeof listBookingPaths>>[number];

export async function listPhasesOfLoads(reader: Reader, loadIds: readonly number[]) {
  if (loadIds.length === 0) {
    return [];
  }
  return reader
    .select()
    .from(loadPhasesTable)
    .where(inArray(loadPhasesTable.loadId, [...loadIds]))
    .orderBy(asc(loadPhasesTable.loadId), asc(loadPhasesTable.seq));
}
export type LoadPhaseRecord = Awaited<ReturnType<typeof listPhasesOfLoads>>[number];

/** The checks of the latest time they were run at confirmation or move. */
export async function listConfirmedChecks(reader: Reader, bookingId: number) {
  const c = checkResultsTable;
  const latest = reader
    .select({ at: sql`max(${c.runAt})` })
    .from(c)
    .where(and(eq(c.bookingId, bookingId), eq(c.stage, 'confirm')));
  return reader
    .select()
    .from(c)
    .where(and(eq(c.bookingId, bookingId), eq(c.stage, 'confirm'), eq(c.runAt, latest)))
    .orderBy(asc(c.id));
}
export type CheckResultRow = Awaited<ReturnType<typeof listConfirmedChecks>>[number];

/** Deviations granted for a booking itself or for its request. */
export async function listDeviationsOf(
  reader: Reader,
  of: { readonly bookingId: number; readonly requestId: number },
) {
  const d = deviationsTable;
  return reader
    .select({
      id: d.id,
      code: d.checkCode,
      reason: d.reason,
      grantedBy: sql<string>`coalesce(${personsTable.name}, '')`,
    })
    .from(d)
    .leftJoin(personsTable, eq(personsTable.id, d.decidedById))
    .where(
      and(eq(d.state, 'granted'), or(eq(d.bookingId, of.bookingId), eq(d.requestId, of.requestId))),
    )
    .orderBy(asc(d.id));
}

export async function findPersonName(reader: Reader, personId: number) {
  const [row] = await reader
    .select({ id: personsTable.id, name: personsTable.name })
    .from(personsTable)
    .where(eq(personsTable.id, personId));
  return row ?? null;
}

/** Those of a request that still hold places. */
export async function listLiveBookingsOfRequest(reader: Reader, requestId: number) {
  return bookingRows(reader)
    .where(and(eq(t.requestId, requestId), inArray(t.state, ['tentative', 'confirmed', 'running'])))
    .orderBy(asc(t.id));
}

/** Bookings that have not ended and hold one of the units or stand in one of the chambers. */
export async function listLiveBookingsOver(
  reader: Reader,
  siteId: number,
  places: { readonly unitIds: readonly number[]; readonly chamberIds: readonly number[] },
  now: Date,
) {
  const holding = reader
    .select({ id: allocationsTable.bookingId })
    .from(allocationsTable)
    .where(
      and(
        eq(allocationsTable.live, true),
        inArray(allocationsTable.unitId, [...places.unitIds]),
        sql`upper(${allocationsTable.during}) > ${now.toISOString()}`,
      ),
    );
  return bookingRows(reader)
    .where(
      and(
        eq(t.siteId, siteId),
        inArray(t.state, ['tentative', 'confirmed', 'running']),
        gt(sql`upper(${t.during})`, now.toISOString()),
        or(inArray(chamberLoadsTable.chamberId, [...places.chamberIds]), inArray(t.id, holding)),
      ),
    )
    .orderBy(asc(t.id));
}
