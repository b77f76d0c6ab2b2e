import { afterAll, beforeAll, expect, test } from 'vitest';
import { dutiesTable } from '#server/db/tables/calibration.table.ts';
import { getToday } from '#shared/contracts/board.contract.ts';
import type { Today } from '#shared/contracts/board.contract.ts';
import type { BookingDto } from '#shared/contracts/bookings.contract.ts';
import { reportBreakdown } from '#shared/contracts/equipment.contract.ts';
import { buildBookableChamber, calibrate } from '#tests/support/build-bookable.ts';
import { buildBench } from '#tests/support/build-bench.ts';
import type { Bench } from '#tests/support/build-bench.ts';
import { buildOtherWork, buildOutage } from '#tests/support/build-closures.ts';
import { startTestApp } from '#tests/support/test-app.ts';
import type { TestPerson } from '#tests/support/test-people.ts';

let bench: Bench;
let booking: BookingDto;
let chamber = '';
beforeAll(async () => {
  bench = await buildBench(await startTestApp());
  chamber = bench.chamber.chamberTag;
  booking = await bench.book(await bench.request({ cellCount: 2 }), {
    startAt: '2026-03-05T09:00:00.000Z',
  });
});
afterAll(() => bench.app.stop());

async function read(at: string, person: TestPerson = bench.engineer): Promise<Today> {
  bench.app.clock.set(at);
  const { body } = await bench.app.call(getToday, person);
  bench.app.clock.set('2026-03-02T08:00:00Z');
  return body;
}

const whatOf = ({ happenings }: Today) => happenings.map(({ what }) => what);

test('the day is the calendar day of the site with its working hours', async () => {
  const thursday = await read('2026-03-05T23:59:00Z');
  expect(thursday.day).toBe('2026-03-05');
  expect(thursday.staffed).toEqual([
    { startAt: '2026-03-05T08:00:00.000Z', endAt: '2026-03-05T18:00:00.000Z' },
  ]);
  // Summer time has begun at the site: 23:30 UTC is half past midnight of the next day.
  const spring = await read('2026-03-29T23:30:00Z');
  expect(spring.day).toBe('2026-03-30');
  expect(spring.staffed[0]?.startAt).toBe('2026-03-30T07:00:00.000Z');
  const sunday = await read('2026-03-08T12:00:00Z');
  expect(sunday).toMatchObject({ staffed: [], doors: [], happenings: [] });
});

test('a booking of the day is a tide, two doors and three lines', async () => {
  const today = await read('2026-03-05T10:00:00Z');
  const start = (name: string) => booking.phases.find(({ phase }) => phase === name)?.startAt;
  expect(today.positions).toBe(4);
  expect(today.tide).toEqual([
    { at: '2026-03-05T00:00:00.000Z', count: 0 },
    { at: booking.startAt, count: 2 },
    { at: booking.endAt, count: 0 },
  ]);
  expect(today.doors).toEqual([
    { at: booking.startAt, chamberTag: chamber, what: 'load' },
    { at: start('unload'), chamberTag: chamber, what: 'unload' },
  ]);
  expect(today.happenings).toMatchObject([
    {
      at: booking.startAt,
      kind: 'load',
      what: `${chamber} is loaded (${booking.id})`,
      state: 'was planned',
      href: `/loads/${booking.loadId}`,
    },
    {
      at: start('measure'),
      kind: 'settled',
      what: `Measuring begins in ${chamber} (${booking.id})`,
      state: 'planned',
    },
    { at: start('unload'), kind: 'unload', what: `${chamber} is unloaded (${booking.id})` },
  ]);
  expect(today.happenings[0]?.touches).toMatch(/^2 × LF-35 .*, 25 °C$/);
});

test('who does not see the project sees that the door opens, but for whom not', async () => {
  const stranger = await bench.app.signInAs({ roles: ['engineer'] });
  const today = await read('2026-03-05T10:00:00Z', stranger);
  expect(whatOf(today)[0]).toBe(`${chamber} is loaded`);
  expect(today.happenings[0]?.touches).toBe('1 other, 25 °C');
  expect(today.tide).toHaveLength(3);
});

