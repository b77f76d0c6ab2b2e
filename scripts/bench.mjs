import { existsSync, readdirSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { ensureClient } from './lib/build.mjs';
import { runStep } from './lib/check-steps.mjs';
import { ensureChromium, ensureNodeModules, requireNode } from './lib/packages.mjs';
import { runMain } from './lib/say.mjs';
import { startTestCluster } from './lib/test-cluster.mjs';

const root = dirname(dirname(fileURLToPath(import.meta.url)));

/** One JSON object a line on standard output; everything else goes to standard error. */
await runMain(async () => {
  requireNode();
  // Progress of the preparation must not mix with the figures.
  const write = process.stdout.write.bind(process.stdout);
  process.stdout.write = (...args) => process.stderr.write(...args);
  await ensureNodeModules(root);
  await ensureChromium();
  await ensureClient(root);
  const cluster = await startTestCluster('bench');
  try {
    const folder = join(root, 'tests', 'bench');
    const files = existsSync(folder)
      ? readdirSync(folder)
          .filter((name) => name.endsWith('.bench.ts'))
          .sort()
      : [];
    for (const name of files) {
      const result = await runStep(root, ['--import', 'tsx', join('tests', 'bench', name)], {
        ...process.env,
        TEST_PG_ADMIN_URL: cluster.adminUrl,
      });
      for (const line of result.output.split('\n')) {
        if (line.startsWith('{"name"')) {
          write(`${line}\n`);
        } else if (line.trim() !== '') {
          process.stderr.write(`${line}\n`);
        }
      }
      if (!result.isGood) {
        write(
          `${JSON.stringify({ name: `${name} could not be measured`, value: 1, unit: 'failures', limit: { max: 0 } })}\n`,
        );
      }
    }
  } finally {
    await cluster.stop();
  }
});
process.exit(0);
