import type { JobName } from '#server/jobs/job-definitions.ts';
import type { Handler } from './define-handler.ts';
import { pruneOutboxHandler } from './handlers/prune-outbox.handler.ts';
import { resumeReminderDigestsHandler } from './handlers/resume-reminder-digests.handler.ts';
import { sendReminderDigestHandler } from './handlers/send-reminder-digest.handler.ts';
import { sweepDueRemindersHandler } from './handlers/sweep-due-reminders.handler.ts';

/** A job without a handler, or under another's name, does not compile. */
export const registry: { readonly [Name in JobName]: Handler<Name> } = {
  'prune-outbox': pruneOutboxHandler,
  'resume-reminder-digests': resumeReminderDigestsHandler,
  'send-reminder-digest': sendReminderDigestHandler,
  'sweep-due-reminders': sweepDueRemindersHandler,
};
