import { randomUUID } from 'node:crypto';
import { eq } from 'drizzle-orm';
import type { z } from 'zod';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { grantsTable } from '#server/db/tables/person.table.ts';
import { requestLotsTable, requestsTable } from '#server/db/tables/request.table.ts';
import { listAuditEvents } from '#shared/contracts/audit.contract.ts';
import { confirmBooking, getBooking } from '#shared/contracts/bookings.contract.ts';
import { checkPlacement } from '#shared/contracts/offers.contract.ts';
import {
  askDeviation,
  decideDeviation,
  listDeviations,
} from '#shared/contracts/registers.contract.ts';
import type { DeviationDto } from '#shared/contracts/registers.contract.ts';
import type { CheckCode } from '#shared/domain/checks/types.ts';
import { buildBench } from '#tests/support/build-bench.ts';
import type { Bench } from '#tests/support/build-bench.ts';
import type { BuiltRequest } from '#tests/support/build-request.ts';
import { startTestApp } from '#tests/support/test-app.ts';
import type { TestPerson } from '#tests/support/test-people.ts';

let bench: Bench;
let metrologist: TestPerson;
beforeAll(async () => {
  bench = await buildBench(await startTestApp());
  metrologist = await bench.app.signInAs({ roles: ['metrologist'], name: 'Mette Metrologist' });
});
afterAll(() => bench.app.stop());

type Decision = z.input<typeof decideDeviation.body>;

const why = 'The cells were charged for shipping.';
const grant: Decision = {
  grant: true,
  reason: 'The drift is followed on a witness cell.',
  customerAcceptance: 'Mail of 27 February.',
  expiresAt: null,
};
const notRested = { lot: { restedSinceAt: new Date('2026-03-02T06:00:00Z') } };

const ask = async (
  { requestId }: BuiltRequest,
  code: CheckCode = 'rest-time',
): Promise<DeviationDto> =>
  (
    await bench.app.call(askDeviation, bench.engineer, {
      params: { id: requestId },
      body: { code, reason: why },
    })
  ).body;
const decide = async ({ id }: DeviationDto, change: Partial<Decision> = {}) =>
  (
    await bench.app.call(decideDeviation, metrologist, {
      params: { id },
      body: { ...grant, ...change },
    })
  ).body;
const listOf = async ({ requestId }: BuiltRequest) =>
  (await bench.app.call(listDeviations, bench.engineer, { params: { id: requestId } })).body.items;

const restOf = <Check extends { readonly code: string }>(checks: readonly Check[]) =>
  checks.find(({ code }) => code === 'rest-time');

/** A place that suits the request but for its rest. */
async function placementFor(made: BuiltRequest) {
  const rested = await bench.request();
  const { placement } = await bench.offer(rested);
  return { requestId: made.requestId, lotId: made.lotId, requestVersion: made.version, placement };
}

test('asked with a reason, granted by another person, and both stand on the request and in the trail', async () => {
  const auditor = await bench.app.signInAs({ roles: ['auditor'] });
  const made = await bench.request(notRested);
  const asked = await ask(made);
  expect(asked).toEqual({
    id: asked.id,
    requestId: made.requestId,
    code: 'rest-time',
    state: 'asked',
    reason: why,
    decisionReason: null,
    customerAcceptance: null,
    askedBy: 'Enid Engineer',
    askedAt: '2026-03-02T08:00:00.000Z',
    decidedBy: null,
    decidedAt: null,
    expiresAt: null,
  });
  const granted = await decide(asked, { customerAcceptance: ' Mail of 27 February. ' });
  expect(granted).toEqual({
    ...asked,
    state: 'granted',
    decisionReason: grant.reason,
    customerAcceptance: 'Mail of 27 February.',
    decidedBy: 'Mette Metrologist',
    decidedAt: '2026-03-02T08:00:00.000Z',
  });
  expect(await listOf(made)).toEqual([granted]);
  const trail = await bench.app.call(listAuditEvents, auditor, {
    query: { subjectKind: 'deviation', subjectId: asked.id },
  });
  expect(trail.body.items.map(({ action, actor }) => [action, actor?.id])).toEqual([
    ['deviation.grant', metrologist.personId],
    ['deviation.ask', bench.engineer.personId],
  ]);
});

