import { spawn } from 'node:child_process';
import { closeSync, openSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { setTimeout as wait } from 'node:timers/promises';
import { Failure, isDiskFull } from './say.mjs';

/** The last lines of a log that say something to a person. */
function lastWords(log) {
  const lines = readFileSync(log, 'utf8').trim().split('\n').slice(-12);
  const text = lines.join('\n');
  if (isDiskFull({ message: text })) {
    return 'the disk is full';
  }
  const plain = lines.filter(
    (line) => line !== '' && !line.startsWith('{') && !/^\s+at /.test(line),
  );
  return plain.slice(-4).join(' ').slice(0, 400);
}

/**
 * Long-running programs, each in a process group of its own so that Ctrl-C reaches only the launcher,
 * which stops them in order.
 */
export class Children {
  #running = [];
  #folder;
  #onDeath;
  #isStopping = false;

  constructor(folder, onDeath) {
    this.#folder = folder;
    this.#onDeath = onDeath;
  }

  start(name, args, env, options = {}) {
    const log = join(this.#folder, 'logs', `${name}.log`);
    const output = openSync(log, 'w');
    const child = spawn(process.execPath, args, {
      cwd: options.cwd,
      env,
      detached: true,
      stdio: ['ignore', output, output],
    });
    closeSync(output);
    const entry = { name, child, log, isGone: false };
    this.#running.push(entry);
    child.on('exit', (code, signal) => {
      entry.isGone = true;
      if (!this.#isStopping) {
        this.#onDeath(new Failure(this.#epitaph(entry, code ?? signal)));
      }
    });
    return entry;
  }

  #epitaph(entry, how) {
    const words = lastWords(entry.log);
    return `The ${entry.name} stopped by itself (${how})${words === '' ? '' : `: ${words}`} Read ${entry.log}, mend the cause and start again.`;
  }

  /** Waits until an address answers, the program dies, or the time is over. */
  async answers(entry, url, seconds = 60) {
    const end = Date.now() + seconds * 1000;
    while (Date.now() < end) {
      if (entry.isGone) {
        throw new Failure(this.#epitaph(entry, entry.child.exitCode ?? entry.child.signalCode));
      }
      try {
        const response = await fetch(url, { signal: AbortSignal.timeout(3000) });
        if (response.ok) {
          return;
        }
      } catch {
        // Not listening yet: asked again until the time is over.
      }
      await wait(120);
    }
    throw new Failure(
      `The ${entry.name} did not answer at ${url} within ${seconds} s: read ${entry.log}, mend the cause and start again.`,
    );
  }

  /** Stops the last started first; what does not go within ten seconds is killed. */
  async stopAll() {
    this.#isStopping = true;
    for (const entry of this.#running.toReversed()) {
      if (entry.isGone) {
        continue;
      }
      entry.child.kill('SIGTERM');
      for (let tenths = 0; tenths < 100 && !entry.isGone; tenths += 1) {
        await wait(100);
      }
      if (!entry.isGone) {
        entry.child.kill('SIGKILL');
      }
    }
    this.#running = [];
  }
}
