import { setTimeout as pause } from 'node:timers/promises';
import pg from 'pg';
import { afterAll, beforeAll, expect, test } from 'vitest';
import type { SignedIn, SiteScope } from '#server/actor.ts';
import { connectDatabase } from '#server/db/client.ts';
import type { Database } from '#server/db/client.ts';
import { stabilityAssessmentsTable } from '#server/db/tables/stability-assessment.table.ts';
import type { BookingOrder } from '#server/features/bookings/booking-order.ts';
import { bookInside, prepareOrder } from '#server/features/bookings/confirm-booking.service.ts';
import { ProblemError } from '#server/problem.ts';
import { confirmBooking } from '#shared/contracts/bookings.contract.ts';
import type { Placement } from '#shared/contracts/check.schemas.ts';
import { buildBench } from '#tests/support/build-bench.ts';
import { buildBookableChamber } from '#tests/support/build-bookable.ts';
import type { BookableChamber, Keepers } from '#tests/support/build-bookable.ts';
import { buildCellType, buildProject, buildRequest } from '#tests/support/build-request.ts';
import { buildSite } from '#tests/support/build-site.ts';
import { startTestApp } from '#tests/support/test-app.ts';
import { createTestClock } from '#tests/support/test-clock.ts';
import { createTestDatabase } from '#tests/support/test-database.ts';
import type { TestDatabase } from '#tests/support/test-database.ts';
import { buildPersonRow } from '#tests/support/build-person-row.ts';

const clients = 32;
const rounds = 200;
/** Ours: a loser must be told at once, not after the others' whole bookings one by one. */
const longestWaitInMedians = 20;

const deps = { clock: createTestClock(), requestId: null };
let testDatabase: TestDatabase;
let database: Database;
let owner: pg.Client;
let site: SiteScope;
let keepers: Keepers;
let scheduler: SignedIn;
let projectId: number;
let cellTypeId: number;

beforeAll(async () => {
  testDatabase = await createTestDatabase();
  database = connectDatabase({ url: testDatabase.url, maxConnections: clients });
  owner = new pg.Client(testDatabase.ownerUrl);
  await owner.connect();
  const { db } = database;
  site = await buildSite(db, { code: 'larkfen', name: 'Larkfen' });
  const authorId = await buildPersonRow(db, 'Ada');
  keepers = { siteId: site.id, authorId, approverId: await buildPersonRow(db, 'Ben') };
  scheduler = {
    personId: authorId,
    name: 'Ada',
    grants: [{ role: 'scheduler', siteCode: 'larkfen' }],
    projectIds: [],
  };
  projectId = await buildProject(db);
  cellTypeId = await buildCellType(db, keepers.approverId);
});
afterAll(async () => {
  await owner.end();
  await database.close();
  await testDatabase.drop();
});

type OrderWish = {
  readonly setTemperatureC?: number;
  readonly startAt?: string;
  readonly paths: Placement['paths'];
  readonly cellTypeId?: number;
};

/** A request of its own with its own cell, read and judged while the chamber is still empty. */
async function buildOrder(chamber: BookableChamber, wish: OrderWish): Promise<BookingOrder> {
  const { setTemperatureC = 25 } = wish;
  const { requestId, lotId, version } = await buildRequest(database.db, {
    siteId: site.id,
    requesterId: scheduler.personId,
    projectId,
    cellTypeId: wish.cellTypeId ?? cellTypeId,
    request: { setTempMdegc: Math.round(setTemperatureC * 1000) },
  });
  return prepareOrder({ ...deps, db: database.db }, scheduler, site, {
    requestId,
    lotId,
    requestVersion: version,
    placement: {
      chamberTag: chamber.chamberTag,
      startAt: wish.startAt ?? '2026-03-03T09:00:00Z',
      setTemperatureC,
      joinsLoadId: null,
      paths: wish.paths,
    },
  });
}