test('what stopped the slot is a caution once it is lifted, for the offer and for the booking', async () => {
  const made = await bench.request(notRested);
  const wish = await placementFor(made);
  const before = await bench.app.callRefused(confirmBooking, bench.scheduler, { body: wish });
  expect(before.problem.code).toBe('booking.checks');
  const asked = await ask(made);
  const unanswered = await bench.app.callRefused(confirmBooking, bench.scheduler, { body: wish });
  expect(unanswered.problem.code).toBe('booking.checks');
  await decide(asked);

  const { body: checked } = await bench.app.call(checkPlacement, bench.engineer, {
    params: { id: made.requestId, lotId: made.lotId },
    body: {
      chamberTag: wish.placement.chamberTag,
      startAt: wish.placement.startAt,
      placement: wish.placement,
    },
  });
  const lifted = { code: 'rest-time', outcome: 'caution', liftedByDeviationId: asked.id };
  expect(restOf(checked.offer?.checks ?? [])).toMatchObject(lifted);
  expect(restOf(checked.offer?.checks ?? [])?.sentence).toContain(
    `Deviation ${asked.id} allows it.`,
  );
  const { body: booking } = await bench.app.call(confirmBooking, bench.scheduler, { body: wish });
  expect(restOf(booking.checks)).toMatchObject(lifted);
});

test('one that ends before the slot does lifts nothing, and is over when its day has come', async () => {
  const made = await bench.request(notRested);
  const wish = await placementFor(made);
  const expiresAt = '2026-03-02T08:30:00.000Z';
  const granted = await decide(await ask(made), { expiresAt });
  expect(granted).toMatchObject({ state: 'granted', expiresAt });
  const { problem } = await bench.app.callRefused(confirmBooking, bench.scheduler, { body: wish });
  expect(problem.code).toBe('booking.checks');
  const start = bench.app.clock.now().toISOString();
  bench.app.clock.set(expiresAt);
  expect(await listOf(made)).toMatchObject([{ state: 'expired' }]);
  bench.app.clock.set(start);
});

test('a refusal is final, says why, and lifts nothing; one may ask again', async () => {
  const made = await bench.request(notRested);
  const wish = await placementFor(made);
  const refused = await decide(await ask(made), {
    grant: false,
    reason: 'Let them rest for a week.',
    customerAcceptance: null,
  });
  expect(refused).toMatchObject({ state: 'refused', decisionReason: 'Let them rest for a week.' });
  const { problem } = await bench.app.callRefused(confirmBooking, bench.scheduler, { body: wish });
  expect(problem.code).toBe('booking.checks');
  const again = await bench.app.callRefused(decideDeviation, metrologist, {
    params: { id: refused.id },
    body: grant,
  });
  expect([again.status, again.problem.code]).toEqual([409, 'request.state']);
  expect(again.problem.detail).toContain('decided already by Mette Metrologist');
  expect((await ask(made)).state).toBe('asked');
});

test('a booking at risk stands again once what endangers it is lifted', async () => {
  const made = await bench.request();
  const booking = await bench.book(made);
  const standing = async () =>
    (await bench.app.call(getBooking, bench.engineer, { params: { id: booking.id } })).body;
  await bench.app.db
    .update(requestLotsTable)
    .set({ restedSinceAt: new Date('2026-03-02T06:00:00Z') })
    .where(eq(requestLotsTable.id, made.lotId));
  await decide(await ask(made, 'mapping'));
  expect(await standing()).toMatchObject({ isAtRisk: true });
  await decide(await ask(made));
  expect(await standing()).toMatchObject({ isAtRisk: false, atRiskReason: null });
});

test('neither who asked nor whose request it is decides, whatever else they may', async () => {
  const made = await bench.request(notRested);
  const asked = await ask(made);
  await bench.app.db.insert(grantsTable).values({
    personId: bench.engineer.personId,
    role: 'metrologist',
    siteId: bench.keepers.siteId,
    origin: 'local',
    createdAt: new Date('2026-03-02T08:00:00Z'),
  });
  const call = { params: { id: asked.id }, body: grant };
  const own = await bench.app.callRefused(decideDeviation, bench.engineer, call);
  expect([own.status, own.problem.code]).toEqual([409, 'deviation.same-person']);

  const owner = await bench.app.signInAs({ roles: ['manager'] });
  await bench.app.db
    .update(requestsTable)
    .set({ requesterId: owner.personId })
    .where(eq(requestsTable.id, made.requestId));
  const requester = await bench.app.callRefused(decideDeviation, owner, call);
  expect(requester.problem.code).toBe('deviation.same-person');
  expect((await decide(asked)).state).toBe('granted');
});

test('of two who decide at once one does, the other is told', async () => {
  const manager = await bench.app.signInAs({ roles: ['manager'] });
  const asked = await ask(await bench.request(notRested));
  const answers = await Promise.all(
    [metrologist, manager].map((person) =>
      bench.app.send(decideDeviation, person, { params: { id: asked.id }, body: grant }),
    ),
  );
  expect(answers.map(({ status }) => status).sort()).toEqual([200, 409]);
});

