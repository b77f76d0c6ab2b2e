import { afterAll, beforeAll, expect, test } from 'vitest';
import { getBooking, listBookings } from '#shared/contracts/bookings.contract.ts';
import type { BookingDto } from '#shared/contracts/bookings.contract.ts';
import { buildBench } from '#tests/support/build-bench.ts';
import type { Bench } from '#tests/support/build-bench.ts';
import { startTestApp } from '#tests/support/test-app.ts';

let bench: Bench;
let bookings: BookingDto[];
beforeAll(async () => {
  bench = await buildBench(await startTestApp());
  bookings = [];
  for (const day of ['06', '04', '05']) {
    bookings.push(
      await bench.book(await bench.request(), { startAt: `2026-03-${day}T09:00:00.000Z` }),
    );
  }
});
afterAll(() => bench.app.stop());

async function idsOf(query: Record<string, string | number>, person = bench.scheduler) {
  const { body } = await bench.app.call(listBookings, person, { query });
  return body.items.map(({ id }) => id);
}

test('bookings come by start, or newest first', async () => {
  const [friday, wednesday, thursday] = bookings.map(({ id }) => id);
  expect(await idsOf({})).toEqual([wednesday, thursday, friday]);
  expect(await idsOf({ sort: 'newest' })).toEqual([thursday, wednesday, friday]);
});

test('a list goes on where its cursor ended, and only in the same order', async () => {
  for (const sort of ['start', 'newest']) {
    const all = await idsOf({ sort });
    const first = await bench.app.call(listBookings, bench.scheduler, {
      query: { sort, limit: 2 },
    });
    const cursor = first.body.nextCursor ?? '';
    expect(first.body.items.map(({ id }) => id)).toEqual(all.slice(0, 2));
    expect(await idsOf({ sort, limit: 2, cursor })).toEqual(all.slice(2));
    const wrong = await bench.app.callRefused(listBookings, bench.scheduler, {
      query: { sort: sort === 'start' ? 'newest' : 'start', cursor },
    });
    expect(wrong.status).toBe(422);
  }
});

test('state, risk, owner, time and tag narrow the list', async () => {
  const [friday, wednesday, thursday] = bookings.map(({ id }) => id);
  const [path] = bookings[0]?.paths ?? [];
  expect(await idsOf({ state: 'cancelled,done' })).toEqual([]);
  expect(await idsOf({ state: 'confirmed', atRisk: 'false' })).toHaveLength(3);
  expect(await idsOf({ mine: 'true' })).toEqual([]);
  expect(await idsOf({ mine: 'true' }, bench.engineer)).toHaveLength(3);
  const from = '2026-03-05T00:00:00Z';
  const to = '2026-03-06T00:00:00Z';
  expect(await idsOf({ from, to })).toContain(thursday);
  expect(await idsOf({ from, to })).not.toContain(friday);
  expect(await idsOf({ tag: bench.chamber.chamberTag })).toHaveLength(3);
  expect(await idsOf({ tag: path?.sourceTag ?? '' })).toHaveLength(3);
  expect(await idsOf({ tag: path?.sourceTag.split('/')[0] ?? '' })).toContain(wednesday);
  expect(await idsOf({ tag: 'C98' })).toEqual([]);
});

test('who does not see the project sees that the place is taken, and nothing else', async () => {
  const stranger = await bench.app.signInAs({ roles: ['engineer'] });
  const [booking] = bookings;
  const { body } = await bench.app.call(listBookings, stranger);
  const row = body.items.find(({ id }) => id === booking?.id);
  expect(row).toMatchObject({
    isVisible: false,
    requestId: null,
    projectName: null,
    cellTypeName: null,
    atRiskReason: null,
    startAt: booking?.startAt,
    endAt: booking?.endAt,
    chamberTag: booking?.chamberTag,
  });
  const one = await bench.app.call(getBooking, stranger, { params: { id: booking?.id ?? 0 } });
  expect(one.body).toMatchObject({
    isVisible: false,
    requester: null,
    lotId: null,
    cells: [],
    checks: [],
    estimate: null,
    history: [],
    confirmedBy: null,
  });
  expect(one.body.paths).toEqual(booking?.paths);
});

test('lists and bookings are for people of the site', async () => {
  const elsewhere = await bench.app.signInAs({ roles: ['scheduler@otterholm'] });
  const [booking] = bookings;
  const params = { id: booking?.id ?? 0 };
  const refusals = await Promise.all([
    bench.app.callRefused(listBookings, null),
    bench.app.callRefused(listBookings, elsewhere),
    bench.app.callRefused(listBookings, bench.scheduler, { query: { state: 'lost' } }),
    bench.app.callRefused(getBooking, null, { params }),
    bench.app.callRefused(getBooking, elsewhere, { params: { ...params, site: 'otterholm' } }),
    bench.app.callRefused(getBooking, bench.scheduler, { params: { id: 999_999 } }),
    bench.app.callRefused(getBooking, bench.scheduler, { params: { id: 'first' } }),
  ]);
  expect(refusals.map(({ status }) => status)).toEqual([401, 404, 422, 401, 404, 404, 422]);
});
