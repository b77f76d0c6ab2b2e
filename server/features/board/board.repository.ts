import { and, asc, eq, inArray, sql } from 'drizzle-orm';
import type { Reader } from '#server/db/client.ts';
import { formatRange } from '#server/db/range-text.ts';
import { allocationsTable } from '#server/db/tables/allocation.table.ts';
import { bookingsTable } from '#server/db/tables/booking.table.ts';
import { cellTypesTable } from '#server/db/tables/cell.table.ts';
import { chamberPositionsTable, chamberSpecsTable } from '#server/db/tables/chamber.table.ts';
import { channelsTable } from '#server/db/tables/channel.table.ts';
import { instrumentsTable } from '#server/db/tables/instrument.table.ts';
import { loadPhasesTable } from '#server/db/tables/load.table.ts';
import { otherWorkTable } from '#server/db/tables/other-work.table.ts';
import { outagesTable } from '#server/db/tables/outage.table.ts';
import { requestLotsTable, requestsTable } from '#server/db/tables/request.table.ts';
import { stabilityAssessmentsTable } from '#server/db/tables/stability-assessment.table.ts';
import { unitsTable } from '#server/db/tables/unit.table.ts';
import type { Span } from '#shared/domain/intervals/types.ts';

/** The units of a site's chambers, sources and meters, in the order people read them. */
export async function listUnits(reader: Reader, siteId: number) {
  return reader
    .select({
      unitId: unitsTable.id,
      kind: unitsTable.kind,
      instrumentId: instrumentsTable.id,
      tag: instrumentsTable.tag,
      instrumentKind: instrumentsTable.kind,
      model: instrumentsTable.model,
      label: sql<string>`coalesce(${channelsTable.label}, ${chamberPositionsTable.label})`,
      formats: chamberPositionsTable.formats,
      idleTempMdegc: chamberSpecsTable.idleTempMdegc,
    })
    .from(unitsTable)
    .innerJoin(instrumentsTable, eq(instrumentsTable.id, unitsTable.instrumentId))
    .leftJoin(channelsTable, eq(channelsTable.id, unitsTable.channelId))
    .leftJoin(chamberPositionsTable, eq(chamberPositionsTable.id, unitsTable.positionId))
    .leftJoin(chamberSpecsTable, eq(chamberSpecsTable.instrumentId, instrumentsTable.id))
    .where(and(eq(instrumentsTable.siteId, siteId), sql`${instrumentsTable.state} <> 'retired'`))
    .orderBy(asc(instrumentsTable.tag), asc(unitsTable.id));
}
export type UnitRow = Awaited<ReturnType<typeof listUnits>>[number];

/** What takes the units during the window. */
export async function listTaken(reader: Reader, unitIds: readonly number[], window: Span) {
  if (unitIds.length === 0) {
    return [];
  }
  const t = allocationsTable;
  return reader
    .select({
      unitId: t.unitId,
      during: t.during,
      bookingId: t.bookingId,
      outageId: t.outageId,
      outageTitle: outagesTable.title,
      otherWorkId: t.otherWorkId,
      otherWorkTitle: otherWorkTable.title,
      otherWorkProjectId: otherWorkTable.projectId,
    })
    .from(t)
    .leftJoin(outagesTable, eq(outagesTable.id, t.outageId))
    .leftJoin(otherWorkTable, eq(otherWorkTable.id, t.otherWorkId))
    .where(
      and(
        eq(t.live, true),
        inArray(t.unitId, [...unitIds]),
        sql`${t.during} && ${formatRange(window)}::tstzrange`,
      ),
    )
    .orderBy(asc(t.unitId), sql`lower(${t.during})`);
}
export type TakenRow = Awaited<ReturnType<typeof listTaken>>[number];

/** Every unit that bookings hold, drawn or not. */
export async function listHeldUnits(reader: Reader, bookingIds: readonly number[]) {
  const t = allocationsTable;
  return reader
    .select({
      bookingId: sql<number>`${t.bookingId}`,
      unitId: t.unitId,
      instrumentId: unitsTable.instrumentId,
    })
    .from(t)
    .innerJoin(unitsTable, eq(unitsTable.id, t.unitId))
    .where(and(eq(t.live, true), inArray(t.bookingId, [...bookingIds])));
}
export type HeldUnitRow = Awaited<ReturnType<typeof listHeldUnits>>[number];

/** The bookings as they are drawn; the frozen estimate itself is not read. */
export async function listDrawnBookings(reader: Reader, bookingIds: readonly number[]) {
  if (bookingIds.length === 0) {
    return [];
  }
  const t = bookingsTable;
  return reader
    .select({
      id: t.id,
      loadId: t.loadId,
      state: t.state,
      atRisk: t.atRisk,
      atRiskReason: t.atRiskReason,
      during: t.during,
      projectId: t.projectId,
      requesterId: requestsTable.requesterId,
      cellCount: requestLotsTable.cellCount,
      cellTypeName: cellTypesTable.name,
      likelyHoldS: sql<
        number | null
      >`(${t.estimateResult} -> 'hold' ->> 'likelyS')::double precision`,
    })
    .from(t)
    .innerJoin(requestsTable, eq(requestsTable.id, t.requestId))
    .innerJoin(requestLotsTable, eq(requestLotsTable.id, t.lotId))
    .leftJoin(cellTypesTable, eq(cellTypesTable.id, requestLotsTable.cellTypeId))
    .where(inArray(t.id, [...bookingIds]))
    .orderBy(asc(t.id));
}
export type DrawnBookingRow = Awaited<ReturnType<typeof listDrawnBookings>>[number];

export async function listPhases(reader: Reader, loadIds: readonly number[]) {
  if (loadIds.length === 0) {
    return [];
  }
  const t = loadPhasesTable;
  return reader
    .select({
      loadId: t.loadId,
      phase: t.phase,
      during: t.during,
      setTempMdegc: t.setTempMdegc,
    })
    .from(t)
    .where(inArray(t.loadId, [...loadIds]))
    .orderBy(asc(t.loadId), asc(t.seq));
}
export type DrawnPhaseRow = Awaited<ReturnType<typeof listPhases>>[number];

/** The temperatures of chambers over a window, as planned. */
export async function listTemperaturePhases(
  reader: Reader,
  chamberIds: readonly number[],
  window: Span,
) {
  if (chamberIds.length === 0) {
    return [];
  }
  const t = loadPhasesTable;
  return reader
    .select({
      chamberId: t.chamberId,
      phase: t.phase,
      during: t.during,
      setTempMdegc: t.setTempMdegc,
    })
    .from(t)
    .where(
      and(
        eq(t.live, true),
        inArray(t.chamberId, [...chamberIds]),
        sql`${t.during} && ${formatRange(window)}::tstzrange`,
      ),
    )
    .orderBy(asc(t.chamberId), sql`lower(${t.during})`);
}
export type TemperatureRow = Awaited<ReturnType<typeof listTemperaturePhases>>[number];

/** The day of the newest judged log of each chamber. */
export async function listNewestLogs(reader: Reader, chamberIds: readonly number[]) {
  if (chamberIds.length === 0) {
    return [];
  }
  const t = stabilityAssessmentsTable;
  return reader
    .select({ chamberId: t.chamberId, assessedOn: sql<string>`max(${t.assessedOn})` })
    .from(t)
    .where(inArray(t.chamberId, [...chamberIds]))
    .groupBy(t.chamberId);
}
