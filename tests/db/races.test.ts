import { afterAll, beforeAll, beforeEach, describe, expect, test } from 'vitest';
import { connectDatabase, type Database, type Tx } from '#server/db/client.ts';
import { lockPlaces } from '#server/db/lock-places.ts';
import { allocationsTable } from '#server/db/tables/allocation.table.ts';
import { createTestDatabase, type TestDatabase } from '#tests/support/test-database.ts';
import { buildFacility, type TestFacility } from './build-facility.ts';
import { buildLoad } from './build-load.ts';
import { clientCount, type RaceResult, roundCount, runRace } from './run-race.ts';

const minuteMs = 60_000;
const weekMs = 7 * 24 * 60 * minuteMs;
let home: TestDatabase;
let database: Database;
let facility: TestFacility;

beforeAll(async () => {
  home = await createTestDatabase();
  database = connectDatabase({ url: home.url, maxConnections: clientCount });
  facility = await buildFacility(database.db);
});
/** What the losers of one race leave behind would slow the next one down. */
beforeEach(async () => {
  const owner = connectDatabase({ url: home.ownerUrl, maxConnections: 1 });
  await owner.pool.query('vacuum (analyze) allocation, chamber_load, load_phase');
  await owner.close();
});
afterAll(async () => {
  await database.close();
  await home.drop();
});

/** Rounds lie a week apart, so that none meets another. */
function startOf(round: number): number {
  return Date.UTC(2031, 0, 1) + round * weekMs;
}

function expectOneWinner(race: RaceResult, refusal: string): void {
  expect(race.wins).toEqual(Array.from({ length: roundCount }, () => 1));
  expect([...race.refusals]).toEqual([[refusal, roundCount * (clientCount - 1)]]);
  expect({ retries: race.retries, deadlocks: race.deadlocks }).toEqual({
    retries: 0,
    deadlocks: 0,
  });
  expect(race.worstWait).toBeLessThan(20);
}

describe('32 clients at once, 200 times over', () => {
  test(
    'who want the same units, named in any order: one gets them',
    { timeout: 120_000 },
    async () => {
      const race = await runRace(database, async (tx, round, client) => {
        const wanted = rotated(facility.unitIds, client).slice(0, 5);
        await lockPlaces(tx, { chamberIds: [], unitIds: wanted });
        await allocate(tx, wanted, startOf(round) + client * minuteMs);
      });
      expectOneWinner(race, '23P01 allocation_unit_free');
    },
  );

  test(
    'who want one chamber at different temperatures: one gets it',
    { timeout: 120_000 },
    async () => {
      const race = await runRace(database, async (tx, round, client) => {
        await lockPlaces(tx, { chamberIds: [facility.tolerantChamberId], unitIds: [] });
        await buildLoad(tx, {
          chamberId: facility.tolerantChamberId,
          strict: false,
          startMs: startOf(round) + client * minuteMs,
          setTempMdegc: 30_000 + client * 500,
          phases: [
            ['connect', 30],
            ['ramp', 30],
            ['hold', 360],
            ['return', 60],
          ],
        });
      });
      expectOneWinner(race, '23P01 load_phase_one_temperature');
    },
  );

  test(
    'who would open a strict door in each other’s holds: one may',
    { timeout: 120_000 },
    async () => {
      const race = await runRace(database, async (tx, round, client) => {
        await lockPlaces(tx, { chamberIds: [facility.strictChamberId], unitIds: [] });
        await buildLoad(tx, {
          chamberId: facility.strictChamberId,
          strict: true,
          startMs: startOf(round) + client * 15 * minuteMs,
          setTempMdegc: 25_000,
          phases: [
            ['connect', 15],
            ['soak', 60],
            ['hold', 600],
            ['unload', 15],
          ],
        });
      });
      expectOneWinner(race, '23P01 load_phase_still');
    },
  );

  test('who would ramp in each other’s holds: one may', { timeout: 120_000 }, async () => {
    const race = await runRace(database, async (tx, round, client) => {
      const chamberId = facility.secondTolerantChamberId;
      await lockPlaces(tx, { chamberIds: [chamberId], unitIds: [] });
      await buildLoad(tx, {
        chamberId,
        strict: false,
        startMs: startOf(round) + client * 15 * minuteMs,
        setTempMdegc: 45_000,
        phases: [
          ['ramp', 15],
          ['soak', 60],
          ['hold', 600],
          ['return', 15],
        ],
      });
    });
    expectOneWinner(race, '23P01 load_phase_still');
  });
});

async function allocate(tx: Tx, unitIds: readonly number[], startMs: number): Promise<void> {
  await tx.insert(allocationsTable).values(
    unitIds.map((unitId) => ({
      unitId,
      during: { startMs, endMs: startMs + 240 * minuteMs },
      live: true,
      outageId: facility.outageId,
      createdAt: new Date('2030-01-01T00:00:00Z'),
    })),
  );
}

/** Starts at another place for each client; odd clients run backwards. Five of eight always meet. */
function rotated(ids: readonly number[], client: number): number[] {
  const start = client % ids.length;
  const turned = [...ids.slice(start), ...ids.slice(0, start)];
  return client % 2 === 0 ? turned : turned.reverse();
}
