import { UnrecoverableError } from 'bullmq';
import type { Job } from 'bullmq';
import type { Log } from '#server/log.ts';
import type { openBullmqBackend, WorkOptions } from './bullmq-backend.ts';
import { PoisonJobError } from './job-queue.ts';
import type { ReceivedJob } from './job-queue.ts';

export type JobWorker = {
  /** Takes no further job and waits for those at work; `isForced` leaves them to another worker. */
  close(isForced: boolean): Promise<void>;
};

/** Takes jobs from BullMQ and runs them. */
export async function startBullmqWorker(
  backend: ReturnType<typeof openBullmqBackend>,
  log: Log,
  run: (job: ReceivedJob) => Promise<void>,
  options: WorkOptions,
): Promise<JobWorker> {
  const { worker, end } = backend.openWorker(async (job) => {
    try {
      await run({
        id: job.id ?? '',
        name: job.name,
        data: job.data,
        attempt: job.attemptsMade + 1,
      });
    } catch (error) {
      throw error instanceof PoisonJobError ? new UnrecoverableError(error.message) : error;
    }
  }, options);
  worker.on('error', (error) => {
    log.warn({ err: error }, 'the queue cannot be reached');
  });
  worker.on('failed', (job, error) => {
    report(log, job, error);
  });
  await worker.waitUntilReady();
  const running = worker.run().catch((error: unknown) => {
    log.fatal({ err: error }, 'the worker takes no more jobs');
  });
  return {
    async close(isForced) {
      await worker.close(isForced);
      await running;
      await end();
    },
  };
}

function report(log: Log, job: Job | undefined, error: Error): void {
  const about = {
    err: error,
    jobId: job?.id,
    job: job?.name,
    attempt: job?.attemptsMade,
    attempts: job?.opts.attempts,
  };
  const isLast =
    job === undefined ||
    error instanceof UnrecoverableError ||
    job.attemptsMade >= (job.opts.attempts ?? 1);
  if (isLast) {
    log.error(about, 'job put aside');
  } else {
    log.warn(about, 'job failed and will be tried again');
  }
}
