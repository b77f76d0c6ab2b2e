import { afterAll, beforeAll, expect, test } from 'vitest';
import { listPolicies, setPolicy } from '#shared/contracts/settings.contract.ts';
import { listAuditEvents } from '#shared/contracts/audit.contract.ts';
import { startTestApp } from '#tests/support/test-app.ts';
import type { TestApp } from '#tests/support/test-app.ts';

let app: TestApp;
beforeAll(async () => {
  app = await startTestApp();
});
afterAll(() => app.stop());

test('a manager sets a policy, everybody at the site reads it, and the trail shows old and new', async () => {
  const manager = await app.signInAs({ roles: ['manager'] });
  const engineer = await app.signInAs({ roles: ['engineer'] });
  const auditor = await app.signInAs({ roles: ['auditor'] });

  const saved = await app.call(setPolicy, manager, {
    params: { key: 'safePercentile' },
    body: { value: 80, version: 0 },
  });

  expect(saved.body).toMatchObject({ value: 80, fallback: 90, version: 1, unit: '%' });
  const { body } = await app.call(listPolicies, engineer);
  expect(body.items.find((policy) => policy.key === 'safePercentile')?.value).toBe(80);
  const trail = await app.call(listAuditEvents, auditor, { query: { subjectKind: 'policy' } });
  expect(trail.body.items[0]).toMatchObject({
    actor: { id: manager.personId },
    action: 'policy.edit',
    before: { key: 'safePercentile', value: 90 },
    after: { key: 'safePercentile', value: 80 },
    at: '2026-03-02T08:00:00.000Z',
  });
});

test('who saves over a newer version is shown the current value instead', async () => {
  const manager = await app.signInAs({ roles: ['manager'] });
  const params = { key: 'noShowHours' };
  await app.call(setPolicy, manager, { params, body: { value: 4, version: 0 } });
  await app.call(setPolicy, manager, { params, body: { value: 6, version: 1 } });

  for (const version of [0, 1, 3]) {
    const { status, problem } = await app.callRefused(setPolicy, manager, {
      params,
      body: { value: 8, version },
    });
    expect(status).toBe(409);
    expect(problem).toMatchObject({ code: 'version.stale', current: { value: 6, version: 2 } });
  }
});

test('two managers who set the same default at once: one wins, the other is told', async () => {
  const managers = await Promise.all([
    app.signInAs({ roles: ['manager'] }),
    app.signInAs({ roles: ['manager'] }),
  ]);
  const answers = await Promise.all(
    managers.map((manager, index) =>
      app.send(setPolicy, manager, {
        params: { key: 'matchMin' },
        body: { value: 30 + index, version: 0 },
      }),
    ),
  );
  expect(answers.map((answer) => answer.status).sort()).toEqual([200, 409]);
});

test.each([
  ['safePercentile', 96, 'Give a whole number from 50 to 95 %.'],
  ['safePercentile', 80.5, 'Give a whole number from 50 to 95 %.'],
  ['engineersMayConfirm', 'yes', 'Give yes or no.'],
  ['logCannotTellOutcome', 'pass', 'Give either caution or stop.'],
  ['reminderLeadDays', [7, 7], 'Give one to eight different whole numbers from 1 to 180 days.'],
])('%s refuses %j and says what it takes', async (key, value, sentence) => {
  const manager = await app.signInAs({ roles: ['manager'] });
  const { status, problem } = await app.callRefused(setPolicy, manager, {
    params: { key },
    body: { value, version: 0 },
  });
  expect(status).toBe(422);
  expect(problem.errors).toEqual([{ detail: sentence, pointer: '#/value' }]);
});

test('a policy nobody knows is not found', async () => {
  const manager = await app.signInAs({ roles: ['manager'] });
  const { status } = await app.callRefused(setPolicy, manager, {
    params: { key: 'toString' },
    body: { value: 1, version: 0 },
  });
  expect(status).toBe(404);
});
