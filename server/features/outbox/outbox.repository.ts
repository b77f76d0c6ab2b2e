import { and, asc, eq, gt, inArray, isNull, lt, sql } from 'drizzle-orm';
import type { Tx } from '#server/db/client.ts';
import { outboxTable } from '#server/db/tables/outbox.table.ts';

type NewEffect = Pick<
  typeof outboxTable.$inferInsert,
  'topic' | 'payload' | 'createdAt' | 'requestId'
>;

export async function insertEffects(tx: Tx, effects: readonly NewEffect[]): Promise<void> {
  if (effects.length > 0) {
    await tx.insert(outboxTable).values([...effects]);
  }
}

/** The oldest that wait, locked; those another relay holds are passed over. */
export async function takeWaitingEffects(
  tx: Tx,
  { afterId, limit, maxAttempts }: { afterId: number; limit: number; maxAttempts: number },
) {
  const t = outboxTable;
  return tx
    .select({
      id: t.id,
      topic: t.topic,
      payload: t.payload,
      attempts: t.attempts,
      requestId: t.requestId,
    })
    .from(t)
    .where(and(isNull(t.relayedAt), lt(t.attempts, maxAttempts), gt(t.id, afterId)))
    .orderBy(asc(t.id))
    .limit(limit)
    .for('update', { skipLocked: true });
}
export type EffectRow = Awaited<ReturnType<typeof takeWaitingEffects>>[number];

export async function markRelayed(tx: Tx, ids: readonly number[], at: Date): Promise<void> {
  if (ids.length > 0) {
    await tx
      .update(outboxTable)
      .set({ relayedAt: at, lastError: null })
      .where(inArray(outboxTable.id, [...ids]));
  }
}

export async function markUnfit(tx: Tx, id: number, fault: string): Promise<void> {
  await tx
    .update(outboxTable)
    .set({ attempts: sql`${outboxTable.attempts} + 1`, lastError: fault })
    .where(eq(outboxTable.id, id));
}

/** Gives how many went. */
export async function deleteRelayedBefore(tx: Tx, at: Date): Promise<number> {
  const rows = await tx
    .delete(outboxTable)
    .where(lt(outboxTable.relayedAt, at))
    .returning({ id: outboxTable.id });
  return rows.length;
}
