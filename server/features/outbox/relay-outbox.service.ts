import type { Deps } from '#server/deps.ts';
import { prepareJob } from '#server/jobs/define-job.ts';
import type { PreparedJob } from '#server/jobs/define-job.ts';
import { findJobDefinition } from '#server/jobs/job-definitions.ts';
import type { JobQueue } from '#server/jobs/job-queue.ts';
import { markRelayed, markUnfit, takeWaitingEffects } from './outbox.repository.ts';
import type { EffectRow } from './outbox.repository.ts';

const batchSize = 100;
/**
 * A row this worker cannot read may be meant for a newer one that is just being rolled out, so it is
 * tried for a while before it is put aside. A queue that is down counts against no row.
 */
export const maxRelayAttempts = 20;

type Relaying = Pick<Deps, 'clock' | 'log' | 'transact'>;
type Batch = { readonly lastId: number | null; readonly relayedCount: number };

/**
 * Hands every waiting effect to the queue. A row is marked in the transaction that holds its lock, and
 * only after the queue has the job: a crash in between queues it again under the same id. Safe to run
 * in several workers at once.
 */
export async function relayOutbox(deps: Relaying, queue: Pick<JobQueue, 'add'>): Promise<number> {
  let total = 0;
  let afterId = 0;
  for (;;) {
    const { lastId, relayedCount } = await relayBatch(deps, queue, afterId);
    total += relayedCount;
    if (lastId === null) {
      return total;
    }
    afterId = lastId;
  }
}

async function relayBatch(
  deps: Relaying,
  queue: Pick<JobQueue, 'add'>,
  afterId: number,
): Promise<Batch> {
  return deps.transact(async (tx) => {
    const rows = await takeWaitingEffects(tx, {
      afterId,
      limit: batchSize,
      maxAttempts: maxRelayAttempts,
    });
    const fit: { readonly id: number; readonly job: PreparedJob }[] = [];
    for (const row of rows) {
      const reading = readEffect(row);
      if (reading.kind === 'fit') {
        fit.push({ id: row.id, job: reading.job });
        continue;
      }
      await markUnfit(tx, row.id, reading.fault);
      const isLast = row.attempts + 1 >= maxRelayAttempts;
      deps.log[isLast ? 'error' : 'warn'](
        { outboxId: row.id, topic: row.topic, fault: reading.fault, requestId: row.requestId },
        isLast ? 'effect put aside' : 'effect cannot be read',
      );
    }
    if (fit.length > 0) {
      await queue.add(fit.map(({ job }) => job));
    }
    await markRelayed(
      tx,
      fit.map(({ id }) => id),
      deps.clock.now(),
    );
    return {
      lastId: rows.length < batchSize ? null : (rows.at(-1)?.id ?? null),
      relayedCount: fit.length,
    };
  });
}

type Reading =
  | { readonly kind: 'fit'; readonly job: PreparedJob }
  | { readonly kind: 'unfit'; readonly fault: string };

/** Every job gets an id, so that a row handed over twice is one job. */
function readEffect(row: EffectRow): Reading {
  const definition = findJobDefinition(row.topic);
  if (definition === undefined) {
    return { kind: 'unfit', fault: `there is no job called ${row.topic}` };
  }
  const parsed = definition.payload.safeParse(row.payload);
  if (!parsed.success) {
    return { kind: 'unfit', fault: parsed.error.message };
  }
  const job = prepareJob(definition, parsed.data, row.requestId);
  return { kind: 'fit', job: { ...job, jobId: job.jobId ?? `outbox-${row.id}` } };
}
