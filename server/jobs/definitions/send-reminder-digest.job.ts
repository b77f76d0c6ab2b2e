import { z } from 'zod';
import { defineJob } from '#server/jobs/define-job.ts';

/** Sends one person's reminders of a day. Whether it was sent is decided by its row. */
export const sendReminderDigestJob = defineJob({
  name: 'send-reminder-digest',
  payload: z.strictObject({
    digestId: z.int().positive(),
    /** 0 for the first; a digest that stayed behind is queued again under the next number. */
    round: z.int().min(0),
  }),
  attempts: 5,
  firstPauseMs: 10_000,
  schedule: null,
  jobId: ({ digestId, round }) => `send-reminder-digest-${digestId}-${round}`,
});
