import { randomUUID } from 'node:crypto';
import { and, eq } from 'drizzle-orm';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { allocationsTable } from '#server/db/tables/allocation.table.ts';
import { bookingsTable } from '#server/db/tables/booking.table.ts';
import { checkResultsTable } from '#server/db/tables/check-result.table.ts';
import { loadPhasesTable } from '#server/db/tables/load.table.ts';
import {
  requestLotCellsTable,
  requestLotsTable,
  requestsTable,
} from '#server/db/tables/request.table.ts';
import { confirmBooking, getBooking } from '#shared/contracts/bookings.contract.ts';
import { setPolicy } from '#shared/contracts/settings.contract.ts';
import { buildBench } from '#tests/support/build-bench.ts';
import type { Bench } from '#tests/support/build-bench.ts';
import type { BuiltRequest } from '#tests/support/build-request.ts';
import { startTestApp } from '#tests/support/test-app.ts';

let bench: Bench;
beforeAll(async () => {
  bench = await buildBench(await startTestApp(), { size: 2 });
});
afterAll(() => bench.app.stop());

async function bodyFor(made: BuiltRequest) {
  const { placement } = await bench.offer(made);
  const { requestId, lotId, version: requestVersion } = made;
  return { requestId, lotId, requestVersion, placement };
}

async function stateOf(requestId: number) {
  const [row] = await bench.app.db
    .select()
    .from(requestsTable)
    .where(eq(requestsTable.id, requestId));
  return row?.state;
}

test('an offer becomes a booking with its places, phases, checks and frozen estimate', async () => {
  const made = await bench.request({ cellCount: 2 });
  const body = { ...(await bodyFor(made)), offeredAt: '2026-03-02T08:00:00Z' };

  const answer = await bench.app.call(confirmBooking, bench.scheduler, { body });

  expect(answer.status).toBe(201);
  const booking = answer.body;
  expect(booking).toMatchObject({
    isVisible: true,
    state: 'confirmed',
    isAtRisk: false,
    requestId: made.requestId,
    lotId: made.lotId,
    chamberTag: bench.chamber.chamberTag,
    startAt: body.placement.startAt,
    noShowAt: null,
    confirmedBy: { id: bench.scheduler.personId },
    confirmedAt: '2026-03-02T08:00:00.000Z',
    history: [{ what: `Confirmed in ${bench.chamber.chamberTag}`, actor: 'Sal Scheduler' }],
  });
  expect(booking.checks).toHaveLength(25);
  expect(booking.checks.every(({ outcome }) => outcome !== 'stop')).toBe(true);
  expect(booking.estimate?.outcome).toBe('ok');
  expect(booking.cells.map(({ id }) => id)).toEqual(made.cellIds);
  expect(booking.phases.at(-1)?.endAt).toBe(booking.endAt);
  expect(await stateOf(made.requestId)).toBe('booked');
  const { db } = bench.app;
  const taken = await db
    .select()
    .from(allocationsTable)
    .where(eq(allocationsTable.bookingId, booking.id));
  expect(taken).toHaveLength(6);
  expect(taken.every(({ live }) => live)).toBe(true);
  const [row] = await db.select().from(bookingsTable).where(eq(bookingsTable.id, booking.id));
  expect(row?.ownPhases).toHaveProperty('hold');
  expect(row?.estimateInputs).toHaveProperty('slotRequest.setTemperatureC', 25);
  const phases = await db
    .select()
    .from(loadPhasesTable)
    .where(eq(loadPhasesTable.loadId, booking.loadId));
  expect(phases.every(({ live }) => live)).toBe(true);
  const again = await bench.app.call(getBooking, bench.engineer, { params: { id: booking.id } });
  expect(again.body).toEqual(booking);
});

test('a place that is taken is refused with who has it, and nothing is written', async () => {
  const winner = await bench.request({ cellCount: 2 });
  const loser = await bench.request({ cellCount: 2 });
  const body = await bodyFor(loser);
  const booking = await bench.book(winner);

  const { status, problem } = await bench.app.callRefused(confirmBooking, bench.scheduler, {
    body,
  });

  expect([status, problem.code]).toEqual([409, 'booking.clash']);
  expect(problem.detail).toMatch(
    new RegExp(
      `^S\\d\\d/1 is taken by booking ${booking.id} until \\w{3} \\d+ \\w{3} \\d\\d:\\d\\d\\.$`,
    ),
  );
  expect(await stateOf(loser.requestId)).toBe('submitted');
});

