import { performance } from 'node:perf_hooks';
import type { Database, Tx } from '#server/db/client.ts';
import { findConstraintError } from '#server/db/db-errors.ts';

export const clientCount = 32;
export const roundCount = 200;

export type RaceResult = {
  /** How many clients won, by round. */
  readonly wins: readonly number[];
  /** How the others were refused, counted over all rounds. */
  readonly refusals: ReadonlyMap<string, number>;
  /** The longest wait of a loser, as a multiple of its round's median wait, worst round. */
  readonly worstWait: number;
  readonly retries: number;
  readonly deadlocks: number;
};

/** Lets all clients try the same thing at once, round after round. */
export async function runRace(
  database: Database,
  attempt: (tx: Tx, round: number, client: number) => Promise<void>,
): Promise<RaceResult> {
  await openAllConnections(database);
  const retriesBefore = database.retryCount();
  const deadlocksBefore = await countDeadlocks(database);
  const wins: number[] = [];
  const refusals = new Map<string, number>();
  let worstWait = 0;

  for (let round = 0; round < roundCount; round += 1) {
    const outcomes = await Promise.all(
      Array.from({ length: clientCount }, async (_, client) => {
        const startedMs = performance.now();
        const refusal = await refusalOrWin(database, (tx) => attempt(tx, round, client));
        return { refusal, waitedMs: performance.now() - startedMs };
      }),
    );
    const losers = outcomes.filter((outcome) => outcome.refusal !== null);
    wins.push(clientCount - losers.length);
    for (const { refusal } of losers) {
      const key = refusal ?? '';
      refusals.set(key, (refusals.get(key) ?? 0) + 1);
    }
    const medianMs = median(outcomes.map((outcome) => outcome.waitedMs));
    const longestMs = Math.max(...losers.map((outcome) => outcome.waitedMs));
    worstWait = Math.max(worstWait, longestMs / medianMs);
  }
  return {
    wins,
    refusals,
    worstWait,
    retries: database.retryCount() - retriesBefore,
    deadlocks: (await countDeadlocks(database)) - deadlocksBefore,
  };
}

async function refusalOrWin(
  database: Database,
  work: (tx: Tx) => Promise<void>,
): Promise<string | null> {
  try {
    await database.transact(work);
    return null;
  } catch (error) {
    const broken = findConstraintError(error);
    if (broken === undefined) {
      throw error;
    }
    return `${broken.code} ${broken.constraint}`;
  }
}

/** Opening a connection takes longer than a round; none is to be timed. */
async function openAllConnections(database: Database): Promise<void> {
  await Promise.all(
    Array.from({ length: clientCount }, () => database.pool.query('select pg_sleep(0.1)')),
  );
}

async function countDeadlocks(database: Database): Promise<number> {
  await database.pool.query('select pg_stat_force_next_flush()');
  const { rows } = await database.pool.query<{ deadlocks: number }>(
    'select deadlocks::int from pg_stat_database where datname = current_database()',
  );
  return rows[0]?.deadlocks ?? 0;
}

function median(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  return sorted[Math.floor(sorted.length / 2)] ?? 0;
}
