import { and, asc, eq, inArray, ne } from 'drizzle-orm';
import type { Reader, Tx } from '#server/db/client.ts';
import { bookingsTable } from '#server/db/tables/booking.table.ts';
import { cellTypesTable, cellsTable } from '#server/db/tables/cell.table.ts';
import { personsTable } from '#server/db/tables/person.table.ts';
import { projectsTable } from '#server/db/tables/project.table.ts';
import {
  requestLotCellsTable,
  requestLotsTable,
  requestsTable,
} from '#server/db/tables/request.table.ts';

export async function lockRequestRow(tx: Tx, siteId: number, requestId: number) {
  const [row] = await tx
    .select()
    .from(requestsTable)
    .where(and(eq(requestsTable.siteId, siteId), eq(requestsTable.id, requestId)))
    .for('no key update');
  return row;
}
export type RequestRow = NonNullable<Awaited<ReturnType<typeof lockRequestRow>>>;

/** Writes to a locked request and counts its version up. */
export async function updateRequest(
  tx: Tx,
  row: Pick<RequestRow, 'id' | 'version'>,
  change: Partial<typeof requestsTable.$inferInsert>,
  at: Date,
): Promise<void> {
  await tx
    .update(requestsTable)
    .set({ ...change, updatedAt: at, version: row.version + 1 })
    .where(eq(requestsTable.id, row.id));
}

/** A request with the names its fields stand for. */
export async function findWholeRequest(reader: Reader, requestId: number) {
  const [row] = await reader
    .select({
      request: requestsTable,
      requesterName: personsTable.name,
      projectName: projectsTable.name,
    })
    .from(requestsTable)
    .innerJoin(personsTable, eq(personsTable.id, requestsTable.requesterId))
    .leftJoin(projectsTable, eq(projectsTable.id, requestsTable.projectId))
    .where(eq(requestsTable.id, requestId));
  return row;
}
export type WholeRequest = NonNullable<Awaited<ReturnType<typeof findWholeRequest>>>;

export async function listLots(reader: Reader, requestId: number) {
  return reader
    .select({ lot: requestLotsTable, cellTypeName: cellTypesTable.name })
    .from(requestLotsTable)
    .leftJoin(cellTypesTable, eq(cellTypesTable.id, requestLotsTable.cellTypeId))
    .where(eq(requestLotsTable.requestId, requestId))
    .orderBy(asc(requestLotsTable.seq));
}
export type LotWithType = Awaited<ReturnType<typeof listLots>>[number];

export async function listCellsOfLots(reader: Reader, lotIds: readonly number[]) {
  if (lotIds.length === 0) {
    return [];
  }
  return reader
    .select({
      lotId: requestLotCellsTable.lotId,
      id: cellsTable.id,
      serial: cellsTable.serial,
      status: cellsTable.status,
    })
    .from(requestLotCellsTable)
    .innerJoin(cellsTable, eq(cellsTable.id, requestLotCellsTable.cellId))
    .where(inArray(requestLotCellsTable.lotId, [...lotIds]))
    .orderBy(asc(cellsTable.id));
}
export type CellOfLot = Awaited<ReturnType<typeof listCellsOfLots>>[number];

export async function listBookingsOfLots(reader: Reader, lotIds: readonly number[]) {
  if (lotIds.length === 0) {
    return [];
  }
  return reader
    .select({ lotId: bookingsTable.lotId, id: bookingsTable.id })
    .from(bookingsTable)
    .where(and(inArray(bookingsTable.lotId, [...lotIds]), ne(bookingsTable.state, 'cancelled')))
    .orderBy(asc(bookingsTable.id));
}

/** Cells nobody has seen yet, for a lot that was asked by type and number. */
export async function announceCells(
  tx: Tx,
  lotId: number,
  cells: readonly {
    readonly siteId: number;
    readonly projectId: number;
    readonly cellTypeId: number;
  }[],
  at: Date,
): Promise<void> {
  if (cells.length === 0) {
    return;
  }
  const rows = await tx
    .insert(cellsTable)
    .values(
      cells.map((cell) => ({
        ...cell,
        status: 'announced' as const,
        createdAt: at,
        updatedAt: at,
      })),
    )
    .returning({ cellId: cellsTable.id });
  await tx.insert(requestLotCellsTable).values(rows.map(({ cellId }) => ({ lotId, cellId })));
}
