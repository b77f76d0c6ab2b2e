import { eq } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { connectDatabase, type Database } from '#server/db/client.ts';
import { deferringClashes } from '#server/db/deferring-clashes.ts';
import { lockPlaces } from '#server/db/lock-places.ts';
import { chamberSpecsTable } from '#server/db/tables/chamber.table.ts';
import { chamberLoadsTable, loadPhasesTable } from '#server/db/tables/load.table.ts';
import { createTestDatabase, type TestDatabase } from '#tests/support/test-database.ts';
import { buildFacility, type TestFacility } from './build-facility.ts';
import { buildLoad, type TestLoad } from './build-load.ts';
import { refusalOf } from './refusal-of.ts';

const hourMs = 3_600_000;
const idle = 25_000;
const warm = 45_000;
let home: TestDatabase;
let database: Database;
let facility: TestFacility;
let nextWeek = Date.UTC(2031, 0, 1);

/** A load at the idle temperature: it has no ramp and no return. 8 h 30 min in all. */
const idlePhases = [
  ['connect', 30],
  ['soak', 60],
  ['match', 30],
  ['hold', 300],
  ['measure', 60],
  ['unload', 30],
] as const;
/** 7 h in all; the first hour, connect and ramp, disturbs. */
const warmPhases = [
  ['connect', 30],
  ['ramp', 30],
  ['soak', 60],
  ['match', 30],
  ['hold', 120],
  ['measure', 60],
  ['return', 60],
  ['unload', 30],
] as const;

beforeAll(async () => {
  home = await createTestDatabase();
  database = connectDatabase({ url: home.url });
  facility = await buildFacility(database.db);
});
afterAll(async () => {
  await database.close();
  await home.drop();
});

function freshWeek(): number {
  nextWeek += 7 * 24 * hourMs;
  return nextWeek;
}

async function put(load: Omit<TestLoad, 'strict'>): Promise<number> {
  return database.transact(async (tx) => {
    await lockPlaces(tx, { chamberIds: [load.chamberId], unitIds: [] });
    return buildLoad(tx, { ...load, strict: load.chamberId === facility.strictChamberId });
  });
}

const idleLoad = (chamberId: number, startMs: number) => ({
  chamberId,
  startMs,
  setTempMdegc: idle,
  phases: idlePhases,
});
const warmLoad = (chamberId: number, startMs: number, setTempMdegc = warm) => ({
  chamberId,
  startMs,
  setTempMdegc,
  phases: warmPhases,
});

describe('the still flag', () => {
  test.each([
    ['strict', false],
    ['tolerant', null],
  ] as const)('in a %s chamber is %s for the door', async (rule, door) => {
    const chamberId = rule === 'strict' ? facility.strictChamberId : facility.tolerantChamberId;
    const loadId = await put(warmLoad(chamberId, freshWeek()));
    const rows = await database.db
      .select()
      .from(loadPhasesTable)
      .where(eq(loadPhasesTable.loadId, loadId))
      .orderBy(loadPhasesTable.seq);
    expect(rows.map((row) => row.still)).toEqual([
      door,
      false,
      true,
      true,
      true,
      true,
      false,
      door,
    ]);
  });
});

describe('two loads in a tolerant chamber', () => {
  test('may overlap at the idle temperature, door openings included', async () => {
    const week = freshWeek();
    await put(idleLoad(facility.tolerantChamberId, week));
    await expect(
      put(idleLoad(facility.tolerantChamberId, week + 3 * hourMs)),
    ).resolves.toBeGreaterThan(0);
  });

  test('may not overlap at different set temperatures', async () => {
    const week = freshWeek();
    await put(idleLoad(facility.tolerantChamberId, week));
    await expect(
      refusalOf(put(warmLoad(facility.tolerantChamberId, week + 3 * hourMs))),
    ).resolves.toEqual({ code: '23P01', constraint: 'load_phase_one_temperature' });
  });

  test('may not overlap at the same warm temperature: the second connect is at idle', async () => {
    const week = freshWeek();
    await put(warmLoad(facility.tolerantChamberId, week));
    await expect(
      refusalOf(put(warmLoad(facility.tolerantChamberId, week + 2 * hourMs))),
    ).resolves.toMatchObject({ constraint: 'load_phase_one_temperature' });
  });

  test('may follow each other without a gap', async () => {
    const week = freshWeek();
    await put(warmLoad(facility.tolerantChamberId, week));
    await expect(
      put(warmLoad(facility.tolerantChamberId, week + 7 * hourMs, 10_000)),
    ).resolves.toBeGreaterThan(0);
  });

  test('may share a door opening at the idle temperature', async () => {
    const week = freshWeek();
    await put(warmLoad(facility.tolerantChamberId, week));
    await expect(
      put(warmLoad(facility.tolerantChamberId, week + 6.5 * hourMs, 10_000)),
    ).resolves.toBeGreaterThan(0);
  });

  test('a ramp at the same temperature may not fall into a hold', async () => {
    const week = freshWeek();
    await put(idleLoad(facility.tolerantChamberId, week));
    const ramping = put({
      chamberId: facility.tolerantChamberId,
      startMs: week + 3 * hourMs,
      setTempMdegc: idle,
      phases: [['ramp', 30]],
    });
    await expect(refusalOf(ramping)).resolves.toEqual({
      code: '23P01',
      constraint: 'load_phase_still',
    });
  });
});

