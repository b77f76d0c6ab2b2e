import { ConfigError, loadProcessConfig } from '#server/config.ts';
import { startWorker } from './start-worker.ts';

/** Shorter than the launcher waits; a job cut off here is taken up again by the next worker. */
const drainMs = 8000;

async function main(): Promise<void> {
  const worker = await startWorker(loadProcessConfig());
  let isStopping = false;
  async function stop(): Promise<void> {
    if (isStopping) {
      return;
    }
    isStopping = true;
    const force = setTimeout(() => {
      process.exit(1);
    }, drainMs);
    await worker.stop();
    clearTimeout(force);
  }
  for (const signal of ['SIGTERM', 'SIGINT'] as const) {
    process.on(signal, () => void stop());
  }
}

try {
  await main();
} catch (error) {
  if (!(error instanceof ConfigError)) {
    throw error;
  }
  process.stderr.write(`${error.message}\n`);
  process.exitCode = 1;
}
