import { sql } from 'drizzle-orm';
import type { Database, Reader, Tx } from '#server/db/client.ts';
import { personsTable } from '#server/db/tables/person.table.ts';
import { sitesTable } from '#server/db/tables/site.table.ts';
import { buildDemo } from './build-demo.ts';
import { judgeDemo, loadDemoSites } from './judge-demo.ts';
import { demoProviderKey } from './people.ts';
import { proposeSlots } from './propose-slots.ts';
import { writeDemo } from './write-demo.ts';

export class DemoError extends Error {
  override readonly name = 'DemoError';
}

export type DemoOrder = {
  readonly seed: number;
  readonly nowMs: number;
  /** Empties the database first. */
  readonly force: boolean;
};
export type DemoCounts = {
  readonly instruments: number;
  readonly units: number;
  readonly cells: number;
  readonly pastBookings: number;
  readonly futureBookings: number;
  readonly openRequests: number;
};

/** Loads the demo in one transaction: all of it or nothing. */
export async function loadDemo(database: Database, order: DemoOrder): Promise<DemoCounts> {
  const demo = buildDemo(order);
  const { rows } = demo;
  await database.transact(async (tx) => {
    if (!(await isEmpty(tx))) {
      if (!order.force) {
        throw new DemoError(
          'The database already holds records: load the demo into an empty one, or give --force to empty this one first.',
        );
      }
      await emptyDatabase(tx);
    }
    await writeDemo(tx, rows);
    const facilities = await loadDemoSites(tx, demo.nowMs);
    await judgeDemo(tx, demo, facilities);
    await proposeSlots(tx, demo, facilities);
  });
  const isPast = (state: string): boolean => state === 'done' || state === 'cancelled';
  return {
    instruments: rows.instruments.length,
    units: rows.units.length,
    cells: rows.cells.length,
    pastBookings: rows.bookings.filter((row) => isPast(row.state)).length,
    futureBookings: rows.bookings.filter((row) => !isPast(row.state)).length,
    openRequests: rows.requests.filter((row) => openStates.has(row.state)).length,
  };
}

const openStates = new Set(['draft', 'submitted', 'partly-booked']);

/** Nobody and no site is in it yet. */
export async function isEmpty(tx: Reader): Promise<boolean> {
  const sites = await tx.select({ id: sitesTable.id }).from(sitesTable).limit(1);
  const persons = await tx.select({ id: personsTable.id }).from(personsTable).limit(1);
  return sites.length === 0 && persons.length === 0;
}

/** People of a real identity provider are a sign that this is nobody's demo. */
async function emptyDatabase(tx: Tx): Promise<void> {
  const strangers = await tx.execute(
    sql`select 1 from person where provider_key <> ${demoProviderKey} limit 1`,
  );
  if (strangers.rows.length > 0) {
    throw new DemoError(
      'The database holds people of a real identity provider and is left as it is: load the demo into another database.',
    );
  }
  await tx.execute(sql`alter table audit_event disable trigger audit_event_never_emptied`);
  await tx.execute(sql`
    do $$
    begin
      execute (
        select 'truncate ' || string_agg(format('%I.%I', schemaname, tablename), ', ') || ' restart identity'
        from pg_tables where schemaname = 'public'
      );
    end
    $$`);
  await tx.execute(sql`alter table audit_event enable trigger audit_event_never_emptied`);
}
