import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { listAuditEvents } from '#shared/contracts/audit.contract.ts';
import { cancelBooking } from '#shared/contracts/bookings.contract.ts';
import { proposeOffer } from '#shared/contracts/offers.contract.ts';
import {
  declineRequest,
  getRequest,
  submitRequest,
  updateRequest,
  withdrawRequest,
} from '#shared/contracts/requests.contract.ts';
import { buildBench } from '#tests/support/build-bench.ts';
import type { Bench } from '#tests/support/build-bench.ts';
import type { BuiltRequest } from '#tests/support/build-request.ts';
import { editOf, emptyLot } from '#tests/support/request-wish.ts';
import { startTestApp } from '#tests/support/test-app.ts';
import type { TestPerson } from '#tests/support/test-people.ts';

let bench: Bench;
beforeAll(async () => {
  bench = await buildBench(await startTestApp());
});
afterAll(() => bench.app.stop());

const read = async ({ requestId }: BuiltRequest) =>
  (await bench.app.call(getRequest, bench.engineer, { params: { id: requestId } })).body;
const reason = 'The customer sends other cells.';
const withdrawal = ({ requestId, version }: BuiltRequest) => ({
  params: { id: requestId },
  body: { version, reason },
});

async function propose(made: BuiltRequest): Promise<void> {
  const { placement } = await bench.offer(made);
  await bench.app.call(proposeOffer, bench.engineer, {
    params: { id: made.requestId, lotId: made.lotId },
    body: { version: made.version, offeredAt: '2026-03-02T08:00:00.000Z', placement },
  });
}

test('a request is taken back with its reason and stays readable', async () => {
  const auditor = await bench.app.signInAs({ roles: ['auditor'] });
  const made = await bench.request();
  await propose(made);
  const keyed = {
    ...withdrawal({ ...made, version: 2 }),
    idempotencyKey: randomUUID(),
  };
  const { body } = await bench.app.call(withdrawRequest, bench.engineer, keyed);
  expect(body).toMatchObject({
    state: 'withdrawn',
    withdrawReason: reason,
    proposal: null,
    version: 3,
  });
  const again = await bench.app.call(withdrawRequest, bench.engineer, keyed);
  expect(again.body).toEqual(body);
  expect(await read(made)).toEqual(body);
  const trail = await bench.app.call(listAuditEvents, auditor, {
    query: { subjectKind: 'request', subjectId: made.requestId },
  });
  expect(trail.body.items[0]).toMatchObject({
    action: 'request.withdraw',
    actor: { id: bench.engineer.personId },
    before: { state: 'submitted' },
    after: { state: 'withdrawn', reason },
  });
  expect(trail.body.items.filter(({ action }) => action === 'request.withdraw')).toHaveLength(1);
});

test('what holds places is cancelled first, then withdrawn', async () => {
  const made = await bench.request();
  const booking = await bench.book(made);
  const { version } = await read(made);
  const { status, problem } = await bench.app.callRefused(
    withdrawRequest,
    bench.engineer,
    withdrawal({ ...made, version }),
  );
  expect([status, problem.code]).toEqual([409, 'request.state']);
  expect(problem.detail).toBe(
    `Booking ${booking.id} holds places for this request. Cancel it first, then withdraw the request.`,
  );
  await bench.app.call(cancelBooking, bench.engineer, {
    params: { id: booking.id },
    body: { version: booking.version, reason },
  });
  const free = await read(made);
  const { body } = await bench.app.call(
    withdrawRequest,
    bench.engineer,
    withdrawal({ ...made, version: free.version }),
  );
  expect(body.state).toBe('withdrawn');
});

test('a decline sends the request back with the reason and without the proposal; it can be sent again', async () => {
  const made = await bench.request();
  await propose(made);
  const why = 'Say which of the two deliveries these are.';
  const { body } = await bench.app.call(declineRequest, bench.scheduler, {
    params: { id: made.requestId },
    body: { version: 2, reason: why },
  });
  expect(body).toMatchObject({
    state: 'draft',
    declineReason: why,
    proposal: null,
    version: 3,
  });
  const sent = await bench.app.call(submitRequest, bench.engineer, {
    params: { id: made.requestId },
    body: { version: 3 },
  });
  expect(sent.body).toMatchObject({ state: 'submitted', declineReason: null });
  expect(sent.body.lots[0]?.cellIds).toEqual(made.cellIds);
});

test('once booked only note and needed-by change; for the rest the sentence names the booking', async () => {
  const made = await bench.request();
  const booking = await bench.book(made);
  const booked = await read(made);
  const params = { id: made.requestId };
  const { status, problem } = await bench.app.callRefused(updateRequest, bench.engineer, {
    params,
    body: editOf(booked, { setTemperatureC: 45 }),
  });
  expect([status, problem.code]).toEqual([409, 'request.state']);
  expect(problem.detail).toBe(
    `Request ${made.requestId} is booked: only its note and needed-by can change. For the rest move or cancel booking ${booking.id}.`,
  );
  const { body } = await bench.app.call(updateRequest, bench.engineer, {
    params,
    body: editOf(booked, { note: 'Handle by the edges.', neededByAt: '2026-06-01T12:00:00.000Z' }),
  });
  expect(body).toMatchObject({
    state: 'booked',
    note: 'Handle by the edges.',
    neededByAt: '2026-06-01T12:00:00.000Z',
    version: booked.version + 1,
  });
  const turned = await bench.app.callRefused(updateRequest, bench.engineer, {
    params,
    body: editOf(body, { neededByAt: 'tomorrow' }),
  });
  expect(turned.problem.errors?.[0]?.pointer).toBe('#/neededByAt');
});

