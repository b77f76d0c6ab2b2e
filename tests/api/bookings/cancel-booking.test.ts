import { randomUUID } from 'node:crypto';
import { eq } from 'drizzle-orm';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { allocationsTable } from '#server/db/tables/allocation.table.ts';
import { requestsTable } from '#server/db/tables/request.table.ts';
import { cancelBooking, getLoad } from '#shared/contracts/bookings.contract.ts';
import { buildBench } from '#tests/support/build-bench.ts';
import type { Bench } from '#tests/support/build-bench.ts';
import { startTestApp } from '#tests/support/test-app.ts';

let bench: Bench;
beforeAll(async () => {
  bench = await buildBench(await startTestApp());
});
afterAll(() => bench.app.stop());

const reason = 'the cells were needed elsewhere';

test('places, load and request are given back, and the lot can be booked again', async () => {
  const made = await bench.request();
  const booking = await bench.book(made);

  const { body } = await bench.app.call(cancelBooking, bench.scheduler, {
    params: { id: booking.id },
    body: { version: booking.version, reason },
  });

  expect(body).toMatchObject({
    state: 'cancelled',
    cancelReason: reason,
    version: booking.version + 1,
    history: [
      { what: 'Cancelled', reason },
      { what: `Confirmed in ${booking.chamberTag}`, reason: null },
    ],
  });
  const taken = await bench.app.db
    .select()
    .from(allocationsTable)
    .where(eq(allocationsTable.bookingId, booking.id));
  expect(taken.map(({ live }) => live)).toEqual([false, false, false]);
  const load = await bench.app.call(getLoad, bench.scheduler, { params: { id: booking.loadId } });
  expect(load.body.state).toBe('cancelled');
  const [request] = await bench.app.db
    .select()
    .from(requestsTable)
    .where(eq(requestsTable.id, made.requestId));
  expect(request?.state).toBe('submitted');
  const again = await bench.book({ ...made, version: request?.version ?? 0 });
  expect(again.startAt).toBe(booking.startAt);
});

test('an engineer cancels their own booking and nobody else’s', async () => {
  const colleague = await bench.app.signInAs({ roles: ['engineer'] });
  const booking = await bench.book(await bench.request());
  const call = { params: { id: booking.id }, body: { version: booking.version, reason } };
  const refused = await bench.app.callRefused(cancelBooking, colleague, call);
  expect(refused.status).toBe(403);
  const { body } = await bench.app.call(cancelBooking, bench.engineer, call);
  expect(body.state).toBe('cancelled');
});

test('a cancelled booking is not cancelled again, a stale one is shown as it is', async () => {
  const booking = await bench.book(await bench.request());
  const params = { id: booking.id };
  const stale = await bench.app.callRefused(cancelBooking, bench.scheduler, {
    params,
    body: { version: 5, reason },
  });
  expect(stale.problem).toMatchObject({ code: 'version.stale', current: { id: booking.id } });
  const call = { params, body: { version: booking.version, reason }, idempotencyKey: randomUUID() };
  const first = await bench.app.call(cancelBooking, bench.scheduler, call);
  const repeat = await bench.app.call(cancelBooking, bench.scheduler, call);
  expect(repeat.body).toEqual(first.body);
  const again = await bench.app.callRefused(cancelBooking, bench.scheduler, {
    params,
    body: { version: first.body.version, reason },
  });
  expect(again.problem.code).toBe('booking.state');
});

test('without sign-in, role, booking or reason nothing is cancelled', async () => {
  const booking = await bench.book(await bench.request());
  const call = { params: { id: booking.id }, body: { version: booking.version, reason } };
  const auditor = await bench.app.signInAs({ roles: ['auditor'] });
  const refusals = await Promise.all([
    bench.app.callRefused(cancelBooking, null, call),
    bench.app.callRefused(cancelBooking, auditor, call),
    bench.app.callRefused(cancelBooking, bench.scheduler, { ...call, params: { id: 999_999 } }),
    bench.app.callRefused(cancelBooking, bench.scheduler, {
      ...call,
      body: { version: booking.version },
    }),
  ]);
  expect(refusals.map(({ status }) => status)).toEqual([401, 403, 404, 422]);
});
