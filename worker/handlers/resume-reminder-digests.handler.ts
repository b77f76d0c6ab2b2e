import { resumeReminderDigests } from '#server/features/reminders/send-digest.service.ts';
import { resumeReminderDigestsJob } from '#server/jobs/definitions/resume-reminder-digests.job.ts';
import { defineHandler } from '#worker/define-handler.ts';

export const resumeReminderDigestsHandler = defineHandler(resumeReminderDigestsJob, (deps) =>
  resumeReminderDigests(deps),
);
