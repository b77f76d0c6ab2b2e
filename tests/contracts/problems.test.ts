import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { expect, test } from 'vitest';
import { contracts } from '#shared/contracts/registry.ts';

const root = new URL('../', import.meta.url).pathname;

function sources(folder: string): string[] {
  return readdirSync(join(root, folder), { recursive: true })
    .map(String)
    .filter((name) => name.endsWith('.test.ts'))
    .map((name) => readFileSync(join(root, folder, name), 'utf8'));
}

const files = [...sources('api'), ...sources('faults')];
const camelCase = (name: string) =>
  name.replaceAll(/-([a-z])/g, (_match, letter: string) => letter.toUpperCase());

// The walk covers what every endpoint has in common; what one of them adds needs a test of its own.
const declared = contracts.flatMap(({ name, problems }) =>
  problems.map((code) => [name, code] as const),
);

test.each(declared)('a test of %s meets %s', (name, code) => {
  const call = new RegExp(`\\b${camelCase(name)}\\b`);
  expect(files.some((text) => call.test(text) && text.includes(`'${code}'`))).toBe(true);
});
