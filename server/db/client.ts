import { setTimeout as pause } from 'node:timers/promises';
import { drizzle, type NodePgDatabase } from 'drizzle-orm/node-postgres';
import pg from 'pg';
import { isWorthRetrying } from './db-errors.ts';

export type Db = NodePgDatabase;
export type Tx = Parameters<Parameters<Db['transaction']>[0]>[0];
/** What a repository that only reads may take. */
export type Reader = Db | Tx;

/**
 * Runs work in one transaction. A deadlock or serialization failure runs it again from the start,
 * so the work must change nothing outside the transaction.
 */
export type Transact = <Result>(work: (tx: Tx) => Promise<Result>) => Promise<Result>;

export type Database = {
  readonly db: Db;
  readonly transact: Transact;
  /** For LISTEN and for the session store; everything else goes through `db` and `transact`. */
  readonly pool: pg.Pool;
  /** How many transactions had to be run again since the start. */
  readonly retryCount: () => number;
  readonly close: () => Promise<void>;
};

export type DatabaseOptions = {
  readonly url: string;
  readonly maxConnections?: number;
  /** Told of each transaction that is run again. */
  readonly onRetry?: (error: unknown, attempt: number) => void;
  /** Told when an idle connection breaks, e.g. because the server restarts. */
  readonly onIdleError?: (error: Error) => void;
};

const maxAttempts = 5;

/** Opens a pool whose sessions speak UTC. It connects only when first used. */
export function connectDatabase(options: DatabaseOptions): Database {
  const pool = new pg.Pool({
    connectionString: options.url,
    max: options.maxConnections ?? 10,
    connectionTimeoutMillis: 10_000,
    application_name: 'millpond',
    options: '-c timezone=UTC',
    statement_timeout: 60_000,
    idle_in_transaction_session_timeout: 60_000,
  });
  pool.on('error', (error) => options.onIdleError?.(error));
  pool.on('connect', (client) => {
    // One that breaks while a transaction has it fails that transaction; unheard, it would end the process.
    client.on('error', () => undefined);
  });
  const db: Db = drizzle(pool);
  let retries = 0;

  async function transact<Result>(work: (tx: Tx) => Promise<Result>): Promise<Result> {
    for (let attempt = 1; ; attempt += 1) {
      try {
        return await db.transaction(work);
      } catch (error) {
        if (attempt === maxAttempts || !isWorthRetrying(error)) {
          throw error;
        }
        retries += 1;
        options.onRetry?.(error, attempt);
        await pause(attempt * (10 + Math.random() * 20));
      }
    }
  }

  return { db, transact, pool, retryCount: () => retries, close: () => pool.end() };
}
