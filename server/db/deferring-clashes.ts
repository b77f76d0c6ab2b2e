import { sql } from 'drizzle-orm';
import type { Tx } from './client.ts';

/**
 * Lets a move or swap pass through states that clash, and checks them all at its end, still inside
 * the transaction's callback, where the error can be told apart.
 */
export async function deferringClashes<Result>(
  tx: Tx,
  change: () => Promise<Result>,
): Promise<Result> {
  await tx.execute(
    sql`set constraints allocation_unit_free, load_phase_one_temperature, load_phase_still deferred`,
  );
  const result = await change();
  await tx.execute(sql`set constraints all immediate`);
  return result;
}
