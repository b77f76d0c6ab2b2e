import type { JobsOptions } from 'bullmq';
import type { PreparedJob } from './define-job.ts';
import type { JobQueue, PlannedSchedule } from './job-queue.ts';
import type { openBullmqBackend } from './bullmq-backend.ts';
import { within } from './within.ts';

const dayS = 86_400;
/** The queue waits for a lost Redis without end; the relay holds locks and must not. */
const patienceMs = 10_000;

/** What the queue keeps of each job besides its payload. */
function envelopeOf(job: PreparedJob) {
  return { payload: job.payload, requestId: job.requestId };
}

/** Done jobs are forgotten soon; those put aside stay readable for a month. */
function optionsOf(job: PreparedJob) {
  return {
    attempts: job.attempts,
    backoff: { type: 'exponential', delay: job.firstPauseMs },
    removeOnComplete: { age: dayS, count: 2000 },
    removeOnFail: { age: 30 * dayS, count: 5000 },
  } satisfies JobsOptions;
}

function repeatOf({ when }: PlannedSchedule) {
  return when.kind === 'every'
    ? { every: when.everyMs }
    : { pattern: `0 ${when.hour} * * *`, tz: when.zone };
}

/** Hands jobs to BullMQ. Whoever writes effects uses the outbox; only its relay comes here. */
export function createBullmqJobQueue(
  backend: ReturnType<typeof openBullmqBackend>,
  onError: (error: Error) => void,
): JobQueue {
  const { queue, end } = backend.openQueue();
  queue.on('error', onError);
  return {
    async add(jobs) {
      // One by one: adding in bulk makes a temporary table, to which the runtime role has no right.
      for (const job of jobs) {
        const adding = queue.add(job.name, envelopeOf(job), {
          ...optionsOf(job),
          ...(job.jobId === null ? {} : { jobId: job.jobId }),
        });
        await within(patienceMs, 'Handing a job to the queue', adding);
      }
    },
    async plan(schedules) {
      for (const schedule of schedules) {
        const { job } = schedule;
        await queue.upsertJobScheduler(schedule.id, repeatOf(schedule), {
          name: job.name,
          data: envelopeOf(job),
          opts: optionsOf(job),
        });
      }
      const standing = new Set(schedules.map((schedule) => schedule.id));
      for (const { key } of await queue.getJobSchedulers(0, -1)) {
        if (!standing.has(key)) {
          await queue.removeJobScheduler(key);
        }
      }
    },
    async close() {
      await queue.close();
      await end();
    },
  };
}
