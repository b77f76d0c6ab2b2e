import { readdirSync, readFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import { openApiDocument } from '#server/http/openapi-document.ts';
import { allRoutes } from '#server/routes.ts';
import { contracts } from '#shared/contracts/registry.ts';

const folder = new URL('../../shared/contracts/', import.meta.url);

function definedNames(): string[] {
  return readdirSync(folder)
    .filter((name) => name.endsWith('.contract.ts'))
    .flatMap((name) => [
      ...readFileSync(new URL(name, folder), 'utf8').matchAll(/^  name: '([a-z-]+)',$/gm),
    ])
    .map((match) => match[1] ?? '')
    .sort();
}

test('every contract that is defined is in the registry, once', () => {
  expect(contracts.map(({ name }) => name).sort()).toEqual(definedNames());
});

test('no two contracts answer the same call', () => {
  const calls = contracts.map(({ method, path }) => `${method} ${path.replaceAll(/:\w+/g, ':')}`);
  expect(new Set(calls).size).toBe(calls.length);
});

test('every contract has a route, and every route a contract of the registry', () => {
  const routed = allRoutes.map(({ contract }) => contract.name).sort();
  expect(routed).toEqual(contracts.map(({ name }) => name).sort());
});

test('creating calls take an idempotency key', () => {
  const creating = contracts.filter(({ status, method }) => status === 201 && method !== 'GET');
  expect(creating.filter(({ idempotent }) => !idempotent).map(({ name }) => name)).toEqual([]);
});

test('the OpenAPI document names every contract and is OpenAPI 3.1', () => {
  const document = openApiDocument(contracts);
  const operations = Object.values(document.paths).flatMap((path) => Object.values(path));
  expect(operations).toHaveLength(contracts.length);
  expect(document.openapi).toMatch(/^3\.1\./);
  // A template in a path names its parameters exactly: OpenAPI 3.1.0, section 4.8.12.1.
  for (const [path, methods] of Object.entries(document.paths)) {
    const inPath = [...path.matchAll(/\{(\w+)\}/g)].map((match) => match[1]).sort();
    for (const operation of Object.values(methods)) {
      const text = JSON.stringify(operation);
      for (const name of inPath) {
        expect(text, path).toContain(`"name":"${name ?? ''}","in":"path"`);
      }
    }
  }
});
