import { afterAll, beforeAll, expect, test } from 'vitest';
import { getWorkingHours, setWorkingHours } from '#shared/contracts/settings.contract.ts';
import { startTestApp } from '#tests/support/test-app.ts';
import type { TestApp } from '#tests/support/test-app.ts';

let app: TestApp;
beforeAll(async () => {
  app = await startTestApp();
});
afterAll(() => app.stop());

const day = [{ fromMin: 420, toMin: 900 }];

test('a manager changes the week and a day that differs; an older version is refused', async () => {
  const manager = await app.signInAs({ roles: ['manager'] });
  const before = await app.call(getWorkingHours, manager);
  const change = {
    weekly: [day, day, day, day, day, [], []],
    exceptions: [{ day: '2026-03-17', hours: [], reason: 'public holiday' }],
    version: before.body.version,
  };
  const saved = await app.call(setWorkingHours, manager, { body: change });
  expect(saved.body).toMatchObject({ ...change, version: before.body.version + 1 });
  expect((await app.call(getWorkingHours, manager)).body).toEqual(saved.body);

  const { status, problem } = await app.callRefused(setWorkingHours, manager, { body: change });
  expect([status, problem.code]).toEqual([409, 'version.stale']);
});

test.each([
  [[{ fromMin: 600, toMin: 600 }], '#/weekly/0'],
  [
    [
      { fromMin: 600, toMin: 700 },
      { fromMin: 650, toMin: 800 },
    ],
    '#/weekly/0',
  ],
])('hours that are empty or overlap are refused where they stand', async (monday, pointer) => {
  const manager = await app.signInAs({ roles: ['manager'] });
  const { status, problem } = await app.callRefused(setWorkingHours, manager, {
    body: { weekly: [monday, day, day, day, day, [], []], exceptions: [], version: 1 },
  });
  expect(status).toBe(422);
  expect(problem.errors?.map((each) => each.pointer)).toContain(pointer);
});

test('a day named twice is refused', async () => {
  const manager = await app.signInAs({ roles: ['manager'] });
  const holiday = { day: '2026-12-25', hours: [], reason: 'public holiday' };
  const { status } = await app.callRefused(setWorkingHours, manager, {
    body: { weekly: [day, day, day, day, day, [], []], exceptions: [holiday, holiday], version: 1 },
  });
  expect(status).toBe(422);
});
