import { fileURLToPath } from 'node:url';
import { runMigrations } from 'bullmq';
import { drizzle } from 'drizzle-orm/node-postgres';
import { migrate } from 'drizzle-orm/node-postgres/migrator';
import pg from 'pg';
import { isDatabaseUnavailable } from './db-errors.ts';

/** The role the application runs as; it owns nothing. */
export const runtimeRole = 'millpond_app';
/** Where the job queue keeps its own tables. */
export const queueSchema = 'bullmq';

const migrationsFolder = fileURLToPath(new URL('../../drizzle', import.meta.url));
/** Held while migrating, so that two that start at once do it one after the other. */
const migrationLock = 5_471_003;

/** What went wrong, in one sentence for the operator. */
export class MigrationError extends Error {
  override readonly name = 'MigrationError';
}

export type MigrationOutcome = { readonly appliedCount: number };

/** Brings the tables and the queue's own schema up to date; does nothing where they are. */
export async function migrateDatabase(ownerUrl: string): Promise<MigrationOutcome> {
  const client = new pg.Client({
    connectionString: ownerUrl,
    application_name: 'millpond-migrate',
    options: '-c timezone=UTC -c client_min_messages=warning',
    connectionTimeoutMillis: 10_000,
  });
  try {
    await client.connect();
    await client.query('select pg_advisory_lock($1)', [migrationLock]);
    await requireRuntimeRole(client);
    const before = await countApplied(client);
    await migrate(drizzle(client), { migrationsFolder });
    await openQueueSchema(client);
    await runMigrations(client, queueSchema);
    return { appliedCount: (await countApplied(client)) - before };
  } catch (error) {
    throw asMigrationError(error, ownerUrl);
  } finally {
    await client.end();
  }
}

async function requireRuntimeRole(client: pg.Client): Promise<void> {
  const { rowCount } = await client.query('select from pg_roles where rolname = $1', [runtimeRole]);
  if (rowCount !== 1) {
    throw new MigrationError(
      `The database server has no role ${runtimeRole}: create it with "create role ${runtimeRole} login password '…'" and migrate again.`,
    );
  }
}

async function countApplied(client: pg.Client): Promise<number> {
  const ledger = await client.query<{ exists: boolean }>(
    `select to_regclass('drizzle.__drizzle_migrations') is not null as exists`,
  );
  if (ledger.rows[0]?.exists !== true) {
    return 0;
  }
  const counted = await client.query<{ count: number }>(
    'select count(*)::int as count from drizzle.__drizzle_migrations',
  );
  return counted.rows[0]?.count ?? 0;
}

/**
 * Rights come before tables: whatever the queue's migrations create later is granted as well. The
 * queue makes a number sequence the first time each queue is used, hence the right to create.
 */
async function openQueueSchema(client: pg.Client): Promise<void> {
  const { rowCount } = await client.query('select from pg_namespace where nspname = $1', [
    queueSchema,
  ]);
  if (rowCount === 1) {
    return;
  }
  await client.query(`
    begin;
    create schema ${queueSchema};
    grant usage, create on schema ${queueSchema} to ${runtimeRole};
    alter default privileges in schema ${queueSchema}
      grant select, insert, update, delete on tables to ${runtimeRole};
    alter default privileges in schema ${queueSchema}
      grant usage, select on sequences to ${runtimeRole};
    commit;`);
}

function asMigrationError(error: unknown, ownerUrl: string): MigrationError {
  if (error instanceof MigrationError) {
    return error;
  }
  const { host, pathname } = new URL(ownerUrl);
  if (isDatabaseUnavailable(error)) {
    return new MigrationError(
      `The database server at ${host} does not answer: start it, or correct the owner's address, and migrate again.`,
      { cause: error },
    );
  }
  return new MigrationError(
    `The database ${pathname.slice(1)} at ${host} could not be migrated, the step that failed was undone: ${deepestMessage(error)}.`,
    { cause: error },
  );
}

function deepestMessage(error: unknown): string {
  let link = error;
  while (link instanceof Error && link.cause instanceof Error) {
    link = link.cause;
  }
  return link instanceof Error ? link.message : String(link);
}
