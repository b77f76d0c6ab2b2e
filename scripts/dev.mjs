import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { print, runMain, say } from './lib/say.mjs';
import { keepRunning, startServices } from './lib/services.mjs';
import { keepPorts, stateFolder } from './lib/state.mjs';

const root = dirname(dirname(fileURLToPath(import.meta.url)));

await runMain(() =>
  keepRunning(async (life) => {
    // People open Vite's address, so sign-in must come back to it.
    const { vite } = await keepPorts(await stateOf(root));
    process.env.PUBLIC_URL ??= `http://127.0.0.1:${vite}`;
    process.env.NODE_ENV ??= 'development';
    const started = await startServices(root, life);
    const api = `http://127.0.0.1:${started.environment.apiPort}`;
    const entry = started.children.start(
      'vite',
      [
        join(root, 'node_modules/vite/bin/vite.js'),
        '--host',
        '127.0.0.1',
        '--port',
        String(vite),
        '--strictPort',
      ],
      { ...process.env, MILLPOND_API: api },
      { cwd: root },
    );
    await started.children.answers(entry, `http://127.0.0.1:${vite}/`);
    say('ready');
    print(`\n  Vite serves the client at http://127.0.0.1:${vite} and passes the API on.\n`);
  }),
);
process.exit(process.exitCode ?? 0);

async function stateOf(folder) {
  const { prepareState } = await import('./lib/state.mjs');
  const path = stateFolder(folder);
  prepareState(path);
  return path;
}
