import { randomUUID } from 'node:crypto';
import { eq } from 'drizzle-orm';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { allocationsTable } from '#server/db/tables/allocation.table.ts';
import { requestLotCellsTable, requestsTable } from '#server/db/tables/request.table.ts';
import { confirmBooking } from '#shared/contracts/bookings.contract.ts';
import { proposeOffer } from '#shared/contracts/offers.contract.ts';
import { buildBench } from '#tests/support/build-bench.ts';
import type { Bench } from '#tests/support/build-bench.ts';
import type { BuiltRequest } from '#tests/support/build-request.ts';
import { startTestApp } from '#tests/support/test-app.ts';

let bench: Bench;
beforeAll(async () => {
  bench = await buildBench(await startTestApp(), { size: 1 });
});
afterAll(() => bench.app.stop());

const offeredAt = '2026-03-02T08:00:00.000Z';

async function proposalOf(made: BuiltRequest) {
  const { placement } = await bench.offer(made);
  return {
    params: { id: made.requestId, lotId: made.lotId },
    body: { version: made.version, offeredAt, placement },
  };
}

test('a proposal is noted on the request and reserves nothing; booking answers it', async () => {
  const made = await bench.request();
  const call = await proposalOf(made);
  const { body } = await bench.app.call(proposeOffer, bench.engineer, call);
  expect(body).toMatchObject({
    state: 'submitted',
    version: 2,
    proposal: {
      lotId: made.lotId,
      startAt: call.body.placement.startAt,
      chamberTag: bench.chamber.chamberTag,
      proposedAt: offeredAt,
    },
  });
  expect(await bench.app.db.select().from(allocationsTable)).toEqual([]);
  const booked = await bench.app.call(confirmBooking, bench.scheduler, {
    body: {
      requestId: made.requestId,
      lotId: made.lotId,
      requestVersion: 2,
      placement: call.body.placement,
    },
  });
  const refused = await bench.app.callRefused(proposeOffer, bench.engineer, {
    ...call,
    body: { ...call.body, version: 3 },
  });
  expect(refused.problem.code).toBe('request.state');

  const late = await bench.request();
  const clash = await bench.app.callRefused(proposeOffer, bench.engineer, {
    params: { id: late.requestId, lotId: late.lotId },
    body: call.body,
  });
  expect(clash.problem.code).toBe('booking.clash');
  expect(clash.problem.detail).toContain(`is taken by booking ${booked.body.id}`);
});

test('a draft is submitted with its proposal, and its cells are announced', async () => {
  const made = await bench.request({ request: { state: 'draft', submittedAt: null } });
  await bench.app.db.delete(requestLotCellsTable).where(eq(requestLotCellsTable.lotId, made.lotId));
  const { body } = await bench.app.call(proposeOffer, bench.engineer, await proposalOf(made));
  expect(body).toMatchObject({ state: 'submitted', submittedAt: offeredAt });
  expect(body.lots[0]?.cells).toMatchObject([{ serial: null }]);
  expect(body.lots[0]?.cellIds).toEqual([]);
});

test('a draft without project is told so, and stays a draft', async () => {
  const made = await bench.request({ request: { state: 'draft', submittedAt: null } });
  const call = await proposalOf(made);
  await bench.app.db
    .update(requestsTable)
    .set({ projectId: null })
    .where(eq(requestsTable.id, made.requestId));
  const { problem } = await bench.app.callRefused(proposeOffer, bench.engineer, call);
  expect(problem).toMatchObject({ code: 'request.incomplete', missing: ['the project'] });
});

test('an expired offer, a stop and an old version are refused; a repeat is not a second proposal', async () => {
  const made = await bench.request();
  const call = await proposalOf(made);
  const refuse = async (change: Partial<typeof call.body>) => {
    const body = { ...call.body, ...change };
    const { problem } = await bench.app.callRefused(proposeOffer, bench.engineer, {
      ...call,
      body,
    });
    return problem.code;
  };
  expect(await refuse({ offeredAt: '2026-03-02T07:49:00Z' })).toBe('offer.expired');
  expect(await refuse({ version: 4 })).toBe('version.stale');
  const atNight = { ...call.body.placement, startAt: '2026-03-10T02:00:00Z' };
  expect(await refuse({ placement: atNight })).toBe('booking.checks');
  const keyed = { ...call, idempotencyKey: randomUUID() };
  const first = await bench.app.call(proposeOffer, bench.engineer, keyed);
  const second = await bench.app.call(proposeOffer, bench.engineer, keyed);
  expect(second.body).toEqual(first.body);
});

test('only the person who asked proposes', async () => {
  const made = await bench.request();
  const call = await proposalOf(made);
  const auditor = await bench.app.signInAs({ roles: ['auditor'] });
  const stranger = await bench.app.signInAs({ roles: ['engineer'] });
  const refusals = await Promise.all([
    bench.app.callRefused(proposeOffer, null, call),
    bench.app.callRefused(proposeOffer, auditor, call),
    bench.app.callRefused(proposeOffer, bench.scheduler, call),
    bench.app.callRefused(proposeOffer, stranger, call),
    bench.app.callRefused(proposeOffer, bench.engineer, { ...call, body: {} }),
  ]);
  expect(refusals.map(({ status }) => status)).toEqual([401, 403, 403, 404, 422]);
});
