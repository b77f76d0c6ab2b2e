import { asc } from 'drizzle-orm';
import { afterAll, beforeAll, beforeEach, expect, test } from 'vitest';
import { outboxTable } from '#server/db/tables/outbox.table.ts';
import { addToOutbox, pruneOutbox } from '#server/features/outbox/outbox.service.ts';
import { maxRelayAttempts, relayOutbox } from '#server/features/outbox/relay-outbox.service.ts';
import { pruneOutboxJob } from '#server/jobs/definitions/prune-outbox.job.ts';
import { createMemoryJobQueue } from '#tests/support/memory-job-queue.ts';
import { createWorkerBench } from '#tests/support/worker-bench.ts';
import type { WorkerBench } from '#tests/support/worker-bench.ts';

let bench: WorkerBench;
beforeAll(async () => {
  bench = await createWorkerBench();
});
afterAll(() => bench.drop());
beforeEach(async () => {
  await bench.db.delete(outboxTable);
  bench.lines.length = 0;
});

const rows = () => bench.db.select().from(outboxTable).orderBy(asc(outboxTable.id));

async function writeEffects(count: number): Promise<void> {
  await bench.deps.transact((tx) =>
    addToOutbox({ ...bench.deps, requestId: 'call-7' }, tx, pruneOutboxJob, Array(count).fill({})),
  );
}

async function writeRow(topic: string, payload: unknown): Promise<void> {
  await bench.db.insert(outboxTable).values({ topic, payload, createdAt: bench.clock.now() });
}

test('a committed effect reaches the queue with the number of the call that caused it', async () => {
  const queue = createMemoryJobQueue();
  await writeEffects(1);

  expect(await relayOutbox(bench.deps, queue)).toBe(1);

  expect(queue.jobs()).toMatchObject([
    { name: 'prune-outbox', payload: {}, requestId: 'call-7', attempts: pruneOutboxJob.attempts },
  ]);
  expect(await rows()).toMatchObject([{ relayedAt: bench.clock.now(), attempts: 0 }]);
});

test('an effect of a change that was rolled back does not exist', async () => {
  const queue = createMemoryJobQueue();
  const change = bench.deps.transact(async (tx) => {
    await addToOutbox(bench.deps, tx, pruneOutboxJob, [{}]);
    throw new Error('the change failed');
  });

  await expect(change).rejects.toThrow('the change failed');
  expect(await relayOutbox(bench.deps, queue)).toBe(0);
});

test('what was handed over is not handed over again', async () => {
  const queue = createMemoryJobQueue();
  await writeEffects(3);
  await relayOutbox(bench.deps, queue);

  expect(await relayOutbox(bench.deps, queue)).toBe(0);
  expect(queue.addCount()).toBe(3);
});

test('more than one batch goes in one run', async () => {
  const queue = createMemoryJobQueue();
  await writeEffects(250);

  expect(await relayOutbox(bench.deps, queue)).toBe(250);
  expect(queue.jobs()).toHaveLength(250);
});

test('while the queue is down every effect stays, and none is blamed', async () => {
  const queue = createMemoryJobQueue();
  await writeEffects(2);
  queue.failNext('before');

  await expect(relayOutbox(bench.deps, queue)).rejects.toThrow('the queue is down');
  expect(await rows()).toMatchObject([
    { relayedAt: null, attempts: 0 },
    { relayedAt: null, attempts: 0 },
  ]);
  expect(await relayOutbox(bench.deps, queue)).toBe(2);
});

test('a relay that dies between queue and commit hands the same job in again, not another', async () => {
  const queue = createMemoryJobQueue();
  await writeEffects(2);
  queue.failNext('after');
  await expect(relayOutbox(bench.deps, queue)).rejects.toThrow();

  await relayOutbox(bench.deps, queue);

  expect(queue.addCount()).toBe(4);
  expect(queue.jobs()).toHaveLength(2);
});

test('two relays at once share the rows', async () => {
  const queue = createMemoryJobQueue();
  await writeEffects(500);

  const counts = await Promise.all([
    relayOutbox(bench.deps, queue),
    relayOutbox(bench.deps, queue),
    relayOutbox(bench.deps, queue),
  ]);

  expect(counts.reduce((sum, count) => sum + count, 0)).toBe(500);
  expect(queue.addCount()).toBe(500);
});

test('a row that nobody can read is put aside with a clear line and holds nobody up', async () => {
  const queue = createMemoryJobQueue();
  await writeRow('brew-tea', {});
  await writeRow('prune-outbox', { surprise: true });
  await writeEffects(1);

  expect(await relayOutbox(bench.deps, queue)).toBe(1);
  for (let run = 1; run < maxRelayAttempts + 5; run += 1) {
    await relayOutbox(bench.deps, queue);
  }

  const [unknown, unfit] = await rows();
  expect(unknown).toMatchObject({ relayedAt: null, attempts: maxRelayAttempts });
  expect(unknown?.lastError).toBe('there is no job called brew-tea');
  expect(unfit).toMatchObject({ relayedAt: null, attempts: maxRelayAttempts });
  expect(bench.lines.filter((line) => line.msg === 'effect put aside')).toMatchObject([
    { level: 50, topic: 'brew-tea' },
    { level: 50, topic: 'prune-outbox' },
  ]);
  expect(queue.addCount()).toBe(1);
});

test('effects handed over two weeks ago are forgotten, waiting ones never', async () => {
  const queue = createMemoryJobQueue();
  await writeEffects(1);
  await relayOutbox(bench.deps, queue);
  await writeEffects(1);
  bench.clock.advance({ hours: 24 * 15 });
  await pruneOutbox(bench.deps);

  expect(await rows()).toMatchObject([{ relayedAt: null }]);
});
