import { pruneOutbox } from '#server/features/outbox/outbox.service.ts';
import { pruneOutboxJob } from '#server/jobs/definitions/prune-outbox.job.ts';
import { defineHandler } from '#worker/define-handler.ts';

export const pruneOutboxHandler = defineHandler(pruneOutboxJob, (deps) => pruneOutbox(deps));