type Finish = {
  readonly bookingId: number | null;
  readonly error: unknown;
  readonly waitMs: number;
};

async function race(order: BookingOrder): Promise<Finish> {
  const startedMs = performance.now();
  const finish = await database
    .transact((tx) => bookInside(deps, tx, site, order))
    .then(
      (bookingId) => ({ bookingId, error: null }),
      (error: unknown) => ({ bookingId: null, error }),
    );
  return { ...finish, waitMs: performance.now() - startedMs };
}

/** Everybody at once, again and again on an empty chamber: one wins, the others learn who. */
async function runRounds(
  orders: readonly BookingOrder[],
  namesClash: (detail: string, winner: { bookingId: number; loadId: number }) => boolean,
): Promise<void> {
  const longest: number[] = [];
  for (let round = 0; round < rounds; round += 1) {
    const finishes = await Promise.all(shuffle(orders, round).map(race));
    const winners = finishes.flatMap(({ bookingId }) => bookingId ?? []);
    expect(winners).toHaveLength(1);
    const [bookingId = 0] = winners;
    const winner = { bookingId, loadId: await loadOf(bookingId) };
    const losers = finishes.filter((finish) => finish.bookingId === null);
    for (const { error } of losers) {
      if (!(error instanceof ProblemError)) {
        throw error;
      }
      expect([error.status, error.code]).toEqual([409, 'booking.clash']);
      expect(namesClash(error.detail, winner), error.detail).toBe(true);
    }
    const waits = losers.map(({ waitMs }) => waitMs).toSorted((first, second) => first - second);
    const median = waits[Math.floor(waits.length / 2)] ?? 0;
    longest.push((waits.at(-1) ?? 0) / median);
    await giveBack();
  }
  expect(Math.max(...longest)).toBeLessThan(longestWaitInMedians);
  expect(database.retryCount()).toBe(0);
  expect(await countDeadlocks()).toBe(0);
}

/** Another client is first each round. */
function shuffle(orders: readonly BookingOrder[], round: number): readonly BookingOrder[] {
  const cut = (round * 7) % orders.length;
  return [...orders.slice(cut), ...orders.slice(0, cut)];
}

async function loadOf(bookingId: number): Promise<number> {
  const { rows } = await owner.query<{ load_id: number }>(
    'select load_id from booking where id = $1',
    [bookingId],
  );
  return rows[0]?.load_id ?? 0;
}

/** As if nothing had been booked; the orders stay good. */
async function giveBack(): Promise<void> {
  await owner.query(`
    delete from check_result; delete from allocation; delete from booking_cell; delete from booking;
    delete from load_phase; delete from chamber_load;
    update request set state = 'submitted', version = 1 where state <> 'submitted';`);
}

/** The server's own count, so that none is missed that was tried again. */
async function countDeadlocks(): Promise<number> {
  await pause(1500);
  const { rows } = await owner.query<{ deadlocks: number }>(
    'select deadlocks::int from pg_stat_database where datname = current_database()',
  );
  return rows[0]?.deadlocks ?? -1;
}

test(
  '32 clients race for the same channels and position: one wins, the others are told by which booking',
  { timeout: 180_000 },
  async () => {
    const chamber = await buildBookableChamber(database.db, keepers, { number: '01', size: 2 });
    const orders: BookingOrder[] = [];
    for (let client = 0; client < clients; client += 1) {
      orders.push(await buildOrder(chamber, { paths: chamber.paths.slice(0, 1) }));
    }
    await runRounds(orders, (detail, { bookingId }) =>
      detail.startsWith(`S01/1 is taken by booking ${bookingId} until Tue 3 Mar`),
    );
  },
);

