import { execFile, spawnSync } from 'node:child_process';
import { chmod, chown, mkdtemp, mkdir, readFile, rm } from 'node:fs/promises';
import { rmSync } from 'node:fs';
import { createServer } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { promisify } from 'node:util';

const run = promisify(execFile);
const programs = '/usr/lib/postgresql/15/bin';

export type Cluster = { readonly adminUrl: string; readonly stop: () => Promise<void> };

/** Starts a cluster of its own in a temporary folder, for a test file that is run by hand. */
export async function startThrowawayCluster(): Promise<Cluster> {
  const folder = await mkdtemp(join(tmpdir(), 'millpond-pg-'));
  const data = join(folder, 'data');
  await chmod(folder, 0o755);
  await mkdir(data);
  const account = await postgresAccount();
  if (account !== null) {
    await chown(data, account.uid, account.gid);
  }
  const as = account === null ? {} : { uid: account.uid, gid: account.gid };
  await run(
    join(programs, 'initdb'),
    ['-D', data, '-U', 'app', '--auth=trust', '--encoding=UTF8', '--locale=C.UTF-8', '--no-sync'],
    { ...as, cwd: '/' },
  );
  const port = await findFreePort();
  const settings = `-p ${port} -c listen_addresses=127.0.0.1 -c unix_socket_directories='' -c fsync=off -c synchronous_commit=off -c full_page_writes=off -c max_connections=120`;
  await run(
    join(programs, 'pg_ctl'),
    ['-D', data, '-w', '-l', join(data, 'server.log'), '-o', settings, 'start'],
    { ...as, cwd: '/' },
  );
  const stopNow = () => {
    spawnSync(join(programs, 'pg_ctl'), ['-D', data, '-m', 'immediate', '-w', 'stop'], {
      ...as,
      cwd: '/',
      stdio: 'ignore',
    });
    rmSync(folder, { recursive: true, force: true });
  };
  process.once('exit', stopNow);
  return {
    adminUrl: `postgres://app@127.0.0.1:${port}/postgres`,
    stop: async () => {
      process.off('exit', stopNow);
      await run(join(programs, 'pg_ctl'), ['-D', data, '-m', 'fast', '-w', 'stop'], {
        ...as,
        cwd: '/',
      });
      await rm(folder, { recursive: true, force: true });
    },
  };
}

/** PostgreSQL refuses to run as root; Debian's package makes an account for it. */
async function postgresAccount(): Promise<{ uid: number; gid: number } | null> {
  if (process.getuid?.() !== 0) {
    return null;
  }
  const line = (await readFile('/etc/passwd', 'utf8'))
    .split('\n')
    .find((entry) => entry.startsWith('postgres:'));
  const [, , uid, gid] = line?.split(':') ?? [];
  if (uid === undefined || gid === undefined) {
    throw new Error(
      'There is no account postgres on this machine: install PostgreSQL 15, or set TEST_PG_ADMIN_URL.',
    );
  }
  return { uid: Number(uid), gid: Number(gid) };
}

function findFreePort(): Promise<number> {
  return new Promise((resolve, reject) => {
    const server = createServer();
    server.once('error', reject);
    server.listen(0, '127.0.0.1', () => {
      const address = server.address();
      server.close(() => {
        if (address === null || typeof address === 'string') {
          reject(new Error('No free port was found on 127.0.0.1.'));
        } else {
          resolve(address.port);
        }
      });
    });
  });
}
