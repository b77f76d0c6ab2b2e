import { spawn } from 'node:child_process';
import { Failure, isDiskFull } from './say.mjs';

/**
 * Runs a command to its end and gives its output. A non-zero exit is a Failure with the sentence
 * given, or with the last line the command wrote.
 */
export function run(command, args, options = {}) {
  const { env, cwd, input, failure, echo = false } = options;
  return new Promise((resolve, reject) => {
    const child = spawn(command, args, {
      cwd,
      env: env ?? process.env,
      stdio: [input === undefined ? 'ignore' : 'pipe', 'pipe', 'pipe'],
    });
    let stdout = '';
    let stderr = '';
    child.stdout.on('data', (piece) => {
      stdout += piece;
      if (echo) {
        process.stdout.write(piece);
      }
    });
    child.stderr.on('data', (piece) => {
      stderr += piece;
      if (echo) {
        process.stderr.write(piece);
      }
    });
    if (input !== undefined) {
      child.stdin.end(input);
    }
    child.on('error', (error) => {
      reject(
        error.code === 'ENOENT'
          ? new Failure(
              `The program "${command}" is missing on this machine: install it and start again.`,
            )
          : error,
      );
    });
    child.on('close', (code) => {
      if (code === 0) {
        resolve({ stdout, stderr });
        return;
      }
      const written = `${stderr}\n${stdout}`.trim();
      if (isDiskFull({ message: written })) {
        reject(new Failure('The disk is full: free some space and start again.'));
        return;
      }
      const lastLine = written.split('\n').at(-1) ?? '';
      const sentence = typeof failure === 'function' ? failure(written) : failure;
      reject(new Failure(sentence ?? `${command} ended with ${code}: ${lastLine}`));
    });
  });
}

/** The same without a failure: true where the command ended well. */
export async function succeeds(command, args, options = {}) {
  try {
    await run(command, args, options);
    return true;
  } catch {
    // The answer is the point here: "no" covers a missing program and a non-zero exit alike.
    return false;
  }
}

export function isRoot() {
  return process.getuid?.() === 0;
}
