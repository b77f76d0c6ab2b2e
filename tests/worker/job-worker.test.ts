import { sql } from 'drizzle-orm';
import pg from 'pg';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { outboxTable } from '#server/db/tables/outbox.table.ts';
import { addToOutbox } from '#server/features/outbox/outbox.service.ts';
import { openBullmqBackend } from '#server/jobs/bullmq-backend.ts';
import { pruneOutboxJob } from '#server/jobs/definitions/prune-outbox.job.ts';
import { startWorker } from '#worker/start-worker.ts';
import type { RunningWorker } from '#worker/start-worker.ts';
import { createWorkerBench, eventually } from '#tests/support/worker-bench.ts';
import type { LogLine, WorkerBench } from '#tests/support/worker-bench.ts';

let bench: WorkerBench;
let worker: RunningWorker;
let opened: ReturnType<ReturnType<typeof openBullmqBackend>['openQueue']>;
beforeAll(async () => {
  bench = await createWorkerBench({ JOB_LOCK_S: '2' });
  const { config, clock, log } = bench;
  worker = await startWorker(config, { clock, log });
  opened = openBullmqBackend({
    databaseUrl: config.database.url,
    redisUrl: null,
    onConnectionError: () => undefined,
  }).openQueue();
  opened.queue.on('error', () => undefined);
});
afterAll(async () => {
  await worker.stop();

  await opened.queue.close();
  await opened.end();
  await bench.drop();
});

function lineOf(msg: string, about: Record<string, unknown>): LogLine | undefined {
  return bench.lines.find(
    (line) =>
      line.msg === msg && Object.entries(about).every(([name, value]) => line[name] === value),
  );
}

async function haveOutboxPruned(requestId: string): Promise<void> {
  await bench.deps.transact((tx) =>
    addToOutbox({ ...bench.deps, requestId }, tx, pruneOutboxJob, [{}]),
  );
}

test('an effect is done by the worker, and its log names the call that caused it', async () => {
  await bench.db.insert(outboxTable).values({
    topic: 'prune-outbox',
    payload: {},
    createdAt: new Date('2026-01-01T00:00:00Z'),
    relayedAt: new Date('2026-01-01T00:00:01Z'),
  });
  await haveOutboxPruned('call-11');

  await eventually('the job', () => lineOf('job done', { requestId: 'call-11' }));
  const { rows } = await bench.db.execute(sql`
    select count(*)::int as count from outbox where relayed_at < '2026-02-01'`);
  expect(rows).toEqual([{ count: 0 }]);
});

test('a payload that does not fit is put aside at the first attempt, with a line that says why', async () => {
  const job = await opened.queue.add(
    'prune-outbox',
    { payload: { surprise: true }, requestId: null },
    { attempts: 8 },
  );

  const line = await eventually('the line', () => lineOf('job put aside', { jobId: job.id }));
  expect(line).toMatchObject({ level: 50, job: 'prune-outbox', attempt: 1 });
  expect(JSON.stringify(line['err'])).toContain('surprise');
  expect(await opened.queue.getJobState(job.id ?? '')).toBe('failed');
});

test('so are a job that nobody knows and one without its envelope', async () => {
  const unknown = await opened.queue.add('brew-tea', { payload: {}, requestId: null });
  const bare = await opened.queue.add('prune-outbox', 'nothing to read', { attempts: 8 });

  for (const job of [unknown, bare]) {
    await eventually('the line', () => lineOf('job put aside', { jobId: job.id, attempt: 1 }));
  }
});

test('goes on working after the database has ended every connection', async () => {
  // The runtime role may end connections of its own kind.
  const other = new pg.Client({ connectionString: bench.config.database.url });
  await other.connect();
  await other.query(`
    select pg_terminate_backend(pid) from pg_stat_activity
    where datname = current_database() and pid <> pg_backend_pid()`);
  await other.end();

  await eventually('a transaction', () =>
    haveOutboxPruned('call-12').then(
      () => true,
      () => undefined,
    ),
  );
  await eventually('the job', () => lineOf('job done', { requestId: 'call-12' }), 45);
});
