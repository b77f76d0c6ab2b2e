import { randomUUID } from 'node:crypto';
import { z } from 'zod';
import type { Deps } from '#server/deps.ts';
import { PoisonJobError } from '#server/jobs/job-queue.ts';
import type { ReceivedJob } from '#server/jobs/job-queue.ts';
import type { Handler } from './define-handler.ts';
import { registry } from './registry.ts';

const envelopeSchema = z.strictObject({
  payload: z.unknown(),
  requestId: z.string().nullable(),
});

/**
 * Runs one job of the queue. What cannot be read is poison: no repeat can mend it. The number of the
 * call that caused the job is carried on into its log lines and audit rows.
 */
export async function runJob(deps: Deps, job: ReceivedJob): Promise<void> {
  const envelope = envelopeSchema.safeParse(job.data);
  if (!envelope.success) {
    throw new PoisonJobError(`The job has no readable envelope: ${envelope.error.message}`);
  }
  const handlers: readonly Handler[] = Object.values(registry);
  const handler = handlers.find(({ name }) => name === job.name);
  if (handler === undefined) {
    throw new PoisonJobError(`Nothing here does a job called ${job.name}.`);
  }
  const requestId = envelope.data.requestId ?? randomUUID();
  const log = deps.log.child({ job: job.name, jobId: job.id, attempt: job.attempt, requestId });
  await handler.run({ ...deps, requestId, log }, envelope.data.payload);
  log.info('job done');
}
