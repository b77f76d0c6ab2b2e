import { randomBytes, createHash } from 'node:crypto';
import { chmodSync, existsSync, mkdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { createServer } from 'node:net';
import { join } from 'node:path';
import { isRoot, succeeds } from './run.mjs';
import { Failure } from './say.mjs';

export const portNames = ['api', 'database', 'identity', 'smtp', 'mail', 'vite'];
const preferred = { api: 4300 };

/** Where Millpond keeps what belongs to this checkout; MILLPOND_STATE puts it elsewhere. */
export function stateFolder(root, env = process.env) {
  return env.MILLPOND_STATE ?? join(root, '.millpond');
}

export function prepareState(folder) {
  mkdirSync(join(folder, 'logs'), { recursive: true });
  chmodSync(folder, 0o755);
}

/** The cluster lives in the state folder, or under /var/lib where root's database user cannot get there. */
export async function clusterFolder(folder) {
  const inside = join(folder, 'cluster');
  if (!isRoot() || (await isPassable(folder))) {
    return inside;
  }
  const hash = createHash('sha256').update(folder).digest('hex').slice(0, 12);
  return `/var/lib/millpond-${hash}`;
}

function isPassable(folder) {
  return succeeds('setpriv', [
    '--reuid=postgres',
    '--regid=postgres',
    '--init-groups',
    'test',
    '-x',
    folder,
  ]);
}

function readJson(path) {
  if (!existsSync(path)) {
    return null;
  }
  try {
    return JSON.parse(readFileSync(path, 'utf8'));
  } catch (error) {
    if (error instanceof SyntaxError) {
      throw new Failure(
        `${path} cannot be read: repair it, or run "npm run reset" to start afresh.`,
      );
    }
    throw error;
  }
}

function listenOnce(port) {
  return new Promise((resolve) => {
    const server = createServer();
    server.once('error', () => resolve(null));
    server.listen(port, '127.0.0.1', () => {
      const taken = server.address().port;
      server.close(() => resolve(taken));
    });
  });
}

export async function isFree(port) {
  return (await listenOnce(port)) !== null;
}

/** Ports are chosen free once and kept, so that addresses and bookmarks stay. */
export async function keepPorts(folder) {
  const path = join(folder, 'ports.json');
  const kept = readJson(path) ?? {};
  const ports = {};
  for (const name of portNames) {
    ports[name] =
      kept[name] ??
      (preferred[name] && (await listenOnce(preferred[name]))) ??
      (await listenOnce(0));
    while (Object.entries(ports).some(([other, port]) => other !== name && port === ports[name])) {
      ports[name] = await listenOnce(0);
    }
  }
  writeFileSync(path, `${JSON.stringify(ports, null, 2)}\n`);
  return ports;
}

export async function requireFreePort(port, name, setting) {
  if (!(await isFree(port))) {
    const way = setting === undefined ? '' : `, or set ${setting} to a free port`;
    throw new Failure(
      `Port ${port}, which Millpond needs for its ${name}, is taken by another program: stop that program${way}, then start again.`,
    );
  }
}

/** Passwords and keys made once, readable by their owner alone. */
export function keepSecrets(folder) {
  const path = join(folder, 'secrets.json');
  const kept = readJson(path) ?? {};
  const make = () => randomBytes(24).toString('base64url');
  const secrets = {
    databaseAdmin: kept.databaseAdmin ?? make(),
    databaseOwner: kept.databaseOwner ?? make(),
    databaseApp: kept.databaseApp ?? make(),
    session: kept.session ?? randomBytes(32).toString('base64url'),
    oidcClient: kept.oidcClient ?? make(),
    standInCookie: kept.standInCookie ?? make(),
  };
  writeFileSync(path, `${JSON.stringify(secrets, null, 2)}\n`, { mode: 0o600 });
  chmodSync(path, 0o600);
  return secrets;
}

function isAlive(processId) {
  try {
    process.kill(processId, 0);
    return true;
  } catch (error) {
    return error.code === 'EPERM';
  }
}

/** Refuses a second start while one runs; the mark of a killed one is taken over. */
export function claimState(folder, url) {
  const path = join(folder, 'running.json');
  const other = readJson(path);
  if (other !== null && other.processId !== process.pid && isAlive(other.processId)) {
    throw new Failure(
      `Millpond already runs at ${other.url} (process ${other.processId}): open that address, or stop it with Ctrl-C first.`,
    );
  }
  writeFileSync(path, `${JSON.stringify({ processId: process.pid, url })}\n`);
  return () => rmSync(path, { force: true });
}

export function findRunning(folder) {
  const other = readJson(join(folder, 'running.json'));
  return other !== null && isAlive(other.processId) ? other : null;
}
