import { and, count, eq, inArray, sql } from 'drizzle-orm';
import type { Reader, Tx } from '#server/db/client.ts';
import { bookingCellsTable, bookingsTable } from '#server/db/tables/booking.table.ts';
import { cellTypesTable, cellsTable } from '#server/db/tables/cell.table.ts';
import { chamberPositionsTable, chamberSpecsTable } from '#server/db/tables/chamber.table.ts';
import { instrumentsTable } from '#server/db/tables/instrument.table.ts';
import { chamberLoadsTable, loadPhasesTable } from '#server/db/tables/load.table.ts';
import { otherWorkTable } from '#server/db/tables/other-work.table.ts';
import type { LoadState } from '#shared/domain/states.ts';

export async function findLoad(reader: Reader, siteId: number, loadId: number) {
  const [row] = await reader
    .select({
      load: chamberLoadsTable,
      chamberTag: instrumentsTable.tag,
      maxEnergyWh: chamberSpecsTable.maxEnergyWh,
      maxCells: chamberSpecsTable.maxCells,
    })
    .from(chamberLoadsTable)
    .innerJoin(instrumentsTable, eq(instrumentsTable.id, chamberLoadsTable.chamberId))
    .innerJoin(chamberSpecsTable, eq(chamberSpecsTable.instrumentId, chamberLoadsTable.chamberId))
    .where(and(eq(instrumentsTable.siteId, siteId), eq(chamberLoadsTable.id, loadId)));
  return row;
}
export type LoadRecord = NonNullable<Awaited<ReturnType<typeof findLoad>>>;

export async function listPhases(reader: Reader, loadId: number) {
  return reader
    .select()
    .from(loadPhasesTable)
    .where(eq(loadPhasesTable.loadId, loadId))
    .orderBy(loadPhasesTable.seq);
}

export type LoadContents = {
  readonly cells: number;
  readonly energyWh: number;
  readonly otherCells: number;
  readonly positions: number;
};

/** What the bookings of a load bring into the chamber, and how many places the chamber has. */
export async function sumContents(
  reader: Reader,
  of: { readonly loadId: number; readonly chamberId: number },
): Promise<LoadContents> {
  const [cells] = await reader
    .select({
      cells: sql<number>`count(*)::int`,
      energyWh: sql<number>`coalesce(sum(${cellTypesTable.capacityAh} * ${cellTypesTable.nominalV}), 0)::float8`,
    })
    .from(bookingCellsTable)
    .innerJoin(bookingsTable, eq(bookingsTable.id, bookingCellsTable.bookingId))
    .innerJoin(cellsTable, eq(cellsTable.id, bookingCellsTable.cellId))
    .innerJoin(cellTypesTable, eq(cellTypesTable.id, cellsTable.cellTypeId))
    .where(
      and(
        eq(bookingsTable.loadId, of.loadId),
        inArray(bookingsTable.state, ['tentative', 'confirmed', 'running', 'done']),
      ),
    );
  const [work] = await reader
    .select({ cells: sql<number>`coalesce(sum(${otherWorkTable.cellCount}), 0)::int` })
    .from(otherWorkTable)
    .where(eq(otherWorkTable.loadId, of.loadId));
  const [places] = await reader
    .select({ count: count() })
    .from(chamberPositionsTable)
    .where(eq(chamberPositionsTable.chamberId, of.chamberId));
  return {
    cells: cells?.cells ?? 0,
    energyWh: cells?.energyWh ?? 0,
    otherCells: work?.cells ?? 0,
    positions: places?.count ?? 0,
  };
}

/** False where the load is no longer at the version seen. */
export async function updateLoadState(
  tx: Tx,
  of: { readonly id: number; readonly version: number },
  change: { readonly state: LoadState; readonly closesAt?: Date | null },
  at: Date,
): Promise<boolean> {
  const t = chamberLoadsTable;
  const rows = await tx
    .update(t)
    .set({ ...change, updatedAt: at, version: of.version + 1 })
    .where(and(eq(t.id, of.id), eq(t.version, of.version)))
    .returning({ id: t.id });
  return rows.length === 1;
}
