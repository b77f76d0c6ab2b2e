import { and, asc, eq, inArray, ne, sql } from 'drizzle-orm';
import type { Tx } from '#server/db/client.ts';
import { translatingConstraints } from '#server/db/db-errors.ts';
import { allocationsTable } from '#server/db/tables/allocation.table.ts';
import { bookingCellsTable, bookingsTable } from '#server/db/tables/booking.table.ts';
import { cellsTable } from '#server/db/tables/cell.table.ts';
import { checkResultsTable } from '#server/db/tables/check-result.table.ts';
import { chamberLoadsTable, loadPhasesTable } from '#server/db/tables/load.table.ts';
import { otherWorkTable } from '#server/db/tables/other-work.table.ts';
import { requestLotsTable, requestsTable } from '#server/db/tables/request.table.ts';
import { problem } from '#server/problem.ts';
import type { CheckResult } from '#shared/domain/checks/types.ts';
import type { PhaseSpan } from '#shared/domain/facility/types.ts';
import type { Span } from '#shared/domain/intervals/types.ts';
import type { CheckStage, RequestState } from '#shared/domain/states.ts';

const liveStates = ['tentative', 'confirmed', 'running'] as const;

/**
 * The database's own refusal of a clash. With the places locked and read afresh it is not reached; it
 * is there for whoever writes without them.
 */
export function refusingClashes<Result>(change: () => Promise<Result>): Promise<Result> {
  const refuse = (what: string) => (cause: Error) =>
    problem('booking.clash', {
      detail: `${what} in the same moment. Nothing was changed; look for offers again.`,
      cause,
    });
  return translatingConstraints(
    {
      allocation_unit_free: refuse('Somebody took one of the channels or positions'),
      load_phase_one_temperature: refuse('Somebody set the chamber to another temperature'),
      load_phase_still: refuse('Somebody planned a disturbance of a still phase'),
    },
    change,
  );
}

/** Locks requests before any place, in id order; returns their current rows. */
export async function lockRequest(tx: Tx, requestId: number) {
  const [row] = await tx
    .select()
    .from(requestsTable)
    .where(eq(requestsTable.id, requestId))
    .for('no key update');
  return row;
}

/** Locks cells after the places, so that no two bookings take the same cell at once. */
export async function lockCells(tx: Tx, cellIds: readonly number[]): Promise<void> {
  if (cellIds.length > 0) {
    await tx
      .select({ id: cellsTable.id })
      .from(cellsTable)
      .where(inArray(cellsTable.id, [...cellIds]))
      .orderBy(asc(cellsTable.id))
      .for('no key update');
  }
}

export type LoadPlace = {
  readonly chamberId: number;
  readonly strict: boolean;
  readonly setTempMdegc: number;
};

export async function insertLoad(tx: Tx, place: LoadPlace, at: Date): Promise<number> {
  const [row] = await tx
    .insert(chamberLoadsTable)
    .values({ ...place, state: 'open', live: true, createdAt: at, updatedAt: at })
    .returning({ id: chamberLoadsTable.id });
  if (row === undefined) {
    throw new Error('The new load was not returned.');
  }
  return row.id;
}

/** Moves a load with its phases; the phases are written anew afterwards. */
export async function updateLoad(
  tx: Tx,
  loadId: number,
  place: LoadPlace,
  at: Date,
): Promise<void> {
  await tx
    .update(chamberLoadsTable)
    .set({ ...place, updatedAt: at, version: sql`${chamberLoadsTable.version} + 1` })
    .where(eq(chamberLoadsTable.id, loadId));
}

export async function replacePhases(
  tx: Tx,
  loadId: number,
  place: Pick<LoadPlace, 'chamberId' | 'strict'>,
  phases: readonly PhaseSpan[],
): Promise<void> {
  await tx.delete(loadPhasesTable).where(eq(loadPhasesTable.loadId, loadId));
  await tx.insert(loadPhasesTable).values(
    phases.map((phase, seq) => ({
      loadId,
      chamberId: place.chamberId,
      strict: place.strict,
      seq,
      phase: phase.phase,
      setTempMdegc: Math.round(phase.setTemperatureC * 1000),
      during: { startMs: phase.startMs, endMs: phase.endMs },
      live: true,
    })),
  );
}

/** Cancels a load in which no live booking and no other work is left; its phases no longer count. */
export async function cancelEmptyLoad(tx: Tx, loadId: number, at: Date): Promise<boolean> {
  const [booking] = await tx
    .select({ id: bookingsTable.id })
    .from(bookingsTable)
    .where(
      and(eq(bookingsTable.loadId, loadId), inArray(bookingsTable.state, [...liveStates, 'done'])),
    )
    .limit(1);
  const [work] = await tx
    .select({ id: otherWorkTable.id })
    .from(otherWorkTable)
    .where(eq(otherWorkTable.loadId, loadId))
    .limit(1);
  if (booking !== undefined || work !== undefined) {
    return false;
  }
  await tx.update(loadPhasesTable).set({ live: false }).where(eq(loadPhasesTable.loadId, loadId));
  await tx
    .update(chamberLoadsTable)
    .set({
      state: 'cancelled',
      live: false,
      updatedAt: at,
      version: sql`${chamberLoadsTable.version} + 1`,
    })
    .where(eq(chamberLoadsTable.id, loadId));
  return true;
}

