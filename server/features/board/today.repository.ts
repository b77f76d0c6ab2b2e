import { and, asc, eq, inArray, or, sql } from 'drizzle-orm';
import type { Reader } from '#server/db/client.ts';
import { formatRange } from '#server/db/range-text.ts';
import { allocationsTable } from '#server/db/tables/allocation.table.ts';
import { bookingsTable } from '#server/db/tables/booking.table.ts';
import { calibrationsTable } from '#server/db/tables/calibration.table.ts';
import { cellTypesTable } from '#server/db/tables/cell.table.ts';
import { instrumentsTable } from '#server/db/tables/instrument.table.ts';
import { chamberLoadsTable, loadPhasesTable } from '#server/db/tables/load.table.ts';
import { outageInstrumentsTable, outagesTable } from '#server/db/tables/outage.table.ts';
import { personsTable } from '#server/db/tables/person.table.ts';
import { requestLotsTable, requestsTable } from '#server/db/tables/request.table.ts';
import { unitsTable } from '#server/db/tables/unit.table.ts';
import type { Span } from '#shared/domain/intervals/types.ts';

const doorPhases = ['connect', 'measure', 'unload'] as const;

/** Doors opened and measurements begun at a site during a span, as planned. */
export async function listDoorPhases(reader: Reader, siteId: number, span: Span) {
  const t = loadPhasesTable;
  return reader
    .select({
      loadId: t.loadId,
      chamberTag: instrumentsTable.tag,
      phase: sql<(typeof doorPhases)[number]>`${t.phase}`,
      during: t.during,
      setTempMdegc: chamberLoadsTable.setTempMdegc,
    })
    .from(t)
    .innerJoin(chamberLoadsTable, eq(chamberLoadsTable.id, t.loadId))
    .innerJoin(instrumentsTable, eq(instrumentsTable.id, t.chamberId))
    .where(
      and(
        eq(instrumentsTable.siteId, siteId),
        eq(t.live, true),
        inArray(t.phase, [...doorPhases]),
        sql`lower(${t.during}) <@ ${formatRange(span)}::tstzrange`,
      ),
    )
    .orderBy(sql`lower(${t.during})`, asc(t.loadId));
}
export type DoorRow = Awaited<ReturnType<typeof listDoorPhases>>[number];

export async function listBookingsOfLoads(reader: Reader, loadIds: readonly number[]) {
  if (loadIds.length === 0) {
    return [];
  }
  return reader
    .select({
      id: bookingsTable.id,
      loadId: bookingsTable.loadId,
      state: bookingsTable.state,
      projectId: bookingsTable.projectId,
      requesterId: requestsTable.requesterId,
      cellCount: requestLotsTable.cellCount,
      cellTypeName: cellTypesTable.name,
    })
    .from(bookingsTable)
    .innerJoin(requestsTable, eq(requestsTable.id, bookingsTable.requestId))
    .innerJoin(requestLotsTable, eq(requestLotsTable.id, bookingsTable.lotId))
    .leftJoin(cellTypesTable, eq(cellTypesTable.id, requestLotsTable.cellTypeId))
    .where(
      and(inArray(bookingsTable.loadId, [...loadIds]), sql`${bookingsTable.state} <> 'cancelled'`),
    )
    .orderBy(asc(bookingsTable.id));
}
export type LoadBookingRow = Awaited<ReturnType<typeof listBookingsOfLoads>>[number];

/** Outages that begin or end during a span. */
export async function listOutageEdges(reader: Reader, siteId: number, span: Span) {
  const range = sql`${formatRange(span)}::tstzrange`;
  return reader
    .select({
      id: outagesTable.id,
      title: outagesTable.title,
      during: outagesTable.during,
      tag: instrumentsTable.tag,
    })
    .from(outagesTable)
    .innerJoin(outageInstrumentsTable, eq(outageInstrumentsTable.outageId, outagesTable.id))
    .innerJoin(instrumentsTable, eq(instrumentsTable.id, outageInstrumentsTable.instrumentId))
    .where(
      and(
        eq(outagesTable.siteId, siteId),
        sql`${outagesTable.state} <> 'cancelled'`,
        or(
          sql`lower(${outagesTable.during}) <@ ${range}`,
          sql`upper(${outagesTable.during}) <@ ${range}`,
        ),
      ),
    )
    .orderBy(asc(outagesTable.id), asc(instrumentsTable.tag));
}