test.each(['double-use', 'still-phase', 'cell-limits', 'unattended'] as const)(
  'nobody is asked to lift %s',
  async (code) => {
    const made = await bench.request();
    const { status, problem } = await bench.app.callRefused(askDeviation, bench.engineer, {
      params: { id: made.requestId },
      body: { code, reason: why },
    });
    expect([status, problem.code]).toEqual([409, 'deviation.not-liftable']);
    expect(problem.detail).toContain('Change the request or choose another slot.');
    expect(await listOf(made)).toEqual([]);
  },
);

test('the same is not asked twice while it waits, nor by a repeat of the call', async () => {
  const made = await bench.request(notRested);
  const call = {
    params: { id: made.requestId },
    body: { code: 'rest-time', reason: why },
    idempotencyKey: randomUUID(),
  };
  const first = await bench.app.call(askDeviation, bench.engineer, call);
  const repeat = await bench.app.call(askDeviation, bench.engineer, call);
  expect(repeat.body).toEqual(first.body);
  const { status, problem } = await bench.app.callRefused(askDeviation, bench.engineer, {
    ...call,
    idempotencyKey: randomUUID(),
  });
  expect([status, problem.code]).toEqual([409, 'request.state']);
  expect(problem.detail).toContain('waits for a decision already');
  expect(await listOf(made)).toHaveLength(1);
  const decision = { params: { id: first.body.id }, body: grant, idempotencyKey: randomUUID() };
  const once = await bench.app.call(decideDeviation, metrologist, decision);
  const twice = await bench.app.call(decideDeviation, metrologist, decision);
  expect(twice.body).toEqual(once.body);
});

test.each([
  [{ customerAcceptance: null }, '#/customerAcceptance'],
  [{ customerAcceptance: '  ' }, '#/customerAcceptance'],
  [{ expiresAt: '2026-03-02T08:00:00.000Z' }, '#/expiresAt'],
  [{ reason: '' }, '#/reason'],
])('a decision with %j is refused at its field', async (change, pointer) => {
  const asked = await ask(await bench.request(notRested));
  const { status, problem } = await bench.app.callRefused(decideDeviation, metrologist, {
    params: { id: asked.id },
    body: { ...grant, ...change },
  });
  expect(status).toBe(422);
  expect(problem.errors?.map((fault) => fault.pointer)).toEqual([pointer]);
});

test('indicative work needs no word of the customer', async () => {
  const asked = await ask(await bench.request({ request: { grade: 'indicative' } }), 'load-open');
  expect(await decide(asked, { customerAcceptance: null })).toMatchObject({
    state: 'granted',
    customerAcceptance: null,
  });
});

test('for a request that is over there is nothing to lift', async () => {
  const gone = await bench.request(notRested);
  const asked = await ask(gone);
  await bench.app.db
    .update(requestsTable)
    .set({ state: 'withdrawn' })
    .where(eq(requestsTable.id, gone.requestId));
  const late = await bench.app.callRefused(decideDeviation, metrologist, {
    params: { id: asked.id },
    body: grant,
  });
  expect([late.status, late.problem.code]).toEqual([409, 'request.state']);
  for (const state of ['done', 'withdrawn'] as const) {
    const made = await bench.request({ request: { state } });
    const { status, problem } = await bench.app.callRefused(askDeviation, bench.engineer, {
      params: { id: made.requestId },
      body: { code: 'rest-time', reason: why },
    });
    expect([status, problem.code]).toEqual([409, 'request.state']);
  }
});

test('strangers, other sites and roles without the right are refused', async () => {
  const made = await bench.request(notRested);
  const asked = await ask(made);
  const stranger = await bench.app.signInAs({ roles: ['engineer'] });
  const elsewhere = await bench.app.signInAs({ roles: ['metrologist@otterholm'] });
  const wish = { params: { id: made.requestId }, body: { code: 'mapping', reason: why } };
  const decision = { params: { id: asked.id }, body: grant };
  const away = { ...decision, params: { ...decision.params, site: 'otterholm' } };
  const refusals = await Promise.all([
    bench.app.callRefused(askDeviation, stranger, wish),
    bench.app.callRefused(askDeviation, bench.scheduler, wish),
    bench.app.callRefused(listDeviations, stranger, { params: wish.params }),
    bench.app.callRefused(decideDeviation, stranger, decision),
    bench.app.callRefused(decideDeviation, bench.scheduler, decision),
    bench.app.callRefused(decideDeviation, elsewhere, away),
    bench.app.callRefused(decideDeviation, metrologist, { ...decision, params: { id: 987_654 } }),
  ]);
  expect(refusals.map(({ status }) => status)).toEqual([404, 403, 404, 403, 403, 404, 404]);
  expect(await listOf(made)).toMatchObject([{ state: 'asked' }]);
});
