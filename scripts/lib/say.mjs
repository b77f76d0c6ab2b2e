import process from 'node:process';

/** A failure a person can act on: its message is one sentence that says what to do. */
export class Failure extends Error {
  name = 'Failure';
}

const startedAt = Date.now();

/** One progress line with the seconds since the start. */
export function say(text) {
  const seconds = ((Date.now() - startedAt) / 1000).toFixed(1).padStart(6);
  process.stdout.write(`${seconds} s  ${text}\n`);
}

export function print(text = '') {
  process.stdout.write(`${text}\n`);
}

/** Runs a command's main function; a Failure ends with its sentence, anything else says so. */
export async function runMain(main) {
  try {
    await main();
  } catch (error) {
    const wantsStack = process.env.MILLPOND_DEBUG !== undefined;
    if (error instanceof Failure && !wantsStack) {
      process.stderr.write(`\n${error.message}\n`);
    } else if (isDiskFull(error)) {
      process.stderr.write('\nThe disk is full: free some space and start again.\n');
    } else {
      const text = wantsStack ? (error.stack ?? String(error)) : String(error.message ?? error);
      process.stderr.write(
        `\nSomething unexpected failed: ${text}\nSet MILLPOND_DEBUG=1 and start again to see where.\n`,
      );
    }
    process.exitCode = 1;
  }
}

export function isDiskFull(error) {
  return error?.code === 'ENOSPC' || /no space left on device/i.test(String(error?.message ?? ''));
}
