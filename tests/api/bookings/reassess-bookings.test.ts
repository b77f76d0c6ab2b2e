import { eq } from 'drizzle-orm';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { lockInstruments } from '#server/db/lock-places.ts';
import { instrumentsTable } from '#server/db/tables/instrument.table.ts';
import { unavailabilitiesTable } from '#server/db/tables/outage.table.ts';
import { cellsTable } from '#server/db/tables/cell.table.ts';
import { reassessBookings } from '#server/features/bookings/reassess-bookings.service.ts';
import { getBooking, listBookings } from '#shared/contracts/bookings.contract.ts';
import type { BookingDto } from '#shared/contracts/bookings.contract.ts';
import { buildBench } from '#tests/support/build-bench.ts';
import type { Bench } from '#tests/support/build-bench.ts';
import { calibrate } from '#tests/support/build-bookable.ts';
import { startTestApp } from '#tests/support/test-app.ts';

let bench: Bench;
beforeAll(async () => {
  bench = await buildBench(await startTestApp());
});
afterAll(() => bench.app.stop());

const site = { code: 'larkfen', name: 'Larkfen', zone: 'Europe/Dublin' };

/** As equipment and calibrations do it: change, with the places locked, then look at the bookings. */
async function reassess(instrumentId: number) {
  return bench.app.database.transact(async (tx) => {
    const places = await lockInstruments(tx, [instrumentId]);
    const scope = { ...site, id: bench.keepers.siteId };
    return reassessBookings(bench.app.deps, tx, scope, places, null);
  });
}

async function look(booking: BookingDto): Promise<BookingDto> {
  const { body } = await bench.app.call(getBooking, bench.scheduler, {
    params: { id: booking.id },
  });
  return body;
}

test('a breakdown puts future bookings at risk with the reason; its end clears them', async () => {
  const booking = await bench.book(await bench.request(), { startAt: '2026-03-05T09:00:00Z' });
  const later = await bench.book(await bench.request(), { startAt: '2026-03-12T09:00:00Z' });
  const { sourceInstrumentId } = bench.chamber;
  const { db } = bench.app;
  const at = new Date('2026-03-02T08:00:00Z');
  await db.insert(unavailabilitiesTable).values({
    instrumentId: sourceInstrumentId,
    reason: 'breakdown',
    note: 'fan fails',
    startsAt: at,
    endsAt: new Date('2026-03-06T12:00:00Z'),
    reportedById: bench.scheduler.personId,
    createdAt: at,
    updatedAt: at,
  });

  expect(await reassess(sourceInstrumentId)).toMatchObject([
    { bookingId: booking.id, requesterId: bench.engineer.personId, isAtRisk: true },
  ]);
  const atRisk = await look(booking);
  expect(atRisk).toMatchObject({ isAtRisk: true, version: booking.version + 1 });
  expect(atRisk.atRiskReason).toMatch(
    /^S\d\d\/1 is unavailable: fan fails; until Fri 6 Mar 12:00\.$/,
  );
  expect(atRisk.history[0]).toMatchObject({ what: 'Put at risk', actor: 'Millpond' });
  expect(atRisk.checks).toEqual(booking.checks);
  expect(await look(later)).toMatchObject({ isAtRisk: false, version: later.version });
  const listed = await bench.app.call(listBookings, bench.scheduler, { query: { atRisk: 'true' } });
  expect(listed.body.items.map(({ id }) => id)).toEqual([booking.id]);
  expect(await reassess(sourceInstrumentId)).toEqual([]);

  await db
    .update(unavailabilitiesTable)
    .set({ endsAt: at })
    .where(eq(unavailabilitiesTable.instrumentId, sourceInstrumentId));
  expect(await reassess(sourceInstrumentId)).toMatchObject([
    { bookingId: booking.id, isAtRisk: false, reason: null },
  ]);
  expect(await look(booking)).toMatchObject({ isAtRisk: false, atRiskReason: null });
});

test('a failed calibration and a withdrawn release count, and so do damaged cells', async () => {
  const other = await buildBench(bench.app);
  const made = await other.request();
  const booking = await other.book(made, { startAt: '2026-03-05T09:00:00Z' });
  const { chamber } = other;
  await calibrate(bench.app.db, other.keepers, chamber.meterInstrumentId, 'measure', {
    performedOn: '2026-03-01',
    dueOn: '2027-02-28',
    conformityAsLeft: 'does-not-conform',
  });
  await reassess(chamber.meterInstrumentId);
  expect((await look(booking)).atRiskReason).toMatch(/calibrat/);

  await bench.app.db
    .update(instrumentsTable)
    .set({ state: 'out-of-service' })
    .where(eq(instrumentsTable.id, chamber.chamberId));
  await reassess(chamber.chamberId);
  expect((await look(booking)).atRiskReason).toBe(`${chamber.chamberTag} is out of service.`);

  await bench.app.db
    .update(instrumentsTable)
    .set({ state: 'in-service' })
    .where(eq(instrumentsTable.id, chamber.chamberId));
  await calibrate(bench.app.db, other.keepers, chamber.meterInstrumentId, 'measure', {
    performedOn: '2026-03-02',
    dueOn: '2027-03-01',
  });
  await bench.app.db
    .update(cellsTable)
    .set({ condition: 'damaged' })
    .where(eq(cellsTable.id, made.cellIds[0] ?? 0));
  await reassess(chamber.chamberId);
  expect((await look(booking)).atRiskReason).toMatch(/^A cell is damaged/);
});

test('nothing touched, nothing to do', async () => {
  const scope = { ...site, id: bench.keepers.siteId };
  const affected = await bench.app.database.transact((tx) =>
    reassessBookings(bench.app.deps, tx, scope, { unitIds: [], chamberIds: [] }, null),
  );
  expect(affected).toEqual([]);
});
