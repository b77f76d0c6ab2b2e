import type { JobName } from '#server/jobs/job-definitions.ts';
import type { Handler } from './define-handler.ts';
import { pruneOutboxHandler } from './handlers/prune-outbox.handler.ts';

/** A job without a handler, or under another's name, does not compile. */
export const registry: { readonly [Name in JobName]: Handler<Name> } = {
  'prune-outbox': pruneOutboxHandler,
};
