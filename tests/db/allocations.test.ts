import { eq, sql } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { connectDatabase, type Database, type Tx } from '#server/db/client.ts';
import { deferringClashes } from '#server/db/deferring-clashes.ts';
import { lockPlaces } from '#server/db/lock-places.ts';
import { allocationsTable } from '#server/db/tables/allocation.table.ts';
import { createTestDatabase, type TestDatabase } from '#tests/support/test-database.ts';
import { buildFacility, first, type TestFacility } from './build-facility.ts';
import { refusalOf } from './refusal-of.ts';

const hourMs = 3_600_000;
const dayMs = 24 * hourMs;
let home: TestDatabase;
let database: Database;
let facility: TestFacility;
let nextDay = Date.UTC(2031, 0, 1);

beforeAll(async () => {
  home = await createTestDatabase();
  database = connectDatabase({ url: home.url });
  facility = await buildFacility(database.db);
});
afterAll(async () => {
  await database.close();
  await home.drop();
});

/** A day no other test touches. */
function freshDay(): number {
  nextDay += dayMs;
  return nextDay;
}

function unit(index: number): number {
  const unitId = facility.unitIds[index];
  if (unitId === undefined) {
    throw new Error(`The facility has no unit ${index}.`);
  }
  return unitId;
}

async function allocate(unitId: number, startMs: number, endMs: number, live = true) {
  return database.transact(async (tx) => {
    await lockPlaces(tx, { chamberIds: [], unitIds: [unitId] });
    return insertAllocation(tx, unitId, startMs, endMs, live);
  });
}

async function insertAllocation(
  tx: Tx,
  unitId: number,
  startMs: number,
  endMs: number,
  live = true,
): Promise<number> {
  return first(
    await tx
      .insert(allocationsTable)
      .values({
        unitId,
        during: { startMs, endMs },
        live,
        outageId: facility.outageId,
        createdAt: new Date('2030-01-01T00:00:00Z'),
      })
      .returning({ id: allocationsTable.id }),
  );
}

describe('an allocation', () => {
  test('comes back with the milliseconds it was written with', async () => {
    const startMs = freshDay() + 1;
    const id = await allocate(unit(0), startMs, startMs + 997);
    const [row] = await database.db
      .select()
      .from(allocationsTable)
      .where(eq(allocationsTable.id, id));
    expect(row?.during).toEqual({ startMs, endMs: startMs + 997 });
  });

  test('of a unit that is taken over part of the time is refused by name', async () => {
    const day = freshDay();
    await allocate(unit(0), day, day + 4 * hourMs);
    await expect(refusalOf(allocate(unit(0), day + 3 * hourMs, day + 5 * hourMs))).resolves.toEqual(
      { code: '23P01', constraint: 'allocation_unit_free' },
    );
  });

  test('that touches another is accepted, on both sides', async () => {
    const day = freshDay();
    await allocate(unit(0), day + 4 * hourMs, day + 8 * hourMs);
    await expect(allocate(unit(0), day, day + 4 * hourMs)).resolves.toBeGreaterThan(0);
    await expect(allocate(unit(0), day + 8 * hourMs, day + 9 * hourMs)).resolves.toBeGreaterThan(0);
  });

  test('of another unit at the same time is accepted', async () => {
    const day = freshDay();
    await allocate(unit(0), day, day + hourMs);
    await expect(allocate(unit(1), day, day + hourMs)).resolves.toBeGreaterThan(0);
  });

  test('over one that is no longer live is accepted', async () => {
    const day = freshDay();
    await allocate(unit(0), day, day + hourMs, false);
    await expect(allocate(unit(0), day, day + hourMs)).resolves.toBeGreaterThan(0);
  });

  test('cannot come alive again over another', async () => {
    const day = freshDay();
    const dead = await allocate(unit(0), day, day + hourMs, false);
    await allocate(unit(0), day, day + hourMs);
    const revive = database.transact((tx) =>
      tx.update(allocationsTable).set({ live: true }).where(eq(allocationsTable.id, dead)),
    );
    await expect(refusalOf(revive)).resolves.toMatchObject({ constraint: 'allocation_unit_free' });
  });

  test.each([
    ['empty', 'empty'],
    ['open at its start', '(2032-01-01T00:00Z,2032-01-02T00:00Z)'],
    ['closed at its end', '[2032-01-01T00:00Z,2032-01-02T00:00Z]'],
    ['endless', '[2032-01-01T00:00Z,)'],
    ['without beginning', '(,2032-01-01T00:00Z)'],
  ])('whose span is %s is refused', async (_, span) => {
    const write = database.db.execute(
      sql`insert into allocation (unit_id, during, live, outage_id, created_at)
          values (${unit(0)}, ${span}::tstzrange, true, ${facility.outageId}, '2030-01-01')`,
    );
    await expect(refusalOf(write)).resolves.toEqual({
      code: '23514',
      constraint: 'allocation_during',
    });
  });

  test('without a reason is refused', async () => {
    const day = freshDay();
    const write = database.db.insert(allocationsTable).values({
      unitId: unit(0),
      during: { startMs: day, endMs: day + hourMs },
      live: true,
      createdAt: new Date('2030-01-01T00:00:00Z'),
    });
    await expect(refusalOf(write)).resolves.toMatchObject({
      constraint: 'allocation_has_one_reason',
    });
  });

  test('that ends before it starts never reaches the database', async () => {
    const day = freshDay();
    await expect(allocate(unit(0), day + hourMs, day)).rejects.toThrow(RangeError);
  });
});

describe('a swap of two units', () => {
  async function takeTwo(day: number) {
    return {
      left: await allocate(unit(2), day, day + hourMs),
      right: await allocate(unit(3), day, day + hourMs),
    };
  }

  async function putOn(tx: Tx, allocationId: number, unitId: number) {
    await tx.update(allocationsTable).set({ unitId }).where(eq(allocationsTable.id, allocationId));
  }

  test('is refused step by step, but passes as a whole', async () => {
    const { left, right } = await takeTwo(freshDay());
    const plain = database.transact(async (tx) => {
      await putOn(tx, left, unit(3));
      await putOn(tx, right, unit(2));
    });
    await expect(refusalOf(plain)).resolves.toMatchObject({ constraint: 'allocation_unit_free' });

    await database.transact(async (tx) => {
      await lockPlaces(tx, { chamberIds: [], unitIds: [unit(2), unit(3)] });
      await deferringClashes(tx, async () => {
        await putOn(tx, left, unit(3));
        await putOn(tx, right, unit(2));
      });
    });
    const [row] = await database.db
      .select()
      .from(allocationsTable)
      .where(eq(allocationsTable.id, left));
    expect(row?.unitId).toBe(unit(3));
  });

  test('that ends in a clash is refused inside the callback and leaves nothing changed', async () => {
    const { left } = await takeTwo(freshDay());
    let seenInside = '';
    const clash = database.transact(async (tx) => {
      try {
        await deferringClashes(tx, () => putOn(tx, left, unit(3)));
      } catch (error) {
        seenInside = (await refusalOf(Promise.reject(asError(error)))).constraint;
        throw error;
      }
    });
    await expect(refusalOf(clash)).resolves.toMatchObject({ code: '23P01' });
    expect(seenInside).toBe('allocation_unit_free');
    const [row] = await database.db
      .select()
      .from(allocationsTable)
      .where(eq(allocationsTable.id, left));
    expect(row?.unitId).toBe(unit(2));
  });
});

function asError(error: unknown): Error {
  return error instanceof Error ? error : new Error(String(error));
}
