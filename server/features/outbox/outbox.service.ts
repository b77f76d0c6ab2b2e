import type { z } from 'zod';
import type { Tx } from '#server/db/client.ts';
import type { Deps } from '#server/deps.ts';
import { prepareJob } from '#server/jobs/define-job.ts';
import type { JobDefinition } from '#server/jobs/define-job.ts';
import { deleteRelayedBefore, insertEffects } from './outbox.repository.ts';

/**
 * Writes effects into the transaction of their cause: they happen if it commits, and only then. The
 * relay hands them to the queue within moments.
 */
export async function addToOutbox<Payload extends z.ZodObject>(
  deps: Pick<Deps, 'clock' | 'requestId'>,
  tx: Tx,
  definition: JobDefinition<string, Payload>,
  payloads: readonly z.output<Payload>[],
): Promise<void> {
  const { requestId } = deps;
  const createdAt = deps.clock.now();
  await insertEffects(
    tx,
    payloads.map((given) => {
      const { name, payload } = prepareJob(definition, given, requestId);
      return { topic: name, payload, createdAt, requestId };
    }),
  );
}

const keptMs = 14 * 86_400_000;

/** Relayed effects are kept for two weeks, for whoever asks what happened to one. */
export async function pruneOutbox(deps: Pick<Deps, 'clock' | 'log' | 'transact'>): Promise<void> {
  const before = new Date(deps.clock.now().getTime() - keptMs);
  const count = await deps.transact((tx) => deleteRelayedBefore(tx, before));
  deps.log.info({ count }, 'old effects forgotten');
}