/** When instruments are booked during a span, each booking once. */
export async function listBookedSpans(
  reader: Reader,
  instrumentTags: readonly string[],
  siteId: number,
  span: Span,
) {
  if (instrumentTags.length === 0) {
    return [];
  }
  return reader
    .selectDistinct({ tag: instrumentsTable.tag, during: allocationsTable.during })
    .from(allocationsTable)
    .innerJoin(unitsTable, eq(unitsTable.id, allocationsTable.unitId))
    .innerJoin(instrumentsTable, eq(instrumentsTable.id, unitsTable.instrumentId))
    .where(
      and(
        eq(instrumentsTable.siteId, siteId),
        inArray(instrumentsTable.tag, [...instrumentTags]),
        eq(allocationsTable.live, true),
        sql`${allocationsTable.bookingId} is not null`,
        sql`${allocationsTable.during} && ${formatRange(span)}::tstzrange`,
      ),
    );
}

export async function listOpenRequests(reader: Reader, siteId: number) {
  return reader
    .select({ request: requestsTable, requesterName: personsTable.name })
    .from(requestsTable)
    .innerJoin(personsTable, eq(personsTable.id, requestsTable.requesterId))
    .where(
      and(
        eq(requestsTable.siteId, siteId),
        inArray(requestsTable.state, ['draft', 'submitted', 'partly-booked']),
      ),
    )
    .orderBy(sql`coalesce(${requestsTable.proposedAt}, ${requestsTable.submittedAt}) nulls last`);
}
export type OpenRequestRow = Awaited<ReturnType<typeof listOpenRequests>>[number];

export async function listWatchedBookings(reader: Reader, siteId: number, now: Date, until: Date) {
  return reader
    .select({ booking: bookingsTable, requesterId: requestsTable.requesterId })
    .from(bookingsTable)
    .innerJoin(requestsTable, eq(requestsTable.id, bookingsTable.requestId))
    .where(
      and(
        eq(bookingsTable.siteId, siteId),
        inArray(bookingsTable.state, ['tentative', 'confirmed', 'running']),
        sql`upper(${bookingsTable.during}) > ${now.toISOString()}`,
        or(
          eq(bookingsTable.atRisk, true),
          sql`lower(${bookingsTable.during}) between ${now.toISOString()} and ${until.toISOString()}`,
        ),
      ),
    )
    .orderBy(sql`lower(${bookingsTable.during})`, asc(bookingsTable.id));
}

export async function listUnsigned(reader: Reader, siteId: number) {
  return reader
    .select({
      id: calibrationsTable.id,
      tag: instrumentsTable.tag,
      recordedById: calibrationsTable.recordedById,
      recordedBy: personsTable.name,
      createdAt: calibrationsTable.createdAt,
      certificateNumber: calibrationsTable.certificateNumber,
    })
    .from(calibrationsTable)
    .innerJoin(instrumentsTable, eq(instrumentsTable.id, calibrationsTable.instrumentId))
    .innerJoin(personsTable, eq(personsTable.id, calibrationsTable.recordedById))
    .where(
      and(eq(instrumentsTable.siteId, siteId), eq(calibrationsTable.state, 'awaiting-approval')),
    )
    .orderBy(asc(calibrationsTable.createdAt));
}

export async function listAwaitingRelease(reader: Reader, siteId: number) {
  const t = instrumentsTable;
  return reader
    .select({ tag: t.tag, model: t.model, note: t.note, updatedAt: t.updatedAt })
    .from(t)
    .where(and(eq(t.siteId, siteId), eq(t.state, 'awaiting-release')))
    .orderBy(asc(t.updatedAt));
}
