import { asc, inArray, sql } from 'drizzle-orm';
import type { Tx } from './client.ts';
import { chamberSpecsTable } from './tables/chamber.table.ts';
import { unitsTable } from './tables/unit.table.ts';

export type Places = {
  readonly chamberIds: readonly number[];
  readonly unitIds: readonly number[];
};

/**
 * Locks everything a change of allocations or phases touches, old places and new ones alike, in the
 * one order everybody keeps: chambers by id, then units by id. Call it once, before reading what
 * decides the change: exclusion constraints alone leave racing writers to the deadlock detector.
 */
export async function lockPlaces(tx: Tx, places: Places): Promise<void> {
  const chamberIds = distinct(places.chamberIds);
  const unitIds = distinct(places.unitIds);
  if (chamberIds.length > 0) {
    const locked = await tx
      .select({ id: chamberSpecsTable.instrumentId })
      .from(chamberSpecsTable)
      .where(inArray(chamberSpecsTable.instrumentId, chamberIds))
      .orderBy(asc(chamberSpecsTable.instrumentId))
      .for('no key update');
    requireAll('chamber', chamberIds, locked);
  }
  if (unitIds.length > 0) {
    const locked = await tx
      .select({ id: unitsTable.id })
      .from(unitsTable)
      .where(inArray(unitsTable.id, unitIds))
      .orderBy(asc(unitsTable.id))
      .for('no key update');
    requireAll('unit', unitIds, locked);
  }
}

/**
 * Locks the chambers and units of instruments and of all that is mounted in them, and names them.
 * Whatever worsens an instrument does this before it looks for the bookings over it, so that no
 * booking can slip in between.
 */
export async function lockInstruments(
  tx: Tx,
  instrumentIds: readonly number[],
): Promise<Places & { readonly instrumentIds: readonly number[] }> {
  if (instrumentIds.length === 0) {
    return { instrumentIds: [], chamberIds: [], unitIds: [] };
  }
  const below = await tx.execute<{ id: number }>(sql`
    with recursive below (id) as (
      select id from instrument where id in ${[...instrumentIds]}
      union
      select instrument.id from instrument join below on instrument.parent_id = below.id
    )
    select id from below order by id`);
  const all = below.rows.map((row) => row.id);
  const chambers = await tx
    .select({ id: chamberSpecsTable.instrumentId })
    .from(chamberSpecsTable)
    .where(inArray(chamberSpecsTable.instrumentId, all));
  const units = await tx
    .select({ id: unitsTable.id })
    .from(unitsTable)
    .where(inArray(unitsTable.instrumentId, all));
  const places = {
    chamberIds: chambers.map((row) => row.id),
    unitIds: units.map((row) => row.id),
  };
  await lockPlaces(tx, places);
  return { instrumentIds: all, ...places };
}

function distinct(ids: readonly number[]): number[] {
  return [...new Set(ids)];
}

function requireAll(
  noun: string,
  wanted: readonly number[],
  locked: readonly { id: number }[],
): void {
  if (locked.length !== wanted.length) {
    const found = new Set(locked.map((row) => row.id));
    const missing = wanted.filter((id) => !found.has(id));
    throw new RangeError(`There is no ${noun} with the id ${missing.join(', ')}.`);
  }
}
