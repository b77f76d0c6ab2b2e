import { sendReminderDigest } from '#server/features/reminders/send-digest.service.ts';
import { sendReminderDigestJob } from '#server/jobs/definitions/send-reminder-digest.job.ts';
import { defineHandler } from '#worker/define-handler.ts';

export const sendReminderDigestHandler = defineHandler(sendReminderDigestJob, (deps, payload) =>
  sendReminderDigest(deps, payload.digestId),
);
