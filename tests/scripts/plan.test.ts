import { execFile } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { createServer } from 'node:net';
import { once } from 'node:events';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { afterAll, beforeEach, expect, test } from 'vitest';
import { z } from 'zod';

/**
 * The launcher is plain JavaScript that runs before anything is installed, so it is tested from outside:
 * a small program imports it, does one thing and prints the result as JSON.
 */
const library = new URL('../../scripts/lib/', import.meta.url).href;
const root = fileURLToPath(new URL('../../', import.meta.url));
const folders: string[] = [];
let folder = '';
beforeEach(() => {
  folder = mkdtempSync(join(tmpdir(), 'millpond-scripts-'));
  folders.push(folder);
});
afterAll(() => {
  for (const each of folders) {
    rmSync(each, { recursive: true, force: true });
  }
});

const outcome = z.object({ value: z.unknown().optional(), failure: z.string().optional() });

function run(module: string, expression: string, env: Record<string, string> = {}) {
  const program = `
    import * as lib from '${library}${module}.mjs';
    const folder = ${JSON.stringify(folder)};
    try { console.log(JSON.stringify({ value: await (${expression}) })); }
    catch (error) { console.log(JSON.stringify({ failure: error.message })); }`;
  return new Promise<z.infer<typeof outcome>>((resolve, reject) => {
    execFile(
      process.execPath,
      ['--input-type=module', '--eval', program],
      { env: { PATH: process.env['PATH'] ?? '', ...env }, cwd: root },
      (error, stdout) => {
        if (error === null) {
          resolve(outcome.parse(JSON.parse(stdout)));
        } else {
          reject(new Error(stdout, { cause: error }));
        }
      },
    );
  });
}

test('with nothing set everything runs here and the demo is loaded', async () => {
  const { value } = await run('plan', 'lib.planServices({})');
  expect(value).toEqual({
    ownsDatabase: true,
    ownsIdentity: true,
    ownsMail: true,
    loadsDemo: true,
    apiPort: null,
  });
});

test('a service that is named is used, and no demo goes into a database of somebody else', async () => {
  const { value } = await run(
    'plan',
    `lib.planServices({
      DATABASE_URL: 'postgres://app@db/millpond', DATABASE_OWNER_URL: 'postgres://owner@db/millpond',
      OIDC_ISSUER: 'https://id.example', OIDC_CLIENT_ID: 'a', OIDC_CLIENT_SECRET: 'b',
      SMTP_URL: 'smtp://mail.example', PORT: '8080' })`,
  );
  expect(value).toEqual({
    ownsDatabase: false,
    ownsIdentity: false,
    ownsMail: false,
    loadsDemo: false,
    apiPort: 8080,
  });
});

test.each([
  ["{ DATABASE_URL: 'postgres://app@db/x' }", 'DATABASE_OWNER_URL'],
  ["{ OIDC_ISSUER: 'https://id.example' }", 'OIDC_CLIENT_ID'],
  ["{ PORT: 'seventy' }", 'PORT is "seventy"'],
  ["{ SMTP_URL: 'mail' }", 'SMTP_URL is "mail"'],
])('the setting %s is refused in one sentence that names it', async (settings, named) => {
  const { failure = '' } = await run('plan', `lib.planServices(${settings})`);
  expect(failure).toContain(named);
  expect(failure).toMatch(/(set it|unset|correct|to use)/);
  expect(failure.trim().split('\n')).toHaveLength(1);
});

test('ports are chosen once and kept', async () => {
  const first = await run('state', 'lib.keepPorts(folder)');
  const second = await run('state', 'lib.keepPorts(folder)');
  expect(second.value).toEqual(first.value);
  expect(new Set(Object.values(z.record(z.string(), z.number()).parse(first.value))).size).toBe(6);
});

test('a port taken by another program is a sentence that says what to do', async () => {
  const server = createServer().listen(0, '127.0.0.1');
  await once(server, 'listening');
  const { port } = z.object({ port: z.number() }).parse(server.address());
  const { failure } = await run('state', `lib.requireFreePort(${port}, 'pages', 'PORT')`);
  server.close();
  expect(failure).toContain(`Port ${port}`);
  expect(failure).toContain('stop that program, or set PORT to a free port');
});

test('secrets are made once and readable by their owner alone', async () => {
  const first = await run('state', 'lib.keepSecrets(folder)');
  const second = await run('state', 'lib.keepSecrets(folder)');
  expect(second.value).toEqual(first.value);
  expect(statSync(join(folder, 'secrets.json')).mode & 0o077).toBe(0);
});

test('a second start is told where the first one runs; the mark of a killed one is taken over', async () => {
  const mark = join(folder, 'running.json');
  writeFileSync(mark, JSON.stringify({ processId: process.pid, url: 'http://127.0.0.1:4300' }));
  const { failure } = await run('state', "lib.claimState(folder, 'http://127.0.0.1:1')");
  expect(failure).toContain('already runs at http://127.0.0.1:4300');

  writeFileSync(mark, JSON.stringify({ processId: 2 ** 22 - 3, url: 'http://127.0.0.1:4300' }));
  const taken = await run('state', "lib.claimState(folder, 'http://127.0.0.1:1') && null");
  expect(taken.failure).toBeUndefined();
  expect(readFileSync(mark, 'utf8')).toContain('http://127.0.0.1:1');
});

test('a damaged state file says which and what to do', async () => {
  writeFileSync(join(folder, 'ports.json'), '{ "api": 43');
  const { failure } = await run('state', 'lib.keepPorts(folder)');
  expect(failure).toContain('ports.json');
  expect(failure).toContain('npm run reset');
});

test('an old Node is refused with the version that is needed', async () => {
  const { failure } = await run('packages', "lib.requireNode('18.20.1')");
  expect(failure).toContain('needs Node.js 20.19 or later, and this is 18.20.1');
  expect((await run('packages', "lib.requireNode('20.19.0') ?? null")).failure).toBeUndefined();
});
