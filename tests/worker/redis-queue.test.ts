import { Redis } from 'ioredis';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { addToOutbox } from '#server/features/outbox/outbox.service.ts';
import { openBullmqBackend } from '#server/jobs/bullmq-backend.ts';
import { createBullmqJobQueue } from '#server/jobs/bullmq-job-queue.ts';
import { prepareJob } from '#server/jobs/define-job.ts';
import { pruneOutboxJob } from '#server/jobs/definitions/prune-outbox.job.ts';
import { sendReminderDigestJob } from '#server/jobs/definitions/send-reminder-digest.job.ts';
import { startWorker } from '#worker/start-worker.ts';
import type { RunningWorker } from '#worker/start-worker.ts';
import { createWorkerBench, eventually } from '#tests/support/worker-bench.ts';
import type { WorkerBench } from '#tests/support/worker-bench.ts';

/** A throw-away Redis whose database the test may empty. */
const redisUrl = process.env['TEST_REDIS_URL'];

test('without a Redis that answers, handing a job in fails soon instead of waiting', async () => {
  const backend = openBullmqBackend({
    databaseUrl: 'postgres://nobody@127.0.0.1:1/none',
    redisUrl: 'redis://127.0.0.1:1',
    onConnectionError: () => undefined,
  });
  const queue = createBullmqJobQueue(backend, () => undefined);
  await expect(queue.add([prepareJob(pruneOutboxJob, {}, null)])).rejects.toThrow();
  await queue.close();
});

describe.skipIf(redisUrl === undefined)('with Redis', () => {
  let bench: WorkerBench;
  let worker: RunningWorker;
  let redis: Redis;
  beforeAll(async () => {
    redis = new Redis(redisUrl ?? '');
    await redis.flushdb();
    bench = await createWorkerBench({ REDIS_URL: redisUrl ?? '', JOB_LOCK_S: '2' });
    const { config, clock, log } = bench;
    worker = await startWorker(config, { clock, log });
  });
  afterAll(async () => {
    await worker.stop();
    redis.disconnect();
    await bench.drop();
  });

  test('an effect goes through it', async () => {
    await bench.deps.transact((tx) =>
      addToOutbox({ ...bench.deps, requestId: 'call-21' }, tx, pruneOutboxJob, [{}]),
    );
    await eventually('the job', () =>
      bench.lines.find((line) => line.msg === 'job done' && line['requestId'] === 'call-21'),
    );
    expect(await redis.keys('millpond:*')).not.toEqual([]);
  });

  test('a job that cannot be mended is put aside at once', async () => {
    const poison = prepareJob(sendReminderDigestJob, { digestId: 999, round: 0 }, null);
    await bench.deps.transact((tx) =>
      addToOutbox(bench.deps, tx, sendReminderDigestJob, [{ digestId: 999, round: 0 }]),
    );
    const line = await eventually('the line', () =>
      bench.lines.find((entry) => entry['jobId'] === poison.jobId && entry.level === 50),
    );
    expect(line).toMatchObject({ msg: 'job put aside', attempt: 1 });
  });
});