test(
  '32 clients want one chamber at 32 temperatures: one wins, the others are told what it keeps',
  { timeout: 180_000 },
  async () => {
    const chamber = await buildBookableChamber(database.db, keepers, {
      number: '02',
      size: clients,
      isStrict: false,
    });
    const temperatures = Array.from({ length: clients }, (_, client) => 12 + client);
    await database.db
      .insert(stabilityAssessmentsTable)
      .values(temperatures.map((temperatureC) => logAt(chamber, temperatureC)));
    const orders: BookingOrder[] = [];
    for (const [client, setTemperatureC] of temperatures.entries()) {
      const paths = chamber.paths.slice(client, client + 1);
      orders.push(await buildOrder(chamber, { setTemperatureC, paths }));
    }
    await runRounds(orders, (detail, { loadId }) =>
      new RegExp(`^Load ${loadId} keeps C02 at \\d+ °C until Tue 3 Mar .* wants \\d+ °C`).test(
        detail,
      ),
    );
  },
);

test(
  '32 clients would open the door into each other’s still phases: one wins, the others are told whose',
  { timeout: 180_000 },
  async () => {
    const chamber = await buildBookableChamber(database.db, keepers, {
      number: '03',
      size: clients,
    });
    // A slow cell: its still phases last longer than from the first start to the last.
    const slowTypeId = await buildCellType(database.db, keepers.approverId, {
      capacitanceFPerAh: 8000,
      resistanceOhm: 0.5,
      entropicCoefficientVPerK: 1e-6,
    });
    const firstMs = Date.parse('2026-03-03T09:00:00Z');
    const orders: BookingOrder[] = [];
    for (let client = 0; client < clients; client += 1) {
      const paths = chamber.paths.slice(client, client + 1);
      const startAt = new Date(firstMs + client * 900_000).toISOString();
      orders.push(await buildOrder(chamber, { startAt, paths, cellTypeId: slowTypeId }));
    }
    await runRounds(orders, (detail, { loadId }) =>
      new RegExp(`^The \\w+ of this slot and the \\w+ of load ${loadId} in C03`).test(detail),
    );
  },
);

test('through the whole server it is the same', { timeout: 120_000 }, async () => {
  const app = await startTestApp();
  try {
    const bench = await buildBench(app, { size: 1 });
    for (let round = 0; round < 5; round += 1) {
      const startAt = `2026-03-${String(3 + round * 7).padStart(2, '0')}T09:00:00Z`;
      const calls = await Promise.all(
        Array.from({ length: clients }, async () => {
          const { requestId, lotId, version: requestVersion } = await bench.request();
          const { chamberTag, paths } = bench.chamber;
          const placement = { chamberTag, startAt, setTemperatureC: 25, joinsLoadId: null, paths };
          return { body: { requestId, lotId, requestVersion, placement } };
        }),
      );
      const answers = await Promise.all(
        calls.map((call) => app.send(confirmBooking, bench.scheduler, call)),
      );
      const statuses = answers.map(({ status }) => status).toSorted();
      expect(statuses).toEqual([201, ...Array.from({ length: clients - 1 }, () => 409)]);
      for (const answer of answers.filter(({ status }) => status === 409)) {
        expect(await answer.text()).toMatch(/is taken by booking \d+ until Tue/);
      }
    }
    expect(app.database.retryCount()).toBe(0);
  } finally {
    await app.stop();
  }
});

function logAt(
  chamber: BookableChamber,
  temperatureC: number,
): typeof stabilityAssessmentsTable.$inferInsert {
  const at = new Date('2026-02-16T09:00:00Z');
  return {
    chamberId: chamber.chamberId,
    setTempMdegc: temperatureC * 1000,
    assessedOn: '2026-02-16',
    logFromAt: new Date('2026-02-12T12:00:00Z'),
    logToAt: new Date('2026-02-15T12:00:00Z'),
    hoursLogged: 72,
    driftKPerH: 0.0005,
    halfBandK: 0.0005,
    periodS: 600,
    resolutionK: 0.001,
    sensorPlace: 'air',
    doorTolerant: true,
    assessedById: keepers.authorId,
    createdAt: at,
    updatedAt: at,
  };
}
