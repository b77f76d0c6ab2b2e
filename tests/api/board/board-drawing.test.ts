import { afterAll, beforeAll, expect, test } from 'vitest';
import { eq } from 'drizzle-orm';
import { bookingsTable } from '#server/db/tables/booking.table.ts';
import { getBoard } from '#shared/contracts/board.contract.ts';
import { cancelBooking } from '#shared/contracts/bookings.contract.ts';
import type { BookingDto } from '#shared/contracts/bookings.contract.ts';
import { reportBreakdown } from '#shared/contracts/equipment.contract.ts';
import { calibrate } from '#tests/support/build-bookable.ts';
import { buildBench } from '#tests/support/build-bench.ts';
import type { Bench } from '#tests/support/build-bench.ts';
import { startTestApp } from '#tests/support/test-app.ts';
import type { TestPerson } from '#tests/support/test-people.ts';

let bench: Bench;
let booking: BookingDto;
let chamber = '';
let source = '';
let meter = '';
beforeAll(async () => {
  bench = await buildBench(await startTestApp());
  chamber = bench.chamber.chamberTag;
  source = chamber.replace('C', 'S');
  meter = chamber.replace('C', 'M');
  const request = await bench.request({
    cellCount: 2,
    request: { setTempMdegc: 45_000 },
  });
  booking = await bench.book(request, { startAt: '2026-03-05T09:00:00.000Z' });
});
afterAll(() => bench.app.stop());

const week = { from: '2026-03-02T00:00:00Z', to: '2026-03-09T00:00:00Z' };

async function look(query: Record<string, string> = {}, person: TestPerson = bench.engineer) {
  const { body } = await bench.app.call(getBoard, person, { query: { ...week, ...query } });
  return body;
}

test('a booking stands on each of its positions and channels with the same phases', async () => {
  const { bars } = await look({ open: `${chamber},${source},${meter}` });
  const rows = [chamber, source, meter].flatMap((tag) => [`${tag}/1`, `${tag}/2`]);
  expect(bars.map(({ rowKey }) => rowKey)).toEqual(rows);
  for (const bar of bars) {
    expect(bar).toMatchObject({
      bookingId: booking.id,
      isVisible: true,
      state: 'confirmed',
      isAtRisk: false,
      startAt: booking.startAt,
      endAt: booking.endAt,
    });
    expect(bar.title).toMatch(new RegExp(`^${booking.id} · 2 × LF-35`));
    expect(bar.phases).toEqual(booking.phases);
  }
});

test('the likely end of the hold lies inside the hold that is kept', async () => {
  const { bars } = await look({ open: chamber });
  const hold = booking.phases.find(({ phase }) => phase === 'hold');
  const likelyMs = Date.parse(bars[0]?.holdLikelyEndAt ?? '');
  expect(likelyMs).toBeGreaterThan(Date.parse(hold?.startAt ?? ''));
  expect(likelyMs).toBeLessThanOrEqual(Date.parse(hold?.endAt ?? ''));
});

test('folded rows carry the tide of what is taken instead of bars', async () => {
  const { bars, tides } = await look();
  expect(bars).toEqual([]);
  for (const tag of [chamber, source, meter]) {
    expect(tides.find(({ rowKey }) => rowKey === tag)).toMatchObject({
      positions: 4,
      taken: [
        { at: '2026-03-02T00:00:00.000Z', count: 0 },
        { at: booking.startAt, count: 2 },
        { at: booking.endAt, count: 0 },
      ],
    });
  }
});

test('the temperature line of a chamber is idle, slants up, holds and slants back', async () => {
  const { tides } = await look();
  const phase = (name: string) => booking.phases.find((each) => each.phase === name);
  expect(tides.find(({ rowKey }) => rowKey === chamber)?.temperature).toEqual([
    { at: '2026-03-02T00:00:00.000Z', setTemperatureC: 25 },
    { at: phase('ramp')?.startAt, setTemperatureC: 25 },
    { at: phase('ramp')?.endAt, setTemperatureC: 45 },
    { at: phase('return')?.startAt, setTemperatureC: 45 },
    { at: phase('return')?.endAt, setTemperatureC: 25 },
    { at: '2026-03-09T00:00:00.000Z', setTemperatureC: 25 },
  ]);
  expect(tides.find(({ rowKey }) => rowKey === source)?.temperature).toEqual([]);
});