test('a lot that was booked once stays in the request', async () => {
  const made = await bench.request();
  const draft = await read(made);
  const two = await bench.app.call(updateRequest, bench.engineer, {
    params: { id: made.requestId },
    body: editOf(draft, {
      lots: [
        ...editOf(draft).lots,
        { ...emptyLot, cellTypeId: bench.cellTypeId, cellCount: 1, stateOfChargePct: 50 },
      ],
    }),
  });
  const second = two.body.lots[1];
  const { cellIds } = await bench.request();
  const named = await bench.app.call(updateRequest, bench.engineer, {
    params: { id: made.requestId },
    body: editOf(two.body, {
      lots: [
        ...editOf(two.body).lots.slice(0, 1),
        {
          ...emptyLot,
          cellTypeId: bench.cellTypeId,
          cellIds: [...cellIds],
          stateOfChargePct: 50,
          restedSinceAt: '2026-01-01T00:00:00.000Z',
        },
      ],
    }),
  });
  const booking = await bench.book({
    ...made,
    lotId: second?.id ?? 0,
    version: named.body.version,
  });
  expect((await read(made)).state).toBe('partly-booked');
  await bench.app.call(cancelBooking, bench.engineer, {
    params: { id: booking.id },
    body: { version: booking.version, reason },
  });
  const free = await read(made);
  const { status, problem } = await bench.app.callRefused(updateRequest, bench.engineer, {
    params: { id: made.requestId },
    body: editOf(free, { lots: editOf(free).lots.slice(0, 1) }),
  });
  expect([status, problem.code]).toEqual([409, 'request.state']);
  expect(problem.detail).toContain('cannot be taken out');
});

test('a change of a submitted request drops the slot that was proposed for its earlier form', async () => {
  const made = await bench.request();
  await propose(made);
  const proposed = await read(made);
  expect(proposed.proposal).not.toBeNull();
  const { body } = await bench.app.call(updateRequest, bench.engineer, {
    params: { id: made.requestId },
    body: editOf(proposed, { setTemperatureC: 45 }),
  });
  expect(body.proposal).toBeNull();
});

test('what a request is past cannot be done to it', async () => {
  const draft = await bench.request({ request: { state: 'draft', submittedAt: null } });
  const withdrawn = await bench.request({ request: { state: 'withdrawn' } });
  const done = await bench.request({ request: { state: 'done' } });
  const attempt = async (
    contract: Parameters<typeof bench.app.callRefused>[0],
    person: TestPerson,
    made: BuiltRequest,
    body: unknown = { version: 1, reason },
  ) => {
    const { status, problem } = await bench.app.callRefused(contract, person, {
      params: { id: made.requestId },
      body,
    });
    expect([status, problem.code]).toEqual([409, 'request.state']);
    return problem.detail.replace(String(made.requestId), 'n');
  };
  const gone = 'Request n is withdrawn. Keep a new request instead.';
  const past = 'Request n is done. Keep a new request for what is still needed.';
  expect(await attempt(withdrawRequest, bench.engineer, withdrawn)).toBe(gone);
  expect(await attempt(withdrawRequest, bench.engineer, done)).toBe(past);
  expect(await attempt(submitRequest, bench.engineer, withdrawn, { version: 1 })).toBe(gone);
  expect(await attempt(updateRequest, bench.engineer, done, editOf(await read(done)))).toBe(past);
  expect(await attempt(declineRequest, bench.scheduler, draft)).toBe(
    'Request n is still a draft. Let the person who asked submit it first.',
  );
});

test('withdrawing is for who asked, declining for schedulers; both give a reason and the version', async () => {
  const made = await bench.request();
  const stranger = await bench.app.signInAs({ roles: ['engineer'] });
  const elsewhere = await bench.app.signInAs({ roles: ['scheduler@otterholm'] });
  const call = withdrawal(made);
  const refusals = await Promise.all([
    bench.app.callRefused(withdrawRequest, bench.scheduler, call),
    bench.app.callRefused(withdrawRequest, stranger, call),
    bench.app.callRefused(declineRequest, bench.engineer, call),
    bench.app.callRefused(declineRequest, elsewhere, {
      ...call,
      params: { ...call.params, site: 'otterholm' },
    }),
    bench.app.callRefused(withdrawRequest, bench.engineer, {
      ...call,
      body: { ...call.body, version: 9 },
    }),
    bench.app.callRefused(declineRequest, bench.scheduler, {
      ...call,
      body: { ...call.body, version: 9 },
    }),
    bench.app.callRefused(withdrawRequest, bench.engineer, {
      ...call,
      body: { version: 1, reason: ' ' },
    }),
    bench.app.callRefused(declineRequest, bench.scheduler, { ...call, body: { version: 1 } }),
  ]);
  expect(refusals.map(({ status }) => status)).toEqual([403, 404, 403, 404, 409, 409, 422, 422]);
  expect(refusals.slice(4, 6).map(({ problem }) => problem.code)).toEqual([
    'version.stale',
    'version.stale',
  ]);
  expect(refusals.slice(6).map(({ problem }) => problem.errors?.[0]?.pointer)).toEqual([
    '#/reason',
    '#/reason',
  ]);
  expect((await read(made)).version).toBe(1);
});
