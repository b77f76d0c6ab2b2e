import { eq, sql } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { connectDatabase, type Database } from '#server/db/client.ts';
import { findDatabaseFault } from '#server/db/db-errors.ts';
import { auditEventsTable } from '#server/db/tables/audit.table.ts';
import { createTestDatabase, type TestDatabase } from '#tests/support/test-database.ts';
import { refusalOf } from './refusal-of.ts';

let home: TestDatabase;
let application: Database;
let owner: Database;
let sealNo = 0;

beforeAll(async () => {
  home = await createTestDatabase();
  application = connectDatabase({ url: home.url });
  owner = connectDatabase({ url: home.ownerUrl });
});
afterAll(async () => {
  await application.close();
  await owner.close();
  await home.drop();
});

async function writeEvent(): Promise<number> {
  const [row] = await application.db
    .insert(auditEventsTable)
    .values({
      at: new Date('2030-01-01T00:00:00Z'),
      action: 'booking.confirm',
      subjectKind: 'booking',
      subjectId: 2418,
      after: { state: 'confirmed' },
    })
    .returning({ id: auditEventsTable.id });
  if (row === undefined) {
    throw new Error('The insert returned no row.');
  }
  return row.id;
}

async function codeOf(change: Promise<unknown>): Promise<string | undefined> {
  return change.then(
    () => undefined,
    (error: unknown) => findDatabaseFault(error)?.code,
  );
}

function sealing(id: number) {
  sealNo += 1;
  return application.db
    .update(auditEventsTable)
    .set({ sealNo, prevHash: 'a'.repeat(64), hash: 'b'.repeat(64) })
    .where(eq(auditEventsTable.id, id));
}

describe('the application', () => {
  test('has no right to change what an event says', async () => {
    const id = await writeEvent();
    const change = application.db
      .update(auditEventsTable)
      .set({ action: 'booking.cancel' })
      .where(eq(auditEventsTable.id, id));
    expect(await codeOf(change)).toBe('42501');
  });

  test('has no right to delete or empty the trail', async () => {
    const id = await writeEvent();
    const removal = application.db.delete(auditEventsTable).where(eq(auditEventsTable.id, id));
    expect(await codeOf(removal)).toBe('42501');
    expect(await codeOf(application.db.execute(sql`truncate audit_event`))).toBe('42501');
  });

  test('has no right to lift the rules', async () => {
    const lift = application.db.execute(sql`alter table audit_event disable trigger all`);
    expect(await codeOf(lift)).toBe('42501');
    const drop = application.db.execute(
      sql`alter table allocation drop constraint allocation_unit_free`,
    );
    expect(await codeOf(drop)).toBe('42501');
    expect(await codeOf(application.db.execute(sql`create table spare (id integer)`))).toBe(
      '42501',
    );
  });

  test('seals an event once, and never again', async () => {
    const id = await writeEvent();
    await sealing(id);
    await expect(refusalOf(sealing(id))).resolves.toMatchObject({
      constraint: 'audit_event_only_grows',
    });
  });

  test('cannot seal an event in part', async () => {
    const id = await writeEvent();
    const half = application.db
      .update(auditEventsTable)
      .set({ sealNo: 900_000 })
      .where(eq(auditEventsTable.id, id));
    await expect(refusalOf(half)).resolves.toMatchObject({
      constraint: 'audit_event_sealed_whole',
    });
  });
});

describe('the owner of the tables', () => {
  test('is refused a change, a removal and an emptying all the same', async () => {
    const id = await writeEvent();
    const change = owner.db
      .update(auditEventsTable)
      .set({ subjectId: 1, sealNo: 800_000, prevHash: 'a', hash: 'b' })
      .where(eq(auditEventsTable.id, id));
    const removal = owner.db.delete(auditEventsTable).where(eq(auditEventsTable.id, id));
    const emptying = owner.db.execute(sql`truncate audit_event`);
    for (const attempt of [change, removal, emptying]) {
      await expect(refusalOf(Promise.resolve(attempt))).resolves.toMatchObject({
        constraint: 'audit_event_only_grows',
      });
    }
  });
});
