import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, expect, test } from 'vitest';
import {
  closeLoad,
  confirmBooking,
  getLoad,
  reopenLoad,
} from '#shared/contracts/bookings.contract.ts';
import type { BookingDto } from '#shared/contracts/bookings.contract.ts';
import { buildBench } from '#tests/support/build-bench.ts';
import type { Bench } from '#tests/support/build-bench.ts';
import { startTestApp } from '#tests/support/test-app.ts';

let bench: Bench;
let booking: BookingDto;
beforeAll(async () => {
  bench = await buildBench(await startTestApp());
  booking = await bench.book(await bench.request({ cellCount: 2 }), {
    startAt: '2026-03-05T09:00:00Z',
  });
});
afterAll(() => bench.app.stop());

async function join() {
  const { requestId, lotId, version: requestVersion } = await bench.request();
  const free = bench.chamber.paths.slice(2, 3);
  return {
    body: {
      requestId,
      lotId,
      requestVersion,
      placement: {
        chamberTag: booking.chamberTag,
        startAt: booking.startAt,
        setTemperatureC: 25,
        joinsLoadId: booking.loadId,
        paths: free,
      },
    },
  };
}

test('a load shows its phases, its bookings and how full it is', async () => {
  const { body } = await bench.app.call(getLoad, bench.engineer, {
    params: { id: booking.loadId },
  });
  expect(body).toMatchObject({
    id: booking.loadId,
    chamberTag: booking.chamberTag,
    state: 'open',
    setTemperatureC: 25,
    startAt: booking.startAt,
    endAt: booking.endAt,
    isStrictDoor: true,
    positionsTaken: 2,
    positions: 4,
    cellCount: 2,
    maxCells: 100,
    maxEnergyWh: 2000,
  });
  expect(body.energyWh).toBeCloseTo(2 * 3.5 * 3.6, 6);
  expect(body.phases).toEqual(booking.phases);
  expect(body.bookings.map(({ id }) => id)).toEqual([booking.id]);
});

test('nothing joins a closed load until it is opened again', async () => {
  const params = { id: booking.loadId };
  const before = await bench.app.call(getLoad, bench.scheduler, { params });
  const closing = { params, body: { version: before.body.version }, idempotencyKey: randomUUID() };
  const closed = await bench.app.call(closeLoad, bench.scheduler, closing);
  expect(closed.body.state).toBe('closed');
  const repeat = await bench.app.call(closeLoad, bench.scheduler, closing);
  expect(repeat.body).toEqual(closed.body);

  const refused = await bench.app.callRefused(confirmBooking, bench.scheduler, await join());
  expect(refused.problem).toMatchObject({
    code: 'booking.checks',
    checks: [{ code: 'load-open' }],
  });

  const closesAt = '2026-03-04T17:00:00.000Z';
  const opened = await bench.app.call(reopenLoad, bench.scheduler, {
    params,
    body: { version: closed.body.version, closesAt },
  });
  expect(opened.body).toMatchObject({ state: 'open', closesAt });
  const guest = await bench.app.call(confirmBooking, bench.scheduler, await join());
  expect(guest.body).toMatchObject({ loadId: booking.loadId, endAt: booking.endAt });
});

test('a closing time in the past or after the start is refused, and so is a second closing', async () => {
  const alone = await bench.book(await bench.request(), { startAt: '2026-03-10T09:00:00Z' });
  const params = { id: alone.loadId };
  for (const closesAt of ['2026-03-01T09:00:00Z', '2026-03-10T09:00:01Z']) {
    const { problem } = await bench.app.callRefused(reopenLoad, bench.scheduler, {
      params,
      body: { version: 1, closesAt },
    });
    expect(problem.code).toBe('load.state');
  }
  await bench.app.call(closeLoad, bench.scheduler, { params, body: { version: 1 } });
  const again = await bench.app.callRefused(closeLoad, bench.scheduler, {
    params,
    body: { version: 2 },
  });
  expect(again.problem.code).toBe('load.state');
  const stale = await bench.app.callRefused(closeLoad, bench.scheduler, {
    params,
    body: { version: 1 },
  });
  expect(stale.problem).toMatchObject({ code: 'version.stale', current: { version: 2 } });
});

test('loads are seen by people of the site and changed by schedulers', async () => {
  const params = { id: booking.loadId };
  const elsewhere = await bench.app.signInAs({ roles: ['scheduler@otterholm'] });
  const body = { version: 1 };
  const reopening = { version: 1, closesAt: '2026-03-04T17:00:00Z' };
  const refusals = await Promise.all([
    bench.app.callRefused(getLoad, null, { params }),
    bench.app.callRefused(getLoad, elsewhere, { params: { ...params, site: 'otterholm' } }),
    bench.app.callRefused(getLoad, bench.scheduler, { params: { id: 999_999 } }),
    bench.app.callRefused(closeLoad, null, { params, body }),
    bench.app.callRefused(closeLoad, bench.engineer, { params, body }),
    bench.app.callRefused(closeLoad, bench.scheduler, { params: { id: 999_999 }, body }),
    bench.app.callRefused(closeLoad, bench.scheduler, { params, body: {} }),
    bench.app.callRefused(reopenLoad, null, { params, body: reopening }),
    bench.app.callRefused(reopenLoad, bench.engineer, { params, body: reopening }),
    bench.app.callRefused(reopenLoad, bench.scheduler, {
      params: { id: 999_999 },
      body: reopening,
    }),
    bench.app.callRefused(reopenLoad, bench.scheduler, { params, body: { version: 1 } }),
  ]);
  expect(refusals.map(({ status }) => status)).toEqual([
    401, 404, 404, 401, 403, 404, 422, 401, 403, 404, 422,
  ]);
});
