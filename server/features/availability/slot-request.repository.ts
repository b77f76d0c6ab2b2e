import { and, asc, eq, inArray, or } from 'drizzle-orm';
import type { Reader } from '#server/db/client.ts';
import { cellTypesTable, cellsTable } from '#server/db/tables/cell.table.ts';
import { deviationsTable } from '#server/db/tables/check-result.table.ts';
import {
  requestLotCellsTable,
  requestLotsTable,
  requestsTable,
} from '#server/db/tables/request.table.ts';

/** A lot with its request and cell type; a draft may lack the type. */
export async function findLotRow(reader: Reader, siteId: number, requestId: number, lotId: number) {
  const [row] = await reader
    .select({ request: requestsTable, lot: requestLotsTable, cellType: cellTypesTable })
    .from(requestLotsTable)
    .innerJoin(requestsTable, eq(requestsTable.id, requestLotsTable.requestId))
    .leftJoin(cellTypesTable, eq(cellTypesTable.id, requestLotsTable.cellTypeId))
    .where(
      and(
        eq(requestsTable.siteId, siteId),
        eq(requestsTable.id, requestId),
        eq(requestLotsTable.id, lotId),
      ),
    );
  return row;
}

export async function listLotRows(reader: Reader, lotIds: readonly number[]) {
  if (lotIds.length === 0) {
    return [];
  }
  return reader
    .select({ request: requestsTable, lot: requestLotsTable, cellType: cellTypesTable })
    .from(requestLotsTable)
    .innerJoin(requestsTable, eq(requestsTable.id, requestLotsTable.requestId))
    .leftJoin(cellTypesTable, eq(cellTypesTable.id, requestLotsTable.cellTypeId))
    .where(inArray(requestLotsTable.id, [...lotIds]));
}
export type LotRow = Awaited<ReturnType<typeof listLotRows>>[number];

export async function listLotCells(reader: Reader, lotIds: readonly number[]) {
  if (lotIds.length === 0) {
    return [];
  }
  const rows = await reader
    .select({ lotId: requestLotCellsTable.lotId, cell: cellsTable })
    .from(requestLotCellsTable)
    .innerJoin(cellsTable, eq(cellsTable.id, requestLotCellsTable.cellId))
    .where(inArray(requestLotCellsTable.lotId, [...lotIds]))
    .orderBy(asc(cellsTable.id));
  return rows;
}
export type LotCellRow = Awaited<ReturnType<typeof listLotCells>>[number];

/** Deviations granted for the requests, or for the bookings alone. */
export async function listGrantedDeviations(
  reader: Reader,
  of: { readonly requestIds: readonly number[]; readonly bookingIds: readonly number[] },
) {
  const t = deviationsTable;
  return reader
    .select({
      id: t.id,
      requestId: t.requestId,
      bookingId: t.bookingId,
      checkCode: t.checkCode,
      expiresAt: t.expiresAt,
    })
    .from(t)
    .where(
      and(
        eq(t.state, 'granted'),
        or(inArray(t.requestId, [...of.requestIds]), inArray(t.bookingId, [...of.bookingIds])),
      ),
    )
    .orderBy(asc(t.id));
}
export type GrantedDeviationRow = Awaited<ReturnType<typeof listGrantedDeviations>>[number];
