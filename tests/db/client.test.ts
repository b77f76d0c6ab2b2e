import { eq, sql } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { connectDatabase, type Database } from '#server/db/client.ts';
import {
  ConstraintError,
  isDatabaseUnavailable,
  translatingConstraints,
} from '#server/db/db-errors.ts';
import { lockInstruments, lockPlaces } from '#server/db/lock-places.ts';
import { instrumentsTable } from '#server/db/tables/instrument.table.ts';
import { sitesTable } from '#server/db/tables/site.table.ts';
import { createTestDatabase, type TestDatabase } from '#tests/support/test-database.ts';
import { buildFacility, first, type TestFacility } from './build-facility.ts';

const at = new Date('2030-01-01T00:00:00Z');
let home: TestDatabase;
let database: Database;
let facility: TestFacility;

beforeAll(async () => {
  home = await createTestDatabase();
  database = connectDatabase({ url: home.url });
  facility = await buildFacility(database.db);
});
afterAll(async () => {
  await database.close();
  await home.drop();
});

/** Lets both sides of a race take their first lock before either asks for its second. */
function meetingPoint(count: number): () => Promise<void> {
  let arrived = 0;
  let open: () => void = () => undefined;
  const everybodyIsHere = new Promise<void>((resolve) => {
    open = resolve;
  });
  return async () => {
    arrived += 1;
    if (arrived === count) {
      open();
    }
    await everybodyIsHere;
  };
}

describe('a session', () => {
  test('speaks UTC', async () => {
    const { rows } = await database.db.execute(sql`show timezone`);
    expect(rows).toEqual([{ TimeZone: 'UTC' }]);
  });
});

describe('transact', () => {
  test('runs a deadlocked transaction again and counts it', async () => {
    const [left, right] = [facility.strictChamberId, facility.tolerantChamberId];
    const meet = meetingPoint(2);
    const before = database.retryCount();
    const touchBoth = (from: number, to: number) =>
      database.transact(async (tx) => {
        const touch = (id: number) =>
          tx
            .update(instrumentsTable)
            .set({ note: `first ${from}` })
            .where(eq(instrumentsTable.id, id));
        await touch(from);
        await meet();
        await touch(to);
      });
    await Promise.all([touchBoth(left, right), touchBoth(right, left)]);
    expect(database.retryCount()).toBe(before + 1);
  });

  test('leaves nothing behind when the work fails, and tries no second time', async () => {
    let runs = 0;
    const work = database.transact(async (tx) => {
      runs += 1;
      await tx.update(sitesTable).set({ name: 'never' });
      throw new Error('changed my mind');
    });
    await expect(work).rejects.toThrow('changed my mind');
    expect(runs).toBe(1);
    const [site] = await database.db.select().from(sitesTable);
    expect(site?.name).toBe('Millrace');
  });
});

describe('a broken rule', () => {
  const twin = () =>
    database.db.insert(sitesTable).values({
      code: 'millrace',
      name: 'Twin',
      zone: 'Europe/Dublin',
      workingHours: {},
      createdAt: at,
      updatedAt: at,
    });

  test('becomes what the repository says for it', async () => {
    const write = translatingConstraints(
      { site_code: (broken) => new Error(`taken: ${broken.kind}`) },
      twin,
    );
    await expect(write).rejects.toThrow('taken: duplicate');
  });

  test('that nobody translates arrives by its name', async () => {
    const write = translatingConstraints({}, twin);
    await expect(write).rejects.toBeInstanceOf(ConstraintError);
    await expect(write).rejects.toMatchObject({ constraint: 'site_code', code: '23505' });
  });

  test('is not what a lost server is', async () => {
    const nowhere = connectDatabase({ url: 'postgres://nobody@127.0.0.1:1/none' });
    const lost: unknown = await nowhere.db.execute(sql`select 1`).catch((error: unknown) => error);
    expect(isDatabaseUnavailable(lost)).toBe(true);
    const broken: unknown = await twin().catch((error: unknown) => error);
    expect(isDatabaseUnavailable(broken)).toBe(false);
    await nowhere.close();
  });
});

describe('locking places', () => {
  test('names the unit that is not there', async () => {
    const lock = database.transact((tx) => lockPlaces(tx, { chamberIds: [], unitIds: [987_654] }));
    await expect(lock).rejects.toThrow('There is no unit with the id 987654.');
  });

  test('of an instrument takes everything mounted below it', async () => {
    const mainframeId = first(
      await database.db
        .insert(instrumentsTable)
        .values({
          tag: 'M01',
          kind: 'mainframe',
          model: 'Rack',
          siteId: facility.siteId,
          state: 'in-service',
          createdAt: at,
          updatedAt: at,
        })
        .returning({ id: instrumentsTable.id }),
    );
    await database.db
      .update(instrumentsTable)
      .set({ parentId: mainframeId })
      .where(eq(instrumentsTable.id, facility.strictChamberId));
    const locked = await database.transact((tx) => lockInstruments(tx, [mainframeId]));
    expect(locked.chamberIds).toEqual([facility.strictChamberId]);
    expect([...locked.unitIds].sort((a, b) => a - b)).toEqual(facility.unitIds);
    expect(locked.instrumentIds).toEqual([facility.strictChamberId, mainframeId]);
  });

  test('makes a second one wait until the first is done', async () => {
    const places = { chamberIds: [facility.strictChamberId], unitIds: facility.unitIds };
    const order: string[] = [];
    let first = Promise.resolve();
    await database.transact(async (tx) => {
      await lockPlaces(tx, places);
      first = database.transact(async (later) => {
        await lockPlaces(later, places);
        order.push('second');
      });
      await tx.execute(sql`select pg_sleep(0.2)`);
      order.push('first');
    });
    await first;
    expect(order).toEqual(['first', 'second']);
  });
});
