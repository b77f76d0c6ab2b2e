import { existsSync, readFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { ensureClient } from './lib/build.mjs';
import { codeChecks, runStep } from './lib/check-steps.mjs';
import { ensureChromium, ensureNodeModules, requireNode } from './lib/packages.mjs';
import { print, runMain, say } from './lib/say.mjs';
import { startTestCluster } from './lib/test-cluster.mjs';

const root = dirname(dirname(fileURLToPath(import.meta.url)));
const vitest = join(root, 'node_modules/vitest/vitest.mjs');
const totals = { passed: 0, failed: 0 };

function count(isGood, name, output) {
  totals[isGood ? 'passed' : 'failed'] += 1;
  say(`${isGood ? 'passed' : 'FAILED'}  ${name}`);
  if (!isGood) {
    print(output.trim().split('\n').slice(-150).join('\n'));
  }
}

/** One vitest project; a run that ends without a report counts as one failure of its own. */
async function runProject(project, folder, env) {
  const report = join(folder, `${project}.json`);
  const result = await runStep(
    root,
    [
      vitest,
      ...['run', '--project', project],
      ...['--reporter=dot', '--reporter=json', `--outputFile.json=${report}`],
    ],
    env,
  );
  if (!existsSync(report)) {
    count(false, `tests: ${project} (no report)`, result.output);
    return;
  }
  const { numPassedTests, numFailedTests, numTotalTests, testResults } = JSON.parse(
    readFileSync(report, 'utf8'),
  );
  // A file that cannot be loaded has no test to fail: it counts as one failed.
  const broken = testResults.filter(
    (file) =>
      file.status === 'failed' && file.assertionResults.every((test) => test.status !== 'failed'),
  );
  const failed = numFailedTests + broken.length;
  totals.passed += numPassedTests;
  totals.failed += failed;
  say(
    `${failed === 0 && result.isGood ? 'passed' : 'FAILED'}  tests: ${project}, ${numPassedTests} of ${numTotalTests}`,
  );
  if (failed > 0 || !result.isGood) {
    print(result.output.trim().split('\n').slice(-400).join('\n'));
  }
  if (failed === 0 && !result.isGood) {
    totals.failed += 1;
  }
}

await runMain(async () => {
  requireNode();
  await ensureNodeModules(root);
  await ensureChromium();
  say('starting a database for the tests');
  const cluster = await startTestCluster('test');
  const env = { ...process.env, NODE_ENV: 'test', TEST_PG_ADMIN_URL: cluster.adminUrl };
  try {
    // Two cores: the checks that read the code share the machine with the tests that need no service.
    const checks = (async () => {
      for (const step of codeChecks(root)) {
        const result = await (step.run?.() ?? runStep(root, step.args));
        count(result.isGood, step.name, result.output);
      }
    })();
    const unit = runProject('unit', cluster.folder, env);
    await Promise.all([checks, unit]);
    await ensureClient(root).then(
      () => count(true, 'build of the client', ''),
      (error) => count(false, 'build of the client', error.message),
    );
    await runProject('services', cluster.folder, env);
    await runProject('e2e', cluster.folder, env);
  } finally {
    await cluster.stop();
  }
});
if (process.exitCode === 1) {
  totals.failed += 1;
}
print(`${totals.passed} passed, ${totals.failed} failed`);
process.exit(totals.failed > 0 ? 1 : 0);
