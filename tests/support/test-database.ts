import { createHash, randomBytes } from 'node:crypto';
import { readdir, readFile } from 'node:fs/promises';
import { fileURLToPath } from 'node:url';
import { setTimeout as pause } from 'node:timers/promises';
import pg from 'pg';
import { migrateDatabase } from '#server/db/migrate-database.ts';
import { type Cluster, startThrowawayCluster } from './throwaway-cluster.ts';

export type TestDatabase = {
  /** Of the runtime role, as the application connects. */
  readonly url: string;
  /** Of the role that owns the tables. */
  readonly ownerUrl: string;
  readonly drop: () => Promise<void>;
};

const password = 'throw-away';
/** Held while roles and template are made, so that parallel test files make them once. */
const setUpLock = 5_471_004;

let ownCluster: Promise<Cluster> | undefined;
let openCount = 0;

/**
 * Makes a migrated, empty database by copying a template. The server is the one named by
 * TEST_PG_ADMIN_URL (a superuser of a throw-away cluster); without it a cluster is started and
 * stopped again with the last database.
 */
export async function createTestDatabase(): Promise<TestDatabase> {
  openCount += 1;
  const adminUrl = await findAdminUrl();
  const name = `t_${randomBytes(6).toString('hex')}`;
  await withAdmin(adminUrl, async (admin) => {
    const template = await ensureTemplate(admin, adminUrl);
    await whileBusy(() =>
      admin.query(
        `create database ${name} template ${template} strategy file_copy owner millpond_owner`,
      ),
    );
    // As the launcher leaves it: what works only with more rights must fail here too.
    await admin.query(
      `revoke all on database ${name} from public; grant connect on database ${name} to millpond_app`,
    );
  });
  return {
    url: addressOf(adminUrl, name, 'millpond_app'),
    ownerUrl: addressOf(adminUrl, name, 'millpond_owner'),
    drop: async () => {
      await withAdmin(adminUrl, (admin) => whileBusy(() => admin.query(`drop database ${name}`)));
      openCount -= 1;
      if (openCount === 0 && ownCluster !== undefined) {
        const cluster = await ownCluster;
        ownCluster = undefined;
        await cluster.stop();
      }
    },
  };
}

async function findAdminUrl(): Promise<string> {
  const given = process.env['TEST_PG_ADMIN_URL'];
  if (given !== undefined && given !== '') {
    return given;
  }
  ownCluster ??= startThrowawayCluster();
  return (await ownCluster).adminUrl;
}

async function ensureTemplate(admin: pg.Client, adminUrl: string): Promise<string> {
  const template = `millpond_template_${await hashOfMigrations()}`;
  await admin.query('select pg_advisory_lock($1)', [setUpLock]);
  try {
    if (await exists(admin, 'select from pg_database where datname = $1', template)) {
      return template;
    }
    for (const role of ['millpond_owner', 'millpond_app']) {
      if (!(await exists(admin, 'select from pg_roles where rolname = $1', role))) {
        await admin.query(`create role ${role} login password '${password}'`);
      }
    }
    const unfinished = `${template}_unfinished`;
    await admin.query(`drop database if exists ${unfinished}`);
    await admin.query(`create database ${unfinished} owner millpond_owner`);
    await migrateDatabase(addressOf(adminUrl, unfinished, 'millpond_owner'));
    await whileBusy(() => admin.query(`alter database ${unfinished} rename to ${template}`));
    return template;
  } finally {
    await admin.query('select pg_advisory_unlock($1)', [setUpLock]);
  }
}

/** A change of what migrating does makes a new template, also on a cluster that is kept. */
async function hashOfMigrations(): Promise<string> {
  const root = fileURLToPath(new URL('../../', import.meta.url));
  const folder = `${root}drizzle/`;
  const names = (await readdir(folder)).filter((name) => name.endsWith('.sql')).sort();
  const hash = createHash('sha256');
  hash.update(await readFile(`${root}server/db/migrate-database.ts`));
  for (const name of names) {
    hash.update(name).update(await readFile(folder + name));
  }
  return hash.digest('hex').slice(0, 12);
}

async function withAdmin<Result>(
  adminUrl: string,
  work: (admin: pg.Client) => Promise<Result>,
): Promise<Result> {
  const admin = new pg.Client({
    connectionString: adminUrl,
    options: '-c client_min_messages=warning',
  });
  await admin.connect();
  try {
    return await work(admin);
  } finally {
    await admin.end();
  }
}

async function exists(admin: pg.Client, query: string, name: string): Promise<boolean> {
  return (await admin.query(query, [name])).rowCount === 1;
}

/** 55006: sessions that have just ended still count for a moment. */
async function whileBusy(work: () => Promise<unknown>): Promise<void> {
  for (let attempt = 1; ; attempt += 1) {
    try {
      await work();
      return;
    } catch (error) {
      if (!(error instanceof pg.DatabaseError) || error.code !== '55006' || attempt === 60) {
        throw error;
      }
      await pause(50);
    }
  }
}

function addressOf(adminUrl: string, database: string, role: string): string {
  const url = new URL(adminUrl);
  url.username = role;
  url.password = password;
  url.pathname = `/${database}`;
  return url.toString();
}
