import { z } from 'zod';
import { defineJob } from '#server/jobs/define-job.ts';

/** Finds who is to be reminded of what on a site's day; finds nothing the second time. */
export const sweepDueRemindersJob = defineJob({
  name: 'sweep-due-reminders',
  payload: z.strictObject({ siteId: z.int().positive() }),
  attempts: 10,
  firstPauseMs: 30_000,
  schedule: { kind: 'site-day', hour: 6 },
  jobId: null,
});
