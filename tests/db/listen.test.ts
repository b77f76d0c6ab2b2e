import { setTimeout as pause } from 'node:timers/promises';
import { sql } from 'drizzle-orm';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { connectDatabase } from '#server/db/client.ts';
import type { Database } from '#server/db/client.ts';
import { listenTo } from '#server/db/listen.ts';
import { createTestDatabase } from '#tests/support/test-database.ts';
import type { TestDatabase } from '#tests/support/test-database.ts';
import { eventually } from '#tests/support/worker-bench.ts';

let home: TestDatabase;
let database: Database;
beforeAll(async () => {
  home = await createTestDatabase();
  database = connectDatabase({ url: home.url, maxConnections: 2 });
});
afterAll(async () => {
  await database.close();
  await home.drop();
});

test('hears what was committed, connects again when cut off, and says so since it may have missed some', async () => {
  const heard: string[] = [];
  const losses: Error[] = [];
  const hears = (count: number) =>
    eventually(`${count} notices`, () => (heard.length >= count ? true : undefined));
  const listening = listenTo({
    url: home.url,
    channel: 'test_channel',
    onNotice: (payload) => heard.push(payload),
    onLost: (error) => losses.push(error),
  });
  await hears(1);
  await database.db.execute(sql`select pg_notify('test_channel', 'one')`);
  await hears(2);
  await database.db.execute(sql`
    select pg_terminate_backend(pid) from pg_stat_activity
    where datname = current_database() and application_name = 'millpond-listen'`);
  await hears(3);
  await database.db.execute(sql`select pg_notify('test_channel', 'two')`);
  await hears(4);
  await listening.close();

  expect(heard).toEqual(['', 'one', '', 'two']);
  expect(losses).toHaveLength(1);
});

test('goes on trying while the database does not answer, and stops when told', async () => {
  const losses: Error[] = [];
  const listening = listenTo({
    url: 'postgres://nobody@127.0.0.1:1/none',
    channel: 'test_channel',
    onNotice: () => undefined,
    onLost: (error) => losses.push(error),
  });
  await eventually('two attempts', () => (losses.length >= 2 ? true : undefined));
  await listening.close();
  const count = losses.length;
  await pause(1500);
  expect(losses).toHaveLength(count);
});