test('what could not give a valid result is refused with the checks that say so', async () => {
  const made = await bench.request();
  const body = await bodyFor(made);
  const placement = { ...body.placement, startAt: '2026-03-10T03:00:00Z' };
  const { problem } = await bench.app.callRefused(confirmBooking, bench.scheduler, {
    body: { ...body, placement },
  });
  expect(problem).toMatchObject({
    code: 'booking.checks',
    checks: [{ code: 'working-hours', outcome: 'stop' }],
  });
});

test('a placement of unknown things or too few paths is refused in a sentence', async () => {
  const made = await bench.request({ cellCount: 2 });
  const body = await bodyFor(made);
  const [path] = body.placement.paths;
  const changes = [
    { chamberTag: 'C99' },
    { joinsLoadId: 999_999 },
    { paths: [path, { ...path, sourceUnitId: 999_999 }] },
    { paths: [path] },
  ];
  for (const change of changes) {
    const { problem } = await bench.app.callRefused(confirmBooking, bench.scheduler, {
      body: { ...body, placement: { ...body.placement, ...change } },
    });
    expect(problem.code).toBe('booking.checks');
    expect(problem.detail).toMatch(/\.$/);
  }
});

test('the same path for two cells is double use', async () => {
  const made = await bench.request({ cellCount: 2 });
  const body = await bodyFor(made);
  const [path] = body.placement.paths;
  const { problem } = await bench.app.callRefused(confirmBooking, bench.scheduler, {
    body: { ...body, placement: { ...body.placement, paths: [path, path] } },
  });
  expect(problem).toMatchObject({ code: 'booking.clash' });
  expect(problem.detail).toMatch(/is chosen twice/);
});

test('an old offer, the past and what lies beyond the horizon are refused', async () => {
  const made = await bench.request();
  const body = await bodyFor(made);
  const at = (startAt: string) => ({ ...body, placement: { ...body.placement, startAt } });
  const ask = async (sent: unknown) =>
    (await bench.app.callRefused(confirmBooking, bench.scheduler, { body: sent })).problem.code;
  expect(await ask({ ...body, offeredAt: '2026-03-02T07:49:59Z' })).toBe('offer.expired');
  expect(await ask(at('2026-03-02T07:45:00Z'))).toBe('booking.horizon');
  expect(await ask(at('2026-07-20T08:00:00Z'))).toBe('booking.horizon');
});

test('cells still on their way make the booking tentative until the no-show time', async () => {
  const made = await bench.request({ areCellsHere: false });
  const booking = await bench.book(made);
  expect(booking.state).toBe('tentative');
  expect(Date.parse(booking.noShowAt ?? '') - Date.parse(booking.startAt)).toBe(2 * 3_600_000);
  expect(booking.checks.find(({ code }) => code === 'cells-received')?.outcome).toBe('caution');
});

test('with one of two lots booked a request is partly booked, and the wish for that lot answered', async () => {
  const made = await bench.request();
  await bench.app.db.insert(requestLotsTable).values({
    requestId: made.requestId,
    seq: 2,
    cellTypeId: bench.cellTypeId,
    cellCount: 1,
  });
  await bench.app.db
    .update(requestsTable)
    .set({ proposedOffer: { lotId: made.lotId }, proposedAt: new Date('2026-03-01T09:00:00Z') })
    .where(eq(requestsTable.id, made.requestId));
  await bench.book(made);
  const [row] = await bench.app.db
    .select()
    .from(requestsTable)
    .where(eq(requestsTable.id, made.requestId));
  expect(row).toMatchObject({ state: 'partly-booked', proposedOffer: null, proposedAt: null });
});

