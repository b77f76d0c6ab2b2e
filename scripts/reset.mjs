import { existsSync, rmSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { createInterface } from 'node:readline/promises';
import { fileURLToPath } from 'node:url';
import { findPostgres } from './lib/packages.mjs';
import { stopCluster } from './lib/postgres.mjs';
import { Failure, print, runMain } from './lib/say.mjs';
import { clusterFolder, findRunning, stateFolder } from './lib/state.mjs';

const root = dirname(dirname(fileURLToPath(import.meta.url)));

async function isMeant() {
  if (process.argv.includes('--yes')) {
    return true;
  }
  if (!process.stdin.isTTY) {
    throw new Failure(
      '"npm run reset" asks before it deletes: run it in a terminal, or with "-- --yes".',
    );
  }
  const ask = createInterface({ input: process.stdin, output: process.stdout });
  const answer = await ask.question('Type "reset" to delete them: ');
  ask.close();
  return answer.trim() === 'reset';
}

await runMain(async () => {
  const folder = stateFolder(root);
  if (!existsSync(folder)) {
    print('There is nothing to reset.');
    return;
  }
  const running = findRunning(folder);
  if (running !== null) {
    throw new Failure(`Millpond runs at ${running.url}: stop it with Ctrl-C, then reset.`);
  }
  const cluster = await clusterFolder(folder);
  print(
    'This deletes the local database with everything entered, the mails of the stand-in, ports and passwords:',
  );
  print(`  ${folder}${cluster.startsWith(folder) ? '' : `\n  ${cluster}`}`);
  if (!(await isMeant())) {
    print('Nothing was deleted.');
    return;
  }
  const bin = findPostgres();
  if (bin !== null && existsSync(join(cluster, 'PG_VERSION'))) {
    await stopCluster({ bin, folder: cluster });
  }
  rmSync(cluster, { recursive: true, force: true });
  rmSync(folder, { recursive: true, force: true });
  print('Deleted. "npm start" begins afresh.');
});
