import { z } from 'zod';
import { defineJob } from '#server/jobs/define-job.ts';

/** Finds digests whose job was lost or gave up, and queues them again. */
export const resumeReminderDigestsJob = defineJob({
  name: 'resume-reminder-digests',
  payload: z.strictObject({}),
  attempts: 1,
  firstPauseMs: 1000,
  schedule: { kind: 'every', everyMs: 5 * 60_000 },
  jobId: null,
});
