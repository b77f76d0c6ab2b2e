import { execFile } from 'node:child_process';
import { promisify } from 'node:util';
import { createPostgresBackend, Queue, setDefaultBackendFactory } from 'bullmq';
import pg from 'pg';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { migrateDatabase } from '#server/db/migrate-database.ts';
import { createTestDatabase, type TestDatabase } from '#tests/support/test-database.ts';

const run = promisify(execFile);
let home: TestDatabase;

beforeAll(async () => {
  home = await createTestDatabase();
});
afterAll(async () => {
  await home.drop();
});

async function ask(url: string, query: string): Promise<unknown[]> {
  const client = new pg.Client({ connectionString: url });
  await client.connect();
  try {
    const { rows } = await client.query<Record<string, unknown>>(query);
    return rows;
  } finally {
    await client.end();
  }
}

describe('migrating', () => {
  test('a database that is up to date changes nothing', async () => {
    await expect(migrateDatabase(home.ownerUrl)).resolves.toEqual({ appliedCount: 0 });
  });

  test('twice at the same moment does it once', async () => {
    await ask(home.ownerUrl, 'drop schema bullmq cascade');
    await ask(home.ownerUrl, 'drop schema drizzle cascade');
    await ask(home.ownerUrl, 'drop schema public cascade');
    await ask(home.ownerUrl, 'create schema public');
    const outcomes = await Promise.all([
      migrateDatabase(home.ownerUrl),
      migrateDatabase(home.ownerUrl),
    ]);
    const counts = outcomes.map((outcome) => outcome.appliedCount);
    expect(Math.min(...counts)).toBe(0);
    expect(Math.max(...counts)).toBeGreaterThanOrEqual(4);
  });

  test('leaves the counters unlogged and the trail logged', async () => {
    const rows = await ask(
      home.url,
      `select relname, relpersistence from pg_class
       where relname in ('rate_limit', 'audit_event') and relnamespace = 'public'::regnamespace
       order by relname`,
    );
    expect(rows).toEqual([
      { relname: 'audit_event', relpersistence: 'p' },
      { relname: 'rate_limit', relpersistence: 'u' },
    ]);
  });

  test('gives the application rights on every table, and none to empty one', async () => {
    const rows = await ask(
      home.url,
      `select relname from pg_class
       where relnamespace = 'public'::regnamespace and relkind = 'r'
         and (not has_table_privilege(oid, 'select') or not has_table_privilege(oid, 'insert')
           or has_table_privilege(oid, 'truncate') or has_table_privilege(oid, 'trigger'))`,
    );
    expect(rows).toEqual([]);
  });

  test('gives the application the queue, but not its tables to change', async () => {
    setDefaultBackendFactory(createPostgresBackend);
    const queue = new Queue('probe', { connection: { connectionString: home.url } });
    try {
      const job = await queue.add('check', { bookingId: 2418 });
      expect(await queue.getWaitingCount()).toBe(1);
      await job.remove();
      expect(await queue.getWaitingCount()).toBe(0);
    } finally {
      await queue.close();
    }
    await expect(ask(home.url, 'alter table bullmq.job add column spare integer')).rejects.toThrow(
      'must be owner of table job',
    );
  });

  test('says in one sentence that the server does not answer', async () => {
    await expect(migrateDatabase('postgres://millpond_owner@127.0.0.1:1/none')).rejects.toThrow(
      "The database server at 127.0.0.1:1 does not answer: start it, or correct the owner's address, and migrate again.",
    );
  });

  test('says in one sentence that the role may not', async () => {
    await ask(home.ownerUrl, 'drop schema drizzle cascade');
    await expect(migrateDatabase(home.url)).rejects.toThrow(
      /could not be migrated.*permission denied/,
    );
  });
});

describe('the migrate command', () => {
  test('asks for the address of the owner and fails without it', async () => {
    const attempt = run('node_modules/.bin/tsx', ['server/cli/migrate.ts'], {
      env: { PATH: process.env['PATH'] },
    });
    await expect(attempt).rejects.toMatchObject({
      code: 2,
      stderr:
        'Set DATABASE_OWNER_URL to the postgres:// address of the role that owns the tables.\n',
    });
  });
});