test('outages begin and end, also on the same day, and other work fills positions', async () => {
  const { db } = bench.app;
  const places = await buildBookableChamber(db, bench.keepers, { number: '71', size: 2 });
  const [first, second] = places.paths.map(({ positionUnitId }) => positionUnitId);
  const planned = { siteId: bench.keepers.siteId, plannedById: bench.keepers.authorId };
  await buildOutage(db, {
    ...planned,
    title: 'door seal',
    from: '2026-03-10T09:00:00Z',
    to: '2026-03-10T12:00:00Z',
    unitIds: [first ?? 0],
    instrumentIds: [places.chamberId],
  });
  await buildOtherWork(db, {
    ...planned,
    title: 'ageing',
    from: '2026-03-10T10:00:00Z',
    to: '2026-03-11T10:00:00Z',
    chamberId: places.chamberId,
    setTempMdegc: 60_000,
    unitIds: [second ?? 0],
  });
  const tuesday = await read('2026-03-10T08:00:00Z');
  expect(tuesday.happenings).toMatchObject([
    {
      at: '2026-03-10T09:00:00.000Z',
      what: 'C71: door seal begins',
      touches: 'until Tue 10 Mar 12:00',
      href: '/equipment/C71',
    },
    { at: '2026-03-10T12:00:00.000Z', what: 'C71: door seal ends' },
  ]);
  expect(tuesday.tide.map(({ count }) => count)).toEqual([0, 1]);
  expect(tuesday.doors).toEqual([]);
});

test('a breakdown is part of the day it was reported on, and of no other', async () => {
  await buildBookableChamber(bench.app.db, bench.keepers, { number: '72', size: 1 });
  bench.app.clock.set('2026-03-11T14:00:00Z');
  await bench.app.call(reportBreakdown, bench.engineer, {
    params: { tag: 'M72' },
    body: { reason: 'Reads zero.', until: null },
  });
  const wednesday = await read('2026-03-11T16:00:00Z');
  expect(wednesday.happenings).toContainEqual(
    expect.objectContaining({
      at: '2026-03-11T14:00:00.000Z',
      what: 'M72 cannot be used',
      state: 'reported',
      href: '/equipment/M72',
    }),
  );
  expect(whatOf(await read('2026-03-12T08:00:00Z'))).not.toContain('M72 cannot be used');
});

test('what falls due within eight weeks stands with its bookings, the nearest first', async () => {
  const { db } = bench.app;
  const places = await buildBookableChamber(db, bench.keepers, { number: '73', size: 1 });
  const at = new Date('2026-01-05T09:00:00Z');
  const duty = { kind: 'calibration' as const, intervalMonths: 12, createdAt: at, updatedAt: at };
  const { sourceInstrumentId, meterInstrumentId } = bench.chamber;
  const days = new Map([
    [sourceInstrumentId, '2026-03-05'],
    [meterInstrumentId, '2026-04-20'],
    [places.meterInstrumentId, '2026-05-20'],
  ]);
  for (const [instrumentId, dueOn] of days) {
    const use = instrumentId === sourceInstrumentId ? 'source' : 'measure';
    await calibrate(db, bench.keepers, instrumentId, use, { performedOn: '2026-03-01', dueOn });
    await db.insert(dutiesTable).values({ ...duty, instrumentId, nextDueOn: dueOn });
  }
  const { fallsDue, happenings } = await read('2026-03-05T10:00:00Z');
  expect(fallsDue.map(({ tag, dueOn }) => [tag, dueOn])).toEqual([
    [chamber.replace('C', 'S'), '2026-03-05'],
    [chamber.replace('C', 'M'), '2026-04-20'],
  ]);
  expect(fallsDue[0]).toMatchObject({
    badge: 'due-soon',
    bookings: [{ startAt: booking.startAt, endAt: booking.endAt }],
  });
  expect(happenings.at(-1)).toMatchObject({
    at: '2026-03-05T23:59:59.000Z',
    kind: 'due',
    what: `${chamber.replace('C', 'S')} falls due`,
  });
});

test('the day of a site is not there for who has no role at it', async () => {
  const { status } = await bench.app.callRefused(getToday, bench.engineer, {
    params: { site: 'otterholm' },
  });
  expect(status).toBe(404);
});
