import { sql } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { demoPeople as standInPeople } from '#fakes/identity/people.ts';
import { connectDatabase, type Database } from '#server/db/client.ts';
import { personsTable } from '#server/db/tables/person.table.ts';
import { buildDemo, defaultDemoSeed, type Demo } from '#server/demo/build-demo.ts';
import { loadDemo } from '#server/demo/load-demo.ts';
import { loadDemoSites } from '#server/demo/judge-demo.ts';
import { demoPeople } from '#server/demo/people.ts';
import { loadSlotRequests } from '#server/features/availability/slot-request.service.ts';
import { search } from '#shared/domain/availability/search.ts';
import { buildCalendarIndex } from '#shared/domain/calendar/build-calendar-index.ts';
import { isInWorkingHours } from '#shared/domain/calendar/is-in-working-hours.ts';
import { createTestDatabase, type TestDatabase } from '#tests/support/test-database.ts';

const dayMs = 86_400_000;
const order = { seed: defaultDemoSeed, nowMs: Date.parse('2026-06-16T09:42:00Z'), force: false };
const openStates = ['draft', 'submitted', 'partly-booked'];

describe('the demo as built', () => {
  const demo = buildDemo(order);

  test('the same seed and moment give the same rows', () => {
    expect(JSON.stringify(buildDemo(order).rows)).toBe(JSON.stringify(demo.rows));
  });

  test('another seed gives other work on the same equipment', () => {
    const other = buildDemo({ ...order, seed: 412 }).rows;
    expect(other.instruments.map((row) => row.tag)).toEqual(
      demo.rows.instruments.map((row) => row.tag),
    );
    expect(other.bookings.map((row) => row.during.startMs)).not.toEqual(
      demo.rows.bookings.map((row) => row.during.startMs),
    );
  });

  test('it has as much of everything as a laboratory worth looking at', () => {
    const { rows } = demo;
    const past = rows.bookings.filter((row) => row.state === 'done').length;
    const ahead = rows.bookings.filter((row) =>
      ['tentative', 'confirmed', 'running'].includes(row.state),
    ).length;
    expect(rows.instruments).toHaveLength(63);
    expect(rows.panels).toHaveLength(40);
    expect(rows.cellTypes).toHaveLength(24);
    expect(rows.projects).toHaveLength(8);
    expect(rows.units.length).toBeGreaterThan(400);
    expect(rows.cells.length).toBeGreaterThan(850);
    expect(past).toBeGreaterThan(550);
    expect(ahead).toBeGreaterThan(75);
    expect(rows.requests.filter((row) => openStates.includes(row.state))).toHaveLength(25);
  });

  test('its people are those whom the identity stand-in signs in', () => {
    const ours = Object.values(demoPeople).map(({ sub, name, grants }) => ({
      sub,
      name,
      roles: grants.map(({ role, site }) => (site === null ? role : `${role}@${site}`)),
    }));
    const theirs = standInPeople.map(({ sub, name, roles }) => ({ sub, name, roles: [...roles] }));
    expect(ours.toSorted(bySub)).toEqual(theirs.toSorted(bySub));
  });

  test('doors open in working hours only', () => {
    const sites = new Map(demo.rows.sites.map((row) => [row.id, row]));
    const siteOf = new Map(
      demo.rows.instruments.map((row) => [row.id, sites.get(row.siteId)?.code]),
    );
    for (const site of demo.rows.sites) {
      const calendar = calendarOf(demo, site.code);
      const doors = demo.rows.loadPhases.filter(
        (row) =>
          siteOf.get(row.chamberId) === site.code &&
          (row.phase === 'connect' || row.phase === 'unload'),
      );
      expect(doors.length).toBeGreaterThan(100);
      expect(doors.filter((row) => !isInWorkingHours(calendar, row.during))).toEqual([]);
    }
  });

  test('every booking is kept for at least its likely length', () => {
    const short = demo.rows.bookings.filter(
      (row) => row.during.endMs - row.during.startMs < row.likelyS * 1000,
    );
    expect(short).toEqual([]);
  });
});

