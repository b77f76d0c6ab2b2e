import { dirname } from 'node:path';
import { fileURLToPath } from 'node:url';
import { ensureClient } from './lib/build.mjs';
import { codeChecks, runStep } from './lib/check-steps.mjs';
import { ensureNodeModules, requireNode } from './lib/packages.mjs';
import { Failure, print, runMain, say } from './lib/say.mjs';

const root = dirname(dirname(fileURLToPath(import.meta.url)));

/** Everything that can be checked without a database: before every landing. */
await runMain(async () => {
  requireNode();
  await ensureNodeModules(root);
  const failed = [];
  for (const step of codeChecks(root)) {
    const result = await (step.run?.() ?? runStep(root, step.args));
    say(`${result.isGood ? 'passed' : 'FAILED'}  ${step.name}`);
    if (!result.isGood) {
      failed.push(step.name);
      print(result.output);
    }
  }
  await ensureClient(root);
  if (failed.length > 0) {
    throw new Failure(`Mend and run again: ${failed.join(', ')}.`);
  }
});
