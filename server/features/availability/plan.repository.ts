import { and, asc, eq, inArray, or, sql, type SQL } from 'drizzle-orm';
import type { PgColumn } from 'drizzle-orm/pg-core';
import type { Reader } from '#server/db/client.ts';
import { formatRange } from '#server/db/range-text.ts';
import { allocationsTable } from '#server/db/tables/allocation.table.ts';
import { bookingCellsTable, bookingsTable } from '#server/db/tables/booking.table.ts';
import { cellTypesTable, cellsTable } from '#server/db/tables/cell.table.ts';
import { chamberPositionsTable } from '#server/db/tables/chamber.table.ts';
import { chamberLoadsTable, loadPhasesTable } from '#server/db/tables/load.table.ts';
import { otherWorkTable } from '#server/db/tables/other-work.table.ts';
import { outagesTable, unavailabilitiesTable } from '#server/db/tables/outage.table.ts';
import { unitsTable } from '#server/db/tables/unit.table.ts';
import type { Span } from '#shared/domain/intervals/types.ts';

function touches(column: PgColumn, window: Span): SQL {
  return sql`${column} && ${formatRange(window)}::tstzrange`;
}

/** What takes the units within a window: bookings, planned outages, other work. */
export async function listAllocations(reader: Reader, unitIds: readonly number[], window: Span) {
  const t = allocationsTable;
  if (unitIds.length === 0) {
    return [];
  }
  return reader
    .select({
      unitId: t.unitId,
      during: t.during,
      bookingId: t.bookingId,
      outageId: t.outageId,
      outageTitle: outagesTable.title,
      otherWorkId: t.otherWorkId,
      otherWorkKind: otherWorkTable.kind,
    })
    .from(t)
    .leftJoin(outagesTable, eq(outagesTable.id, t.outageId))
    .leftJoin(otherWorkTable, eq(otherWorkTable.id, t.otherWorkId))
    .where(and(eq(t.live, true), touches(t.during, window), inArray(t.unitId, [...unitIds])))
    .orderBy(asc(t.unitId), asc(sql`lower(${t.during})`));
}
export type AllocationRow = Awaited<ReturnType<typeof listAllocations>>[number];

/** Breakdowns and the like of instruments or single units that touch a window. */
export async function listUnavailabilities(
  reader: Reader,
  places: { readonly instrumentIds: readonly number[]; readonly unitIds: readonly number[] },
  window: Span,
) {
  const t = unavailabilitiesTable;
  return reader
    .select({
      id: t.id,
      instrumentId: t.instrumentId,
      unitId: t.unitId,
      reason: t.reason,
      note: t.note,
      startsAt: t.startsAt,
      endsAt: t.endsAt,
    })
    .from(t)
    .where(
      and(
        or(
          inArray(t.instrumentId, [...places.instrumentIds]),
          inArray(t.unitId, [...places.unitIds]),
        ),
        sql`${t.startsAt} < ${new Date(window.endMs).toISOString()}`,
        sql`(${t.endsAt} is null or (${t.endsAt} > ${new Date(window.startMs).toISOString()} and ${t.endsAt} > ${t.startsAt}))`,
      ),
    )
    .orderBy(asc(t.startsAt), asc(t.id));
}
export type UnavailabilityRow = Awaited<ReturnType<typeof listUnavailabilities>>[number];

/** The phases of live loads of which any phase touches the window, whole loads at a time. */
export async function listLoadPhases(reader: Reader, chamberIds: readonly number[], window: Span) {
  const t = loadPhasesTable;
  const touching = reader
    .select({ loadId: t.loadId })
    .from(t)
    .where(and(inArray(t.chamberId, [...chamberIds]), eq(t.live, true), touches(t.during, window)));
  return reader
    .select({
      loadId: chamberLoadsTable.id,
      chamberId: chamberLoadsTable.chamberId,
      state: chamberLoadsTable.state,
      closesAt: chamberLoadsTable.closesAt,
      setTempMdegc: chamberLoadsTable.setTempMdegc,
      phase: t.phase,
      phaseTempMdegc: t.setTempMdegc,
      during: t.during,
    })
    .from(t)
    .innerJoin(chamberLoadsTable, eq(chamberLoadsTable.id, t.loadId))
    .where(and(eq(chamberLoadsTable.live, true), inArray(t.loadId, touching)))
    .orderBy(asc(t.loadId), asc(t.seq));
}
export type LoadPhaseRow = Awaited<ReturnType<typeof listLoadPhases>>[number];

/** The bookings in loads that still count, with how many cells they bring and their energy. */
export async function listLoadMembers(reader: Reader, loadIds: readonly number[]) {
  if (loadIds.length === 0) {
    return [];
  }
  return reader
    .select({
      loadId: bookingsTable.loadId,
      bookingId: bookingsTable.id,
      ownPhases: bookingsTable.ownPhases,
      cells: sql<number>`count(${bookingCellsTable.id})::int`,
      energyWh: sql<number>`coalesce(sum(${cellTypesTable.capacityAh} * ${cellTypesTable.nominalV}), 0)::float8`,
    })
    .from(bookingsTable)
    .leftJoin(bookingCellsTable, eq(bookingCellsTable.bookingId, bookingsTable.id))
    .leftJoin(cellsTable, eq(cellsTable.id, bookingCellsTable.cellId))
    .leftJoin(cellTypesTable, eq(cellTypesTable.id, cellsTable.cellTypeId))
    .where(
      and(
        inArray(bookingsTable.loadId, [...loadIds]),
        inArray(bookingsTable.state, ['tentative', 'confirmed', 'running']),
      ),
    )
    .groupBy(bookingsTable.id)
    .orderBy(asc(bookingsTable.id));
}
export type LoadMemberRow = Awaited<ReturnType<typeof listLoadMembers>>[number];

/** Other work in loads; its positions say how large its cells can be at most. */
export async function listOtherWork(reader: Reader, loadIds: readonly number[]) {
  if (loadIds.length === 0) {
    return [];
  }
  return reader
    .select({
      loadId: otherWorkTable.loadId,
      id: otherWorkTable.id,
      cells: otherWorkTable.cellCount,
      positionsMaxAh: sql<number>`coalesce(sum(${chamberPositionsTable.maxAh}), 0)::float8`,
    })
    .from(otherWorkTable)
    .leftJoin(
      allocationsTable,
      and(eq(allocationsTable.otherWorkId, otherWorkTable.id), eq(allocationsTable.live, true)),
    )
    .leftJoin(unitsTable, eq(unitsTable.id, allocationsTable.unitId))
    .leftJoin(chamberPositionsTable, eq(chamberPositionsTable.id, unitsTable.positionId))
    .where(inArray(otherWorkTable.loadId, [...loadIds]))
    .groupBy(otherWorkTable.id)
    .orderBy(asc(otherWorkTable.id));
}
export type OtherWorkRow = Awaited<ReturnType<typeof listOtherWork>>[number];
