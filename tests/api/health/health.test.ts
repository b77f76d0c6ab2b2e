import { once } from 'node:events';
import { createServer } from 'node:http';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { z } from 'zod';
import { getHealth } from '#shared/contracts/health.contract.ts';
import { problemSchema } from '#shared/contracts/problems.ts';
import { createApp } from '#server/app.ts';
import { buildDeps } from '#server/deps.ts';
import { createSessionStore } from '#server/http/sessions.ts';
import { testConfig } from '#tests/support/test-config.ts';
import { startTestApp } from '#tests/support/test-app.ts';
import type { TestApp } from '#tests/support/test-app.ts';

let app: TestApp;
beforeAll(async () => {
  app = await startTestApp();
});
afterAll(() => app.stop());

test('says that it is ready and what still waits', async () => {
  const { body } = await app.call(getHealth, null);
  expect(body).toEqual({
    isReady: true,
    now: '2026-03-02T08:00:00.000Z',
    outboxWaiting: 0,
    outboxOldestS: 0,
    auditUnsealed: 0,
  });
});

test('without its database it answers 503 with a sentence that says what to do', async () => {
  const { deps, database, close } = buildDeps(testConfig());
  const store = createSessionStore(database.pool, deps.log);
  const server = createServer(createApp({ deps, sessionStore: store })).listen(0, '127.0.0.1');
  await once(server, 'listening');
  const { port } = z.object({ port: z.number() }).parse(server.address());

  const response = await fetch(`http://127.0.0.1:${port}/api/health`);
  const problem = problemSchema.parse(await response.json());

  server.close();
  server.closeAllConnections();
  store.close();
  await close();
  expect([response.status, problem.code]).toEqual([503, 'service.unavailable']);
  expect(problem.detail).not.toMatch(/ECONNREFUSED|127\.0\.0\.1|\bat /);
});