test('a lot is booked once, and an edited request is looked at again first', async () => {
  const made = await bench.request();
  const body = await bodyFor(made);
  const stale = await bench.app.callRefused(confirmBooking, bench.scheduler, {
    body: { ...body, requestVersion: 7 },
  });
  expect(stale.problem).toMatchObject({
    code: 'version.stale',
    current: { id: made.requestId, version: 1 },
  });
  await bench.app.call(confirmBooking, bench.scheduler, { body });
  const again = await bench.app.callRefused(confirmBooking, bench.scheduler, {
    body: { ...body, requestVersion: 2 },
  });
  expect(again.problem.code).toBe('request.state');
});

test('a repeat with the same key gets the first answer and books nothing more', async () => {
  const made = await bench.request();
  const call = { body: await bodyFor(made), idempotencyKey: randomUUID() };
  const first = await bench.app.call(confirmBooking, bench.scheduler, call);
  const second = await bench.app.call(confirmBooking, bench.scheduler, call);
  expect(second.body).toEqual(first.body);
  const rows = await bench.app.db
    .select()
    .from(bookingsTable)
    .where(eq(bookingsTable.lotId, made.lotId));
  expect(rows).toHaveLength(1);
  const checks = await bench.app.db
    .select()
    .from(checkResultsTable)
    .where(
      and(eq(checkResultsTable.bookingId, first.body.id), eq(checkResultsTable.stage, 'confirm')),
    );
  expect(checks).toHaveLength(25);
});

test('a cell is in one booking at a time, even through two requests', async () => {
  const wide = await buildBench(bench.app);
  const one = await wide.request({ cellCount: 2 });
  const other = await wide.request();
  await wide.app.db
    .update(requestLotCellsTable)
    .set({ cellId: one.cellIds[0] ?? 0 })
    .where(eq(requestLotCellsTable.lotId, other.lotId));
  const booking = await wide.book(one, { startAt: '2026-03-05T09:00:00Z' });
  const { placement } = await wide.offer(other);
  const { problem } = await wide.app.callRefused(confirmBooking, wide.scheduler, {
    body: {
      requestId: other.requestId,
      lotId: other.lotId,
      requestVersion: 1,
      placement: {
        ...placement,
        startAt: booking.startAt,
        joinsLoadId: booking.loadId,
        paths: wide.chamber.paths.slice(2, 3),
      },
    },
  });
  expect(problem.detail).toMatch(new RegExp(`is in booking ${booking.id} until`));
  expect(problem.code).toBe('booking.clash');
});

test('engineers book their own requests only, and only where the site lets them', async () => {
  const manager = await bench.app.signInAs({ roles: ['manager'] });
  const colleague = await bench.app.signInAs({ roles: ['engineer'] });
  const mine = await bench.request();
  const body = await bodyFor(mine);
  const before = await bench.app.callRefused(confirmBooking, bench.engineer, { body });
  expect(before.problem.code).toBe('offer.policy');
  await bench.app.call(setPolicy, manager, {
    params: { key: 'engineersMayConfirm' },
    body: { value: true, version: 0 },
  });
  const theirs = await bench.request({ requesterId: colleague.personId });
  const refused = await bench.app.callRefused(confirmBooking, bench.engineer, {
    body: await bodyFor(theirs),
  });
  expect(refused.status).toBe(403);
  const booked = await bench.app.call(confirmBooking, bench.engineer, { body });
  expect(booked.body.state).toBe('confirmed');
});

test('without sign-in, role, key or sense nothing is booked', async () => {
  const made = await bench.request();
  const body = await bodyFor(made);
  const auditor = await bench.app.signInAs({ roles: ['auditor'] });
  const elsewhere = await bench.app.signInAs({ roles: ['scheduler@otterholm'] });
  const refusals = await Promise.all([
    bench.app.callRefused(confirmBooking, null, { body }),
    bench.app.callRefused(confirmBooking, auditor, { body }),
    bench.app.callRefused(confirmBooking, elsewhere, { body, params: { site: 'otterholm' } }),
    bench.app.callRefused(confirmBooking, bench.scheduler, { body, idempotencyKey: null }),
    bench.app.callRefused(confirmBooking, bench.scheduler, {
      body: { ...body, placement: { ...body.placement, paths: [] } },
    }),
  ]);
  expect(refusals.map(({ status }) => status)).toEqual([401, 403, 404, 400, 422]);
});
