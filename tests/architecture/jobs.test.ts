import { readdir } from 'node:fs/promises';
import { expect, test } from 'vitest';
import { prepareJob } from '#server/jobs/define-job.ts';
import type { JobDefinition } from '#server/jobs/define-job.ts';
import { jobDefinitions } from '#server/jobs/job-definitions.ts';
import { registry } from '#worker/registry.ts';

const definitions: readonly JobDefinition[] = jobDefinitions;

test('every definition is listed under the name of its file, and has its handler', async () => {
  const files = (await readdir('server/jobs/definitions')).map((name) =>
    name.replace(/\.job\.ts$/, ''),
  );
  const names = definitions.map((definition) => definition.name);
  expect([...names].sort()).toEqual(files.sort());
  expect(Object.keys(registry).sort()).toEqual([...names].sort());
  for (const [name, handler] of Object.entries(registry)) {
    expect(handler.name).toBe(name);
  }
});

test('what comes by itself takes no more than its schedule can tell it', () => {
  for (const definition of definitions.filter(({ schedule }) => schedule !== null)) {
    const payload = definition.schedule?.kind === 'site-day' ? { siteId: 1 } : {};
    expect(() => prepareJob(definition, payload, null)).not.toThrow();
  }
});
