import { createHash } from 'node:crypto';
import { existsSync, mkdirSync, readdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { isRoot, run } from './run.mjs';
import { Failure, say } from './say.mjs';

/** Node 20.19 is the first that the build tools accept. */
export function requireNode(version = process.versions.node) {
  const [major, minor] = version.split('.').map(Number);
  if (major < 20 || (major === 20 && minor < 19)) {
    throw new Failure(
      `Millpond needs Node.js 20.19 or later, and this is ${version}: install a newer Node.js and start again.`,
    );
  }
}

export function hashOfFile(path) {
  return createHash('sha256').update(readFileSync(path)).digest('hex');
}

/** Installs the node modules where they are missing or older than the lock file. */
export async function ensureNodeModules(root) {
  const stamp = join(root, 'node_modules', '.cache', 'millpond-lock');
  const wanted = hashOfFile(join(root, 'package-lock.json'));
  if (existsSync(stamp) && readFileSync(stamp, 'utf8') === wanted) {
    return;
  }
  say('installing the node modules (npm ci)');
  await run('npm', ['ci', '--no-audit', '--no-fund', '--ignore-scripts'], {
    cwd: root,
    failure: (written) =>
      `npm ci failed (${lastError(written)}): check that the npm registry can be reached and start again.`,
  });
  mkdirSync(join(root, 'node_modules', '.cache'), { recursive: true });
  writeFileSync(stamp, wanted);
}

function lastError(written) {
  const lines = written.split('\n').filter((line) => /npm (error|ERR!)/.test(line));
  return (lines[0] ?? written.split('\n').at(-1) ?? '').replace(/^npm (error|ERR!)\s*/, '').trim();
}

/** The newest PostgreSQL on this machine, or null. */
export function findPostgres(folder = '/usr/lib/postgresql') {
  if (!existsSync(folder)) {
    return null;
  }
  const versions = readdirSync(folder)
    .filter((name) => existsSync(join(folder, name, 'bin', 'initdb')))
    .sort((a, b) => Number(b) - Number(a));
  return versions[0] === undefined ? null : join(folder, versions[0], 'bin');
}

async function aptInstall(packages, what) {
  if (!isRoot()) {
    throw new Failure(
      `${what} is missing and only root can install it: run "apt-get install ${packages.join(' ')}" as root, then start again.`,
    );
  }
  if (!existsSync('/usr/bin/apt-get')) {
    throw new Failure(
      `${what} is missing and this machine has no apt-get: install ${packages.join(', ')} and start again.`,
    );
  }
  say(`installing ${what} (Debian packages ${packages.join(', ')})`);
  const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' };
  const failure = (written) =>
    `apt-get could not install ${packages.join(', ')} (${written.split('\n').filter((line) => line.startsWith('E:'))[0] ?? 'no reason given'}): check that Debian's packages can be reached and start again.`;
  await run('apt-get', ['update', '-qq'], { env, failure });
  await run('apt-get', ['install', '-y', '-qq', '--no-install-recommends', ...packages], {
    env,
    failure,
  });
}

/** The folder of PostgreSQL's programs; installs Debian's server where there is none. */
export async function ensurePostgres() {
  const found = findPostgres();
  if (found !== null) {
    return found;
  }
  if (isRoot()) {
    // Debian would otherwise start a cluster of its own on the usual port.
    mkdirSync('/etc/postgresql-common', { recursive: true });
    writeFileSync('/etc/postgresql-common/createcluster.conf', 'create_main_cluster = false\n');
  }
  await aptInstall(['postgresql'], 'PostgreSQL');
  const bin = findPostgres();
  if (bin === null) {
    throw new Failure(
      'PostgreSQL was installed but its programs were not found: look in /usr/lib/postgresql.',
    );
  }
  return bin;
}

export async function ensureChromium() {
  if (!existsSync('/usr/bin/chromium')) {
    await aptInstall(['chromium'], 'Chromium');
  }
}
