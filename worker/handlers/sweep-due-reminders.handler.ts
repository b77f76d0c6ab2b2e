import { sweepDueReminders } from '#server/features/reminders/sweep-reminders.service.ts';
import { sweepDueRemindersJob } from '#server/jobs/definitions/sweep-due-reminders.job.ts';
import { defineHandler } from '#worker/define-handler.ts';

export const sweepDueRemindersHandler = defineHandler(sweepDueRemindersJob, (deps, { siteId }) =>
  sweepDueReminders(deps, siteId),
);