test('a window in the middle of a booking shows it whole and its tide from the edge on', async () => {
  const hold = booking.phases.find(({ phase }) => phase === 'hold');
  const from = new Date(Date.parse(hold?.startAt ?? '') + 60_000).toISOString();
  const to = new Date(Date.parse(hold?.startAt ?? '') + 120_000).toISOString();
  const { bars, tides } = await look({ from, to, open: chamber, groups: 'chambers' });
  expect(bars[0]).toMatchObject({ startAt: booking.startAt, endAt: booking.endAt });
  expect(tides[0]).toMatchObject({
    taken: [{ at: from, count: 2 }],
    temperature: [
      { at: from, setTemperatureC: 45 },
      { at: to, setTemperatureC: 45 },
    ],
  });
});

test('who does not see the project sees that the place is taken, and no more', async () => {
  const stranger = await bench.app.signInAs({ roles: ['engineer'] });
  const { bars } = await look({ open: chamber }, stranger);
  expect(bars).toHaveLength(2);
  expect(bars[0]).toMatchObject({
    bookingId: booking.id,
    isVisible: false,
    title: '',
    atRiskReason: null,
    startAt: booking.startAt,
    endAt: booking.endAt,
  });
  expect(JSON.stringify(bars)).not.toContain('LF-35');
});

test('a cancelled booking gives its rows back', async () => {
  const made = await bench.book(await bench.request(), { startAt: '2026-03-04T09:00:00.000Z' });
  const count = async () => {
    const { bars } = await look({ open: chamber });
    return bars.filter(({ bookingId }) => bookingId === made.id).length;
  };
  expect(await count()).toBe(1);
  await bench.app.call(cancelBooking, bench.scheduler, {
    params: { id: made.id },
    body: { version: made.version, reason: 'The cells went elsewhere.' },
  });
  expect(await count()).toBe(0);
});

test('a breakdown puts the booking at risk, and only who sees the project reads why', async () => {
  await bench.app.call(reportBreakdown, bench.engineer, {
    params: { tag: meter },
    body: { reason: 'Channel 1 reads zero.', until: null },
  });
  const [own] = (await look({ open: chamber })).bars;
  expect(own?.isAtRisk).toBe(true);
  expect(own?.atRiskReason).toContain(meter);
  // It broke before the booking begins.
  expect(own?.atRiskFrom).toBe(booking.startAt);
  const stranger = await bench.app.signInAs({ roles: ['engineer'] });
  const [foreign] = (await look({ open: chamber }, stranger)).bars;
  expect(foreign).toMatchObject({ isAtRisk: true, atRiskReason: null, atRiskFrom: null });
});

test('a booking that runs past a due day is at risk from the midnight it ends with', async () => {
  const other = await buildBench(bench.app);
  const made = await other.book(await other.request(), { startAt: '2026-03-06T15:00:00.000Z' });
  expect(Date.parse(made.endAt)).toBeGreaterThan(Date.parse('2026-03-07T00:00:00Z'));
  const { db } = bench.app;
  await db
    .update(bookingsTable)
    .set({ atRisk: true, atRiskReason: 'The source falls due while it runs.' })
    .where(eq(bookingsTable.id, made.id));
  await calibrate(db, other.keepers, other.chamber.sourceInstrumentId, 'source', {
    performedOn: '2026-03-01',
    dueOn: '2026-03-06',
  });
  const { bars } = await look({ open: other.chamber.chamberTag }, other.engineer);
  const bar = bars.find(({ bookingId }) => bookingId === made.id);
  expect(bar?.atRiskFrom).toBe('2026-03-07T00:00:00.000Z');
});
