import { spawn } from 'node:child_process';
import { existsSync, mkdtempSync, readdirSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';

const bin = (root, path) => join(root, 'node_modules', path);

/** The checks that read the code and start nothing. */
export function codeChecks(root) {
  const lint = bin(root, 'eslint/bin/eslint.js');
  const folders = ['src', 'server', 'worker', 'shared', 'fakes', 'tests'].filter((name) =>
    existsSync(join(root, name)),
  );
  return [
    { name: 'types', args: [bin(root, 'typescript/bin/tsc'), '--noEmit'] },
    {
      name: 'import directions',
      args: [
        bin(root, 'dependency-cruiser/bin/dependency-cruise.mjs'),
        ...['--config', 'tests/architecture/import-rules.cjs', '--output-type', 'err', ...folders],
      ],
    },
    {
      name: 'format',
      args: [
        bin(root, 'prettier/bin/prettier.cjs'),
        '--check',
        '--log-level',
        'warn',
        '.',
        '!drizzle/meta',
      ],
    },
    { name: 'migrations match the tables', run: () => migrationDrift(root) },
    {
      name: 'lint',
      args: [lint, '-c', 'tests/architecture/eslint.config.js', '--max-warnings', '0', '.'],
    },
  ];
}

/** Runs one node program, its output kept; gives whether it ended well. */
export function runStep(root, args, env = process.env) {
  return new Promise((resolve) => {
    const child = spawn(process.execPath, args, {
      cwd: root,
      env,
      stdio: ['ignore', 'pipe', 'pipe'],
    });
    let output = '';
    child.stdout.on('data', (piece) => (output += piece));
    child.stderr.on('data', (piece) => (output += piece));
    child.on('error', (error) => resolve({ isGood: false, output: String(error) }));
    child.on('close', (code) => resolve({ isGood: code === 0, output }));
  });
}

/** Generating must write nothing: a table changed without its migration is a fault. */
async function migrationDrift(root) {
  const folder = join(root, 'drizzle');
  const list = () => readdirSync(folder, { recursive: true }).map(String).sort();
  const before = list();
  const result = await runStep(root, [
    bin(root, 'drizzle-kit/bin.cjs'),
    ...['generate', '--name', 'drift-check'],
  ]);
  const added = list().filter((name) => !before.includes(name));
  if (added.length === 0) {
    return result;
  }
  const sql = added.filter((name) => name.endsWith('.sql'));
  const text = sql.map((name) => readFileSync(join(folder, name), 'utf8')).join('\n');
  await restore(root, folder, added);
  return {
    isGood: false,
    output: `The tables have changed without a migration. Generate one (npx drizzle-kit generate --name …). Missing:\n${text}`,
  };
}

async function restore(root, folder, added) {
  for (const name of added) {
    rmSync(join(folder, name), { force: true });
  }
  const journal = join(folder, 'meta', '_journal.json');
  const child = spawn('git', ['checkout', '--', journal], { cwd: root, stdio: 'ignore' });
  await new Promise((resolve) => child.on('close', resolve));
}

export function temporaryFolder(name) {
  return mkdtempSync(join(tmpdir(), `millpond-${name}-`));
}
