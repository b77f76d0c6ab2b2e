import { z } from 'zod';
import { defineJob } from '#server/jobs/define-job.ts';

/** Forgets effects that were handed to the queue long ago. */
export const pruneOutboxJob = defineJob({
  name: 'prune-outbox',
  payload: z.strictObject({}),
  attempts: 1,
  firstPauseMs: 1000,
  schedule: { kind: 'every', everyMs: 6 * 3_600_000 },
  jobId: null,
});
