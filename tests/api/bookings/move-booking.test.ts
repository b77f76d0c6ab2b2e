import { randomUUID } from 'node:crypto';
import { eq } from 'drizzle-orm';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { allocationsTable } from '#server/db/tables/allocation.table.ts';
import { getLoad, moveBooking } from '#shared/contracts/bookings.contract.ts';
import type { BookingDto } from '#shared/contracts/bookings.contract.ts';
import type { Placement } from '#shared/contracts/check.schemas.ts';
import { buildBench } from '#tests/support/build-bench.ts';
import type { Bench } from '#tests/support/build-bench.ts';
import { startTestApp } from '#tests/support/test-app.ts';

let bench: Bench;
beforeAll(async () => {
  bench = await buildBench(await startTestApp());
});
afterAll(() => bench.app.stop());

function placementOf(booking: BookingDto, change: Partial<Placement> = {}): Placement {
  return {
    chamberTag: booking.chamberTag,
    startAt: booking.startAt,
    setTemperatureC: booking.setTemperatureC,
    joinsLoadId: null,
    paths: booking.paths.map((path) => ({
      panelId: path.panelId,
      sourceUnitId: path.sourceUnitId,
      meterUnitId: path.meterUnitId,
      meterRangeId: path.meterRangeId,
      positionUnitId: path.positionUnitId,
    })),
    ...change,
  };
}

function move(booking: BookingDto, change: Partial<Placement>) {
  return {
    params: { id: booking.id },
    body: {
      version: booking.version,
      placement: placementOf(booking, change),
      reason: 'the customer asked',
    },
  };
}

test('alone in its load a booking takes the load with it, to another time', async () => {
  const booking = await bench.book(await bench.request(), { startAt: '2026-03-03T09:00:00Z' });
  const { body } = await bench.app.call(
    moveBooking,
    bench.scheduler,
    move(booking, { startAt: '2026-03-05T09:15:00Z' }),
  );
  expect(body).toMatchObject({
    loadId: booking.loadId,
    startAt: '2026-03-05T09:15:00.000Z',
    version: booking.version + 1,
    history: [
      { what: `Moved to ${booking.chamberTag}`, reason: 'the customer asked' },
      { what: `Confirmed in ${booking.chamberTag}` },
    ],
  });
  expect(body.phases[0]?.startAt).toBe(body.startAt);
  const taken = await bench.app.db
    .select()
    .from(allocationsTable)
    .where(eq(allocationsTable.bookingId, booking.id));
  expect(new Set(taken.map(({ during }) => during.startMs))).toEqual(
    new Set([Date.parse('2026-03-05T09:15:00Z')]),
  );
});

test('by a quarter of an hour a booking overlaps only its own old place', async () => {
  const booking = await bench.book(await bench.request(), { startAt: '2026-03-04T09:00:00Z' });
  const startMs = Date.parse(booking.startAt) + 900_000;
  const { body } = await bench.app.call(
    moveBooking,
    bench.scheduler,
    move(booking, { startAt: new Date(startMs).toISOString() }),
  );
  expect(Date.parse(body.startAt)).toBe(startMs);
});

test('to another chamber everything is placed anew', async () => {
  const other = await buildBench(bench.app);
  const booking = await bench.book(await bench.request(), { startAt: '2026-03-09T09:00:00Z' });
  const { body } = await bench.app.call(
    moveBooking,
    bench.scheduler,
    move(booking, {
      chamberTag: other.chamber.chamberTag,
      startAt: '2026-03-06T09:00:00Z',
      paths: other.chamber.paths.slice(0, 1),
    }),
  );
  expect(body.chamberTag).toBe(other.chamber.chamberTag);
  expect(body.paths[0]?.positionTag).toBe(`${other.chamber.chamberTag}/1`);
  expect(body.loadId).toBe(booking.loadId);
});

