import { afterAll, beforeAll, expect, test } from 'vitest';
import {
  cancelBooking,
  confirmBooking,
  getBooking,
  listBookings,
  moveBooking,
} from '#shared/contracts/bookings.contract.ts';
import { checkPlacement, findOffers, proposeOffer } from '#shared/contracts/offers.contract.ts';
import { buildBench } from '#tests/support/build-bench.ts';
import type { Bench } from '#tests/support/build-bench.ts';
import { startTestApp } from '#tests/support/test-app.ts';

let bench: Bench;
beforeAll(async () => {
  bench = await buildBench(await startTestApp());
});
afterAll(() => bench.app.stop());

test('from draft to proposal, booking, move and cancellation, and back to offers', async () => {
  const { app, engineer, scheduler } = bench;
  const made = await bench.request({
    cellCount: 2,
    areCellsHere: false,
    request: { state: 'draft', submittedAt: null },
  });
  const params = { id: made.requestId, lotId: made.lotId };

  const offers = await app.call(findOffers, engineer, { params });
  const [wish] = offers.body.offers.slice(1);
  expect(wish).toBeDefined();
  const proposed = await app.call(proposeOffer, engineer, {
    params,
    body: { version: 1, offeredAt: offers.body.offeredAt, placement: wish?.placement },
  });
  expect(proposed.body.proposal?.startAt).toBe(wish?.startAt);

  const booked = await app.call(confirmBooking, scheduler, {
    body: {
      requestId: made.requestId,
      lotId: made.lotId,
      requestVersion: proposed.body.version,
      placement: wish?.placement,
    },
  });
  expect(booked.body).toMatchObject({ state: 'tentative', startAt: wish?.startAt });

  const later = await app.call(checkPlacement, scheduler, {
    params,
    body: {
      chamberTag: bench.chamber.chamberTag,
      startAt: '2026-03-11T10:00:00Z',
      movesBookingId: booked.body.id,
    },
  });
  const moved = await app.call(moveBooking, scheduler, {
    params: { id: booked.body.id },
    body: {
      version: booked.body.version,
      placement: later.body.offer?.placement,
      reason: 'the courier is late',
    },
  });
  expect(moved.body.startAt).toBe('2026-03-11T10:00:00.000Z');
  const mine = await app.call(listBookings, engineer, { query: { mine: 'true' } });
  expect(mine.body.items.map(({ id }) => id)).toEqual([booked.body.id]);

  await app.call(cancelBooking, engineer, {
    params: { id: booked.body.id },
    body: { version: moved.body.version, reason: 'the cells were damaged on the way' },
  });
  const seen = await app.call(getBooking, engineer, { params: { id: booked.body.id } });
  expect(seen.body.history.map(({ what, actor }) => `${what} by ${actor}`)).toEqual([
    'Cancelled by Enid Engineer',
    `Moved to ${bench.chamber.chamberTag} by Sal Scheduler`,
    `Booked tentatively in ${bench.chamber.chamberTag} by Sal Scheduler`,
  ]);
  const again = await app.call(findOffers, engineer, { params });
  expect(again.body.offers.length).toBeGreaterThan(0);
});