describe('two loads in a strict chamber', () => {
  test('may not overlap even at the idle temperature: the door disturbs', async () => {
    const week = freshWeek();
    await put(idleLoad(facility.strictChamberId, week));
    await expect(
      refusalOf(put(idleLoad(facility.strictChamberId, week + 3 * hourMs))),
    ).resolves.toEqual({ code: '23P01', constraint: 'load_phase_still' });
  });

  test('may share a door opening at the idle temperature', async () => {
    const week = freshWeek();
    await put(idleLoad(facility.strictChamberId, week));
    await expect(
      put(idleLoad(facility.strictChamberId, week + 8 * hourMs)),
    ).resolves.toBeGreaterThan(0);
  });
});

describe('a load', () => {
  test('that is no longer live frees its time', async () => {
    const week = freshWeek();
    const cancelled = await put(warmLoad(facility.tolerantChamberId, week));
    await database.transact(async (tx) => {
      await tx
        .update(loadPhasesTable)
        .set({ live: false })
        .where(eq(loadPhasesTable.loadId, cancelled));
    });
    await expect(put(warmLoad(facility.tolerantChamberId, week))).resolves.toBeGreaterThan(0);
  });

  test('that is cancelled cannot stay live', async () => {
    const loadId = await put(warmLoad(facility.tolerantChamberId, freshWeek()));
    const cancel = database.db
      .update(chamberLoadsTable)
      .set({ state: 'cancelled' })
      .where(eq(chamberLoadsTable.id, loadId));
    await expect(refusalOf(cancel)).resolves.toMatchObject({
      constraint: 'chamber_load_cancelled_is_not_live',
    });
  });

  test('moved to another chamber takes its phases along and follows its door rule', async () => {
    const loadId = await put(idleLoad(facility.tolerantChamberId, freshWeek()));
    await move(loadId, facility.strictChamberId, true);
    const rows = await database.db
      .select()
      .from(loadPhasesTable)
      .where(eq(loadPhasesTable.loadId, loadId))
      .orderBy(loadPhasesTable.seq);
    expect(new Set(rows.map((row) => row.chamberId))).toEqual(new Set([facility.strictChamberId]));
    expect(rows[0]).toMatchObject({ phase: 'connect', strict: true, still: false });
  });

  test('cannot be moved where another load holds still', async () => {
    const week = freshWeek();
    await put(idleLoad(facility.strictChamberId, week));
    const loadId = await put(idleLoad(facility.tolerantChamberId, week + 3 * hourMs));
    await expect(refusalOf(move(loadId, facility.strictChamberId, true))).resolves.toMatchObject({
      constraint: 'load_phase_still',
    });
  });

  test('swaps places with another in one transaction', async () => {
    const week = freshWeek();
    const here = await put(warmLoad(facility.tolerantChamberId, week));
    const there = await put(warmLoad(facility.secondTolerantChamberId, week, 10_000));
    await database.transact(async (tx) => {
      await lockPlaces(tx, {
        chamberIds: [facility.secondTolerantChamberId, facility.tolerantChamberId],
        unitIds: [],
      });
      await deferringClashes(tx, async () => {
        await tx
          .update(chamberLoadsTable)
          .set({ chamberId: facility.secondTolerantChamberId })
          .where(eq(chamberLoadsTable.id, here));
        await tx
          .update(chamberLoadsTable)
          .set({ chamberId: facility.tolerantChamberId })
          .where(eq(chamberLoadsTable.id, there));
      });
    });
    const rows = await database.db
      .select({ chamberId: loadPhasesTable.chamberId })
      .from(loadPhasesTable)
      .where(eq(loadPhasesTable.loadId, there));
    expect(rows.every((row) => row.chamberId === facility.tolerantChamberId)).toBe(true);
  });

  test('cannot claim a door rule its chamber does not have', async () => {
    const lie = database.transact((tx) =>
      buildLoad(tx, { ...idleLoad(facility.strictChamberId, freshWeek()), strict: false }),
    );
    await expect(refusalOf(lie)).resolves.toMatchObject({ constraint: 'chamber_load_chamber' });
  });

  async function move(loadId: number, chamberId: number, strict: boolean): Promise<void> {
    await database.transact(async (tx) => {
      await lockPlaces(tx, {
        chamberIds: [facility.tolerantChamberId, facility.strictChamberId],
        unitIds: [],
      });
      await deferringClashes(tx, async () => {
        await tx
          .update(chamberLoadsTable)
          .set({ chamberId, strict })
          .where(eq(chamberLoadsTable.id, loadId));
      });
    });
  }
});

describe('a chamber whose door rule is tightened', () => {
  test('is refused while loads overlap in it, and else passes the rule on', async () => {
    const week = freshWeek();
    await put(idleLoad(facility.secondTolerantChamberId, week));
    const overlapping = await put(idleLoad(facility.secondTolerantChamberId, week + 3 * hourMs));
    await expect(refusalOf(tighten())).resolves.toMatchObject({ constraint: 'load_phase_still' });

    await database.db
      .update(loadPhasesTable)
      .set({ live: false })
      .where(eq(loadPhasesTable.loadId, overlapping));
    await tighten();
    const [load] = await database.db
      .select()
      .from(chamberLoadsTable)
      .where(eq(chamberLoadsTable.id, overlapping));
    expect(load?.strict).toBe(true);
  });

  function tighten() {
    return database.transact((tx) =>
      tx
        .update(chamberSpecsTable)
        .set({ strict: true })
        .where(eq(chamberSpecsTable.instrumentId, facility.secondTolerantChamberId)),
    );
  }
});
