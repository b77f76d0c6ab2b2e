import { readFile } from 'node:fs/promises';
import { expect, test } from 'vitest';
import { environmentSchema, loadConfig } from '#server/config.ts';
import { writeEnvExample } from '#server/env-example.ts';
import { testEnvironment } from '#tests/support/test-config.ts';

test('the example of the settings is what the settings say; write it anew with npm run env:example', async () => {
  expect(await readFile('.env.example', 'utf8')).toBe(writeEnvExample());
});

test('it names every setting, and those that must be set stand open', () => {
  const lines = writeEnvExample().split('\n');
  const open = lines.filter((line) => /^[A-Z]/.test(line)).map((line) => line.split('=')[0]);
  for (const name of Object.keys(environmentSchema.shape)) {
    expect(lines.some((line) => line.replace(/^# /, '').startsWith(`${name}=`))).toBe(true);
  }
  for (const name of open) {
    expect(() => loadConfig({ ...testEnvironment(), [name ?? '']: undefined })).toThrow(name);
  }
});

test('it can be taken as it is once the open ones are filled in', () => {
  const required = new Map(Object.entries(testEnvironment()));
  const filled = writeEnvExample()
    .split('\n')
    .map((line) => /^(?:# )?(?<name>[A-Z_]+)=(?<value>.*)$/.exec(line)?.groups)
    .filter((entry) => entry !== undefined)
    .map(({ name = '', value }): [string, string | undefined] => [
      name,
      value === '' ? required.get(name) : value,
    ]);
  expect(() => loadConfig(Object.fromEntries(filled))).not.toThrow();
});
