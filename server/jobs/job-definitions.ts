import type { JobDefinition } from './define-job.ts';
import { pruneOutboxJob } from './definitions/prune-outbox.job.ts';
import { resumeReminderDigestsJob } from './definitions/resume-reminder-digests.job.ts';
import { sendReminderDigestJob } from './definitions/send-reminder-digest.job.ts';
import { sweepDueRemindersJob } from './definitions/sweep-due-reminders.job.ts';

/** Every kind of background work. */
export const jobDefinitions = [
  pruneOutboxJob,
  resumeReminderDigestsJob,
  sendReminderDigestJob,
  sweepDueRemindersJob,
] as const;

type Definitions = (typeof jobDefinitions)[number];
export type JobName = Definitions['name'];

export function findJobDefinition(name: string): JobDefinition | undefined {
  return jobDefinitions.find((definition) => definition.name === name);
}
