import { spawn } from 'node:child_process';
import { once } from 'node:events';

export type WorkerProcess = {
  /** What it has written so far. */
  readonly output: () => string;
  readonly isGone: () => boolean;
  /** Sends a signal and waits for the end. */
  end(signal: 'SIGKILL' | 'SIGTERM'): Promise<number | null>;
};

/** The worker as it runs in earnest: a process of its own, started from its main file. */
export function startWorkerProcess(environment: Readonly<Record<string, string>>): WorkerProcess {
  const child = spawn(process.execPath, ['--import', 'tsx', 'worker/main.ts'], {
    env: { ...process.env, ...environment },
    stdio: ['ignore', 'pipe', 'pipe'],
  });
  let output = '';
  for (const stream of [child.stdout, child.stderr]) {
    stream.on('data', (piece: Buffer) => {
      output += piece.toString();
    });
  }
  const exited = once(child, 'exit');
  const isGone = () => child.exitCode !== null || child.signalCode !== null;
  return {
    output: () => output,
    isGone,
    async end(signal) {
      child.kill(signal);
      await exited;
      return child.exitCode;
    },
  };
}
