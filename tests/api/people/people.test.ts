import { afterAll, beforeAll, expect, test } from 'vitest';
import { addGrant, listPeople, revokeGrant } from '#shared/contracts/people.contract.ts';
import { listPolicies } from '#shared/contracts/settings.contract.ts';
import { admitPerson } from '#server/features/people/sign-in.service.ts';
import { startTestApp } from '#tests/support/test-app.ts';
import type { TestApp, TestPerson } from '#tests/support/test-app.ts';

let app: TestApp;
let tarn: TestPerson;
beforeAll(async () => {
  app = await startTestApp();
  tarn = await app.signInAs({ roles: ['admin@*'], name: 'R. Tarn' });
});
afterAll(() => app.stop());

test('a role given acts at once, and one taken away stops acting at once', async () => {
  const newcomer = await app.signInAs({ name: 'N. Comer' });
  expect((await app.callRefused(listPolicies, newcomer)).status).toBe(404);
  const given = await app.call(addGrant, tarn, {
    params: { id: newcomer.personId },
    body: { role: 'engineer', siteCode: 'larkfen' },
  });
  expect((await app.call(listPolicies, newcomer)).status).toBe(200);
  const grant = given.body.grants[0];
  await app.call(revokeGrant, tarn, {
    params: { id: newcomer.personId, grantId: grant?.id ?? 0 },
  });
  expect((await app.callRefused(listPolicies, newcomer)).status).toBe(404);
});

test('an administrator cannot take the own administration away', async () => {
  const { body } = await app.call(listPeople, tarn, { query: { text: 'Tarn' } });
  const own = body.items[0]?.grants.find(({ role }) => role === 'admin');
  const { status, problem } = await app.callRefused(revokeGrant, tarn, {
    params: { id: tarn.personId, grantId: own?.id ?? 0 },
  });
  expect([status, problem.code]).toEqual([409, 'person.self']);
});

test('a role that comes from the identity provider is taken away there', async () => {
  const personId = await admitPerson(app.deps, {
    sub: 'vessant',
    name: 'N. Vessant',
    email: null,
    roles: ['engineer@otterholm', 'conjurer', 'engineer@nowhere'],
    idToken: '',
  });
  const { body } = await app.call(listPeople, tarn, { query: { text: 'Vessant' } });
  expect(body.items[0]?.grants).toMatchObject([
    { role: 'engineer', siteCode: 'otterholm', origin: 'claim' },
  ]);
  const { status, problem } = await app.callRefused(revokeGrant, tarn, {
    params: { id: personId, grantId: body.items[0]?.grants[0]?.id ?? 0 },
  });
  expect([status, problem.code]).toEqual([409, 'person.claim']);

  // At the next sign-in the claim is the whole truth about claimed roles.
  await admitPerson(app.deps, {
    sub: 'vessant',
    name: 'N. Vessant',
    email: null,
    roles: ['scheduler'],
    idToken: '',
  });
  const after = await app.call(listPeople, tarn, { query: { text: 'Vessant' } });
  expect(after.body.items[0]?.grants).toMatchObject([{ role: 'scheduler', siteCode: null }]);
});

test('an administrator of one site gives roles there and nowhere else', async () => {
  const local = await app.signInAs({ roles: ['admin@otterholm'] });
  const someone = await app.signInAs({ name: 'S. Omeone' });
  const params = { id: someone.personId };
  for (const siteCode of ['larkfen', null]) {
    const refused = await app.callRefused(addGrant, local, {
      params,
      body: { role: 'engineer', siteCode },
    });
    expect(refused.status).toBe(403);
  }
  const given = await app.call(addGrant, local, {
    params,
    body: { role: 'engineer', siteCode: 'otterholm' },
  });
  expect(given.body.grants).toHaveLength(1);
});

test('people are paged by name', async () => {
  for (const letter of ['a', 'b', 'c']) {
    await app.signInAs({ name: `Zz ${letter}` });
  }
  const first = await app.call(listPeople, tarn, { query: { text: 'Zz', limit: 2 } });
  const second = await app.call(listPeople, tarn, {
    query: { text: 'Zz', limit: 2, cursor: first.body.nextCursor ?? '' },
  });
  expect([...first.body.items, ...second.body.items].map(({ name }) => name)).toEqual([
    'Zz a',
    'Zz b',
    'Zz c',
  ]);
  expect(second.body.nextCursor).toBeNull();
});