type NewBooking = Omit<typeof bookingsTable.$inferInsert, 'id' | 'createdAt' | 'updatedAt'>;

export async function insertBooking(tx: Tx, booking: NewBooking, at: Date): Promise<number> {
  const [row] = await tx
    .insert(bookingsTable)
    .values({ ...booking, createdAt: at, updatedAt: at })
    .returning({ id: bookingsTable.id });
  if (row === undefined) {
    throw new Error('The new booking was not returned.');
  }
  return row.id;
}

/** False where the booking is no longer at the version seen. */
export async function updateBooking(
  tx: Tx,
  of: { readonly id: number; readonly version: number },
  change: Partial<NewBooking>,
  at: Date,
): Promise<boolean> {
  const rows = await tx
    .update(bookingsTable)
    .set({ ...change, updatedAt: at, version: of.version + 1 })
    .where(and(eq(bookingsTable.id, of.id), eq(bookingsTable.version, of.version)))
    .returning({ id: bookingsTable.id });
  return rows.length === 1;
}

export type CellOnPath = {
  readonly cellId: number;
  readonly panelId: number;
  readonly sourceUnitId: number;
  readonly meterUnitId: number;
  readonly meterRangeId: number;
  readonly positionUnitId: number;
};

/** Writes the cells and their paths, and takes the units for the span. */
export async function placeCells(
  tx: Tx,
  bookingId: number,
  cells: readonly CellOnPath[],
  during: Span,
  at: Date,
): Promise<void> {
  await tx.delete(bookingCellsTable).where(eq(bookingCellsTable.bookingId, bookingId));
  await tx.delete(allocationsTable).where(eq(allocationsTable.bookingId, bookingId));
  await tx.insert(bookingCellsTable).values(cells.map((cell) => ({ ...cell, bookingId })));
  const unitIds = cells
    .flatMap((cell) => [cell.sourceUnitId, cell.meterUnitId, cell.positionUnitId])
    .toSorted((first, second) => first - second);
  await tx
    .insert(allocationsTable)
    .values(unitIds.map((unitId) => ({ unitId, during, live: true, bookingId, createdAt: at })));
}

export async function freeAllocations(tx: Tx, bookingId: number): Promise<void> {
  await tx
    .update(allocationsTable)
    .set({ live: false })
    .where(eq(allocationsTable.bookingId, bookingId));
}

export async function insertCheckResults(
  tx: Tx,
  bookingId: number,
  stage: CheckStage,
  results: readonly CheckResult[],
  runAt: Date,
): Promise<void> {
  await tx.insert(checkResultsTable).values(
    results.map(({ code, outcome, sentence, ...evidence }) => ({
      bookingId,
      runAt,
      stage,
      code,
      outcome,
      sentence,
      evidence,
    })),
  );
}

/** How many lots a request has, and how many of them have a booking that was not cancelled. */
export async function countBookedLots(tx: Tx, requestId: number) {
  const [row] = await tx
    .select({
      lots: sql<number>`count(*)::int`,
      booked: sql<number>`count(*) filter (where exists (select from ${bookingsTable} b where b.lot_id = request_lot.id and b.state <> 'cancelled'))::int`,
    })
    .from(requestLotsTable)
    .where(eq(requestLotsTable.requestId, requestId));
  return row ?? { lots: 0, booked: 0 };
}

/** Only a request that is being worked on follows its lots; a withdrawn or finished one stays so. */
export async function updateRequestState(
  tx: Tx,
  requestId: number,
  state: RequestState,
  at: Date,
): Promise<void> {
  const isAnswered = sql`exists (select from booking b where b.state <> 'cancelled' and b.lot_id = (request.proposed_offer ->> 'lotId')::int)`;
  await tx
    .update(requestsTable)
    .set({
      state,
      updatedAt: at,
      version: sql`${requestsTable.version} + 1`,
      // Once its lot is booked, the wish for a slot is answered.
      proposedOffer: sql`case when ${isAnswered} then null else proposed_offer end`,
      proposedAt: sql`case when ${isAnswered} then null else proposed_at end`,
    })
    .where(
      and(
        eq(requestsTable.id, requestId),
        inArray(requestsTable.state, ['submitted', 'partly-booked', 'booked']),
      ),
    );
}

/** A live booking of one of the cells that touches the span. */
export async function findCellInUse(
  tx: Tx,
  cellIds: readonly number[],
  span: Span,
  exceptBookingId: number,
) {
  if (cellIds.length === 0) {
    return undefined;
  }
  const [row] = await tx
    .select({
      cellId: bookingCellsTable.cellId,
      serial: cellsTable.serial,
      bookingId: bookingsTable.id,
      during: bookingsTable.during,
    })
    .from(bookingCellsTable)
    .innerJoin(bookingsTable, eq(bookingsTable.id, bookingCellsTable.bookingId))
    .innerJoin(cellsTable, eq(cellsTable.id, bookingCellsTable.cellId))
    .where(
      and(
        inArray(bookingCellsTable.cellId, [...cellIds]),
        inArray(bookingsTable.state, [...liveStates]),
        ne(bookingsTable.id, exceptBookingId),
        sql`${bookingsTable.during} && tstzrange(${new Date(span.startMs).toISOString()}::timestamptz, ${new Date(span.endMs).toISOString()}::timestamptz)`,
      ),
    )
    .limit(1);
  return row;
}
