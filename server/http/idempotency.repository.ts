import { and, eq } from 'drizzle-orm';
import type { Tx } from '#server/db/client.ts';
import { idempotencyKeysTable } from '#server/db/tables/idempotency-key.table.ts';

export type KeyedCall = {
  readonly personId: number;
  readonly key: string;
  readonly contract: string;
  readonly requestHash: string;
  readonly at: Date;
};
export type Answer = { readonly status: number; readonly body: unknown };

/** False where the key is taken; waits for another transaction that is just taking it. */
export async function claimKey(tx: Tx, call: KeyedCall): Promise<boolean> {
  const { at: createdAt, ...row } = call;
  const claimed = await tx
    .insert(idempotencyKeysTable)
    .values({ ...row, createdAt })
    .onConflictDoNothing()
    .returning({ key: idempotencyKeysTable.key });
  return claimed.length === 1;
}

export async function storeAnswer(tx: Tx, call: KeyedCall, answer: Answer): Promise<void> {
  await tx
    .update(idempotencyKeysTable)
    .set({ status: answer.status, response: answer.body })
    .where(sameKey(call));
}

export async function findAnswer(tx: Tx, call: KeyedCall) {
  const [row] = await tx.select().from(idempotencyKeysTable).where(sameKey(call));
  return row;
}

function sameKey(call: KeyedCall) {
  return and(
    eq(idempotencyKeysTable.personId, call.personId),
    eq(idempotencyKeysTable.key, call.key),
  );
}