describe('the demo in a database', () => {
  let home: TestDatabase;
  let database: Database;

  beforeAll(async () => {
    home = await createTestDatabase();
    database = connectDatabase({ url: home.ownerUrl, maxConnections: 2 });
    await loadDemo(database, order);
  });
  afterAll(async () => {
    await database.close();
    await home.drop();
  });

  async function count(query: ReturnType<typeof sql>): Promise<number> {
    const { rows } = await database.db.execute<{ count: number }>(query);
    return rows[0]?.count ?? NaN;
  }

  test('a database that holds records is left as it is', async () => {
    await expect(loadDemo(database, order)).rejects.toThrow(
      'The database already holds records: load the demo into an empty one, or give --force to empty this one first.',
    );
  });

  test('force empties the database first, and numbers go on after the highest', async () => {
    const counts = await loadDemo(database, { ...order, force: true });
    expect(await count(sql`select count(*)::int as count from site`)).toBe(2);
    expect(counts.openRequests).toBe(25);
    const isAhead = sql`select (nextval(pg_get_serial_sequence('booking', 'id')) > max(id))::int as count from booking`;
    expect(await count(isAhead)).toBe(1);
  });

  test('people of a real identity provider stop even force', async () => {
    const at = new Date(order.nowMs);
    const [stranger] = await database.db
      .insert(personsTable)
      .values({ providerKey: 'main', sub: 'real', name: 'R. Real', createdAt: at, updatedAt: at })
      .returning();
    await expect(loadDemo(database, { ...order, force: true })).rejects.toThrow(
      'The database holds people of a real identity provider',
    );
    await database.db.execute(sql`delete from person where id = ${stranger?.id ?? 0}`);
  });

  test('no cell is in two live bookings at once', async () => {
    const twice = sql`select count(*)::int as count
      from booking_cell a join booking x on x.id = a.booking_id and x.state <> 'cancelled'
      join booking_cell b on b.cell_id = a.cell_id and b.booking_id > a.booking_id
      join booking y on y.id = b.booking_id and y.state <> 'cancelled'
      where x.during && y.during`;
    expect(await count(twice)).toBe(0);
  });

  test('bookings to come pass every check, save those said to be at risk', async () => {
    const stopped = sql`select count(distinct booking_id)::int as count from check_result
      where outcome = 'stop' and booking_id in (select id from booking where not at_risk)`;
    const atRisk = sql`select count(*)::int as count from booking where at_risk`;
    const unchecked = sql`select count(*)::int as count from booking
      where state in ('tentative', 'confirmed', 'running')
        and (select count(*) from check_result c where c.booking_id = booking.id) < 25`;
    expect(await count(stopped)).toBe(0);
    expect(await count(unchecked)).toBe(0);
    expect(await count(atRisk)).toBeGreaterThan(2);
    expect(await count(atRisk)).toBeLessThan(20);
  });

  test('most open requests find a valid slot, and the others hear why not', async () => {
    const results = await database.transact(async (tx) => {
      const demo = buildDemo(order);
      const facilities = await loadDemoSites(tx, demo.nowMs);
      const open = demo.rows.requests.filter((row) => openStates.includes(row.state));
      const found = [];
      for (const { siteId, loaded } of facilities) {
        const lots = open
          .filter((row) => row.siteId === siteId)
          .map((row) => ({ id: row.id ?? 0, requestId: row.id ?? 0, lotId: lastLotOf(demo, row) }));
        for (const request of (await loadSlotRequests(tx, lots, demo.nowMs)).values()) {
          const horizonMs = demo.nowMs + 30 * dayMs;
          found.push(search(loaded.index, request, { options: 1, horizonMs, nowMs: demo.nowMs }));
        }
      }
      return found;
    });
    const withOffer = results.filter((result) => result.offers.length > 0);
    const unexplained = results.filter(
      (result) => result.offers.length === 0 && result.reasons.length === 0,
    );
    expect(results).toHaveLength(25);
    expect(withOffer.length).toBeGreaterThanOrEqual(15);
    expect(withOffer.length).toBeLessThan(25);
    expect(unexplained).toEqual([]);
  });
});

function bySub(a: { readonly sub: string }, b: { readonly sub: string }): number {
  return a.sub < b.sub ? -1 : 1;
}

function lastLotOf(demo: Demo, request: { readonly id?: number | undefined }): number {
  return demo.rows.lots.findLast((lot) => lot.requestId === request.id)?.id ?? 0;
}

function calendarOf(demo: Demo, code: string) {
  const site = demo.rows.sites.find((row) => row.code === code);
  if (site === undefined) {
    throw new Error(`The demo has no site ${code}.`);
  }
  const exceptions = demo.rows.siteExceptions.filter((row) => row.siteId === site.id);
  return buildCalendarIndex({ zone: site.zone, weekly: site.workingHours, exceptions });
}
