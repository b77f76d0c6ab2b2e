import { spawn } from 'node:child_process';
import { once } from 'node:events';
import { mkdtemp, rm } from 'node:fs/promises';
import { createServer } from 'node:http';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { performance } from 'node:perf_hooks';
import { fileURLToPath } from 'node:url';
import { z } from 'zod';

const root = fileURLToPath(new URL('../../', import.meta.url));

export type Launched = {
  readonly url: string;
  /** Where the mail stand-in shows what was sent. */
  readonly mailUrl: string;
  readonly startedInMs: number;
  readonly stop: () => Promise<void>;
};

/** A folder of its own for the launcher's state, so that nobody's data are touched. */
export async function makeStateFolder() {
  const folder = await mkdtemp(join(tmpdir(), 'millpond-state-'));
  return { folder, remove: () => rm(folder, { recursive: true, force: true }) };
}

async function freePort(): Promise<number> {
  const server = createServer().listen(0, '127.0.0.1');
  await once(server, 'listening');
  const { port } = z.object({ port: z.number() }).parse(server.address());
  server.close();
  await once(server, 'close');
  return port;
}

/** Runs `npm start` as a person would, on ports and in a folder of its own, until it says it is ready. */
export async function launchMillpond(stateFolder: string): Promise<Launched> {
  const begin = performance.now();
  const child = spawn(process.execPath, [join(root, 'scripts/start.mjs')], {
    cwd: root,
    env: {
      ...process.env,
      NODE_ENV: 'production',
      MILLPOND_STATE: stateFolder,
      PORT: String(await freePort()),
    },
    stdio: ['ignore', 'pipe', 'pipe'],
  });
  let written = '';
  const ended = once(child, 'exit');
  const ready = new Promise<{ url: string; mailUrl: string }>((resolve, reject) => {
    const read = (piece: Buffer) => {
      written += piece.toString('utf8');
      const url = /Millpond is ready:\s+(\S+)/.exec(written)?.[1];
      const mailUrl = /mails appears at (\S+)/.exec(written)?.[1];
      if (url !== undefined && mailUrl !== undefined) {
        resolve({ url, mailUrl });
      }
    };
    child.stdout.on('data', read);
    child.stderr.on('data', read);
    child.once('exit', () => {
      reject(new Error(`The launcher ended before it was ready:\n${written.slice(-2000)}`));
    });
  });
  const addresses = await ready;
  return {
    ...addresses,
    startedInMs: performance.now() - begin,
    stop: async () => {
      child.kill('SIGINT');
      await ended;
    },
  };
}
