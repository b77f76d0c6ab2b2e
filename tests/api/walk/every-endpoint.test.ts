import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { contracts } from '#shared/contracts/registry.ts';
import type { Contract } from '#shared/contracts/define-contract.ts';
import { roles } from '#shared/domain/policies/actions.ts';
import type { Role } from '#shared/domain/policies/actions.ts';
import { permissions } from '#shared/domain/policies/permissions.ts';
import { startTestApp } from '#tests/support/test-app.ts';
import type { CallInput, TestApp, TestPerson } from '#tests/support/test-app.ts';

/**
 * Walks over every contract with every role at the own site, at the other site and with none. What one
 * endpoint means is tested with its feature; here stands what none of them may get wrong.
 */
let app: TestApp;
const people = new Map<string, TestPerson>();
beforeAll(async () => {
  app = await startTestApp();
  people.set('nobody', await app.signInAs());
  for (const role of roles) {
    people.set(role, await app.signInAs({ roles: [role] }));
    people.set(`${role}@otterholm`, await app.signInAs({ roles: [`${role}@otterholm`] }));
  }
});
afterAll(() => app.stop());

const guarded = contracts.filter(({ access }) => access.kind !== 'public');
const ofSite = guarded.filter(({ path }) => path.includes('/:site'));
const params = { id: 987_654, lotId: 987_654, tag: 'Z99', key: 'no-such' };

function personOf(name: string): TestPerson {
  const person = people.get(name);
  if (person === undefined) {
    throw new Error(`Nobody is called ${name}.`);
  }
  return person;
}

function isAllowed(contract: Contract, role: Role): boolean {
  const { access } = contract;
  return access.kind !== 'action' || permissions[access.action].reach[role] !== undefined;
}

/** A body no contract accepts, so that a call which gets past the door still changes nothing. */
function oddInput(contract: Contract): CallInput {
  return contract.method === 'GET'
    ? { params, query: { 'no-such-field': 'x' } }
    : { params, body: { 'no-such-field': 'x' } };
}

function firstAllowed(contract: Contract): TestPerson {
  const role = roles.find((each) => isAllowed(contract, each));
  if (role === undefined) {
    throw new Error(`No role may call ${contract.name}.`);
  }
  return personOf(role);
}

describe.each(guarded.map((contract) => [contract.name, contract] as const))(
  '%s',
  (_name, contract) => {
    test('asks for sign-in', async () => {
      const { status, problem } = await app.callRefused(contract, null, oddInput(contract));
      expect([status, problem.code]).toEqual([401, 'session.missing']);
    });

    test('refuses fields it does not know, and says which', async () => {
      const person = firstAllowed(contract);
      const { status, problem } = await app.callRefused(contract, person, oddInput(contract));
      if (contract.path.endsWith('/files') && contract.method === 'POST') {
        // Its body is the file itself, which arrives as bytes.
        expect(status).toBeGreaterThanOrEqual(400);
        return;
      }
      expect([status, problem.code]).toEqual([422, 'input.invalid']);
      expect(problem.errors?.length).toBeGreaterThan(0);
    });
  },
);

describe.each(ofSite.map((contract) => [contract.name, contract] as const))(
  '%s at its site',
  (_name, contract) => {
    test('does not exist for who has no role there, whatever they are elsewhere', async () => {
      for (const name of ['nobody', ...roles.map((role) => `${role}@otterholm`)]) {
        const answer = await app.callRefused(contract, personOf(name), oddInput(contract));
        expect([name, answer.status, answer.problem.code]).toEqual([name, 404, 'not-found']);
      }
    });

    test('lets in the roles that its action names and no other', async () => {
      for (const role of roles) {
        const answer = await app.callRefused(contract, personOf(role), oddInput(contract));
        const isRefused = answer.problem.code === 'access.refused';
        expect([role, isRefused, answer.status === 403]).toEqual([
          role,
          !isAllowed(contract, role),
          !isAllowed(contract, role),
        ]);
      }
    });
  },
);

const changes = guarded.filter(({ method }) => method !== 'GET');
test.each(changes.map((contract) => [contract.name, contract] as const))(
  '%s is refused without the token of the page',
  async (_name, contract) => {
    for (const csrfToken of [null, 'wrong']) {
      const answer = await app.callRefused(contract, firstAllowed(contract), {
        ...oddInput(contract),
        csrfToken,
      });
      expect([answer.status, answer.problem.code]).toEqual([403, 'session.csrf']);
    }
  },
);

test.each(guarded.filter(({ idempotent }) => idempotent).map((each) => [each.name, each] as const))(
  '%s is refused without an idempotency key',
  async (_name, contract) => {
    const answer = await app.callRefused(contract, firstAllowed(contract), {
      ...oddInput(contract),
      idempotencyKey: null,
    });
    expect([answer.status, answer.problem.code]).toEqual([400, 'idempotency.missing']);
  },
);

const records = ofSite.filter(
  ({ method, path }) => method === 'GET' && /:(id|tag)\b/.test(path) && !path.includes('/week'),
);
test.each(records.map((contract) => [contract.name, contract] as const))(
  '%s answers 404 for a record that is not there',
  async (_name, contract) => {
    const answer = await app.callRefused(contract, firstAllowed(contract), { params });
    expect([answer.status, answer.problem.code]).toEqual([404, 'not-found']);
  },
);