test('into the load of another, out of its own, which ends; and out again into a new one', async () => {
  const host = await bench.book(await bench.request({ cellCount: 2 }), {
    startAt: '2026-03-16T09:00:00Z',
  });
  const guest = await bench.book(await bench.request(), { startAt: '2026-03-19T09:00:00Z' });
  const free = bench.chamber.paths.filter(({ positionUnitId }) =>
    host.paths.every((path) => path.positionUnitId !== positionUnitId),
  );
  const { body: joined } = await bench.app.call(
    moveBooking,
    bench.scheduler,
    move(guest, { joinsLoadId: host.loadId, startAt: host.startAt, paths: free.slice(0, 1) }),
  );
  expect(joined).toMatchObject({ loadId: host.loadId, startAt: host.startAt, endAt: host.endAt });
  const left = await bench.app.call(getLoad, bench.scheduler, { params: { id: guest.loadId } });
  expect(left.body.state).toBe('cancelled');
  const shared = await bench.app.call(getLoad, bench.scheduler, { params: { id: host.loadId } });
  expect(shared.body.bookings.map(({ id }) => id)).toEqual([host.id, guest.id]);
  expect(shared.body.cellCount).toBe(3);

  const { body: alone } = await bench.app.call(
    moveBooking,
    bench.scheduler,
    move(joined, { startAt: '2026-03-20T09:00:00Z' }),
  );
  expect([host.loadId, guest.loadId]).not.toContain(alone.loadId);
  const rest = await bench.app.call(getLoad, bench.scheduler, { params: { id: host.loadId } });
  expect(rest.body).toMatchObject({ state: 'open', cellCount: 2 });
});

test('a started, cancelled or stale booking stays where it is', async () => {
  const booking = await bench.book(await bench.request(), { startAt: '2026-03-24T09:00:00Z' });
  const change = { startAt: '2026-03-25T09:15:00Z' };
  const stale = await bench.app.callRefused(moveBooking, bench.scheduler, {
    ...move(booking, change),
    body: { ...move(booking, change).body, version: 9 },
  });
  expect(stale.problem).toMatchObject({ code: 'version.stale', current: { id: booking.id } });
  bench.app.clock.set('2026-03-24T09:00:00Z');
  const started = await bench.app.callRefused(moveBooking, bench.scheduler, move(booking, change));
  bench.app.clock.set('2026-03-02T08:00:00Z');
  expect(started.problem.code).toBe('booking.state');
});

test('a place that is taken, a closed night and the past are refused; nothing moves', async () => {
  const blocker = await bench.book(await bench.request(), { startAt: '2026-03-26T09:00:00Z' });
  const booking = await bench.book(await bench.request(), { startAt: '2026-03-30T09:00:00Z' });
  const refuse = async (change: Partial<Placement>) =>
    (await bench.app.callRefused(moveBooking, bench.scheduler, move(booking, change))).problem;
  const clash = await refuse({ startAt: blocker.startAt, paths: placementOf(blocker).paths });
  expect(clash.code).toBe('booking.clash');
  expect(clash.detail).toContain(`is taken by booking ${blocker.id} until`);
  expect((await refuse({ startAt: '2026-03-31T02:00:00Z' })).code).toBe('booking.checks');
  expect((await refuse({ startAt: '2026-03-01T09:00:00Z' })).code).toBe('booking.horizon');
});

test('a repeated move with the same key is made once', async () => {
  const booking = await bench.book(await bench.request(), { startAt: '2026-04-07T09:00:00Z' });
  const call = {
    ...move(booking, { startAt: '2026-04-08T09:00:00Z' }),
    idempotencyKey: randomUUID(),
  };
  const first = await bench.app.call(moveBooking, bench.scheduler, call);
  const second = await bench.app.call(moveBooking, bench.scheduler, call);
  expect(second.body).toEqual(first.body);
});

test('only schedulers move, and only what is there', async () => {
  const booking = await bench.book(await bench.request(), { startAt: '2026-04-09T09:00:00Z' });
  const call = move(booking, { startAt: '2026-04-10T09:00:00Z' });
  const refusals = await Promise.all([
    bench.app.callRefused(moveBooking, null, call),
    bench.app.callRefused(moveBooking, bench.engineer, call),
    bench.app.callRefused(moveBooking, bench.scheduler, { ...call, params: { id: 999_999 } }),
    bench.app.callRefused(moveBooking, bench.scheduler, {
      ...call,
      body: { ...call.body, reason: '' },
    }),
  ]);
  expect(refusals.map(({ status }) => status)).toEqual([401, 403, 404, 422]);
});
