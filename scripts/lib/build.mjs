import { createHash } from 'node:crypto';
import { existsSync, mkdirSync, readdirSync, readFileSync, statSync, writeFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { run } from './run.mjs';
import { say } from './say.mjs';

const inputs = [
  'src',
  'shared',
  'public',
  'index.html',
  'vite.config.ts',
  'tailwind.config.ts',
  'package-lock.json',
];

function addTo(hash, root, path) {
  const full = join(root, path);
  if (!existsSync(full)) {
    return;
  }
  if (statSync(full).isDirectory()) {
    for (const name of readdirSync(full).sort()) {
      addTo(hash, root, join(path, name));
    }
    return;
  }
  hash.update(path).update('\0').update(readFileSync(full));
}

/** Builds the client where its sources changed since the last build. */
export async function ensureClient(root) {
  const hash = createHash('sha256');
  for (const path of inputs) {
    addTo(hash, root, path);
  }
  const wanted = hash.digest('hex');
  const stamp = join(root, 'dist', 'client.hash');
  const isBuilt = existsSync(join(root, 'dist', 'client', 'index.html'));
  if (isBuilt && existsSync(stamp) && readFileSync(stamp, 'utf8') === wanted) {
    return;
  }
  say('building the client');
  await run(
    process.execPath,
    [join(root, 'node_modules/vite/bin/vite.js'), 'build', '--logLevel', 'warn'],
    {
      cwd: root,
      failure: (written) =>
        `The client could not be built: ${written.split('\n').slice(0, 3).join(' ')}`,
    },
  );
  mkdirSync(dirname(stamp), { recursive: true });
  writeFileSync(stamp, wanted);
}
