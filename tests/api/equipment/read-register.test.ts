import { eq } from 'drizzle-orm';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { instrumentsTable } from '#server/db/tables/instrument.table.ts';
import { roomsTable } from '#server/db/tables/site.table.ts';
import { limitationsTable } from '#server/db/tables/unit.table.ts';
import { getInstrument, listInstruments } from '#shared/contracts/equipment.contract.ts';
import type { InstrumentRow } from '#shared/contracts/equipment.contract.ts';
import { buildBench } from '#tests/support/build-bench.ts';
import type { Bench } from '#tests/support/build-bench.ts';
import { calibrate, first } from '#tests/support/build-bookable.ts';
import { buildInstrument } from '#tests/support/build-instrument.ts';
import { startTestApp } from '#tests/support/test-app.ts';

const stamps = {
  createdAt: new Date('2026-01-05T09:00:00Z'),
  updatedAt: new Date('2026-01-05T09:00:00Z'),
};

let bench: Bench;
const tags = { source: '', meter: '', chamber: '' };
beforeAll(async () => {
  bench = await buildBench(await startTestApp());
  const { db } = bench.app;
  const { chamberTag } = bench.chamber;
  tags.chamber = chamberTag;
  tags.source = chamberTag.replace('C', 'S');
  tags.meter = chamberTag.replace('C', 'M');
  const { siteId } = bench.keepers;
  await buildInstrument(db, { siteId, tag: 'F91', kind: 'mainframe', serial: 'F-77' });
  await buildInstrument(db, { siteId, tag: 'L91', kind: 'logger', model: 'two-wire logger' });
  const late = await buildInstrument(db, { siteId, tag: 'L92', kind: 'logger' });
  await calibrate(db, bench.keepers, late, 'temperature', {
    performedOn: '2025-02-20',
    dueOn: '2026-02-19',
  });
  const soon = await buildInstrument(db, { siteId, tag: 'L93', kind: 'logger' });
  await calibrate(db, bench.keepers, soon, 'temperature', {
    performedOn: '2025-03-20',
    dueOn: '2026-03-19',
  });
  await buildInstrument(db, { siteId, tag: 'L94', kind: 'logger', state: 'awaiting-release' });
});
afterAll(() => bench.app.stop());

async function list(query: Record<string, string | number> = {}): Promise<InstrumentRow[]> {
  const { body } = await bench.app.call(listInstruments, bench.engineer, { query });
  return body.items;
}
const tagsOf = (rows: readonly InstrumentRow[]) => rows.map((row) => row.tag);

test('the register says kind, state, what is in date and until when', async () => {
  const rows = await list();
  expect(tagsOf(rows)).toEqual([
    tags.chamber,
    'F91',
    'L91',
    'L92',
    'L93',
    'L94',
    tags.meter,
    tags.source,
  ]);
  const [chamber, frame, unknown, late, soon, waiting, meter] = rows;
  expect(chamber).toMatchObject({ badge: 'in-date', dueOn: '2027-01-09', channelCount: 4 });
  expect(frame).toMatchObject({ badge: null, dueOn: null, channelCount: 0, serial: 'F-77' });
  expect(unknown).toMatchObject({ badge: 'not-calibrated', dueOn: null });
  expect(late).toMatchObject({ badge: 'overdue', dueOn: '2026-02-19' });
  expect(soon).toMatchObject({ badge: 'due-soon', dueOn: '2026-03-19' });
  expect(waiting).toMatchObject({ state: 'awaiting-release', badge: 'awaiting-release' });
  expect(meter).toMatchObject({ kind: 'meter', badge: 'in-date', channelCount: 4 });
});

test('sorted by due day the earliest comes first and what has none last; by kind, kinds together', async () => {
  const byDue = await list({ sort: 'due' });
  expect(tagsOf(byDue).slice(0, 2)).toEqual(['L92', 'L93']);
  expect(byDue.slice(-3).map((row) => row.dueOn)).toEqual([null, null, null]);
  const kinds = (await list({ sort: 'kind' })).map((row) => row.kind);
  expect(kinds).toEqual(kinds.toSorted());
});

test.each(['tag', 'due', 'kind'])('pages by %s join up to the whole list', async (sort) => {
  const whole = tagsOf(await list({ sort }));
  const pages: string[] = [];
  let cursor: string | null = '';
  while (cursor !== null) {
    const { body }: { body: { items: InstrumentRow[]; nextCursor: string | null } } =
      await bench.app.call(listInstruments, bench.engineer, {
        query: { sort, limit: 3, ...(cursor === '' ? {} : { cursor }) },
      });
    pages.push(...tagsOf(body.items));
    ({ nextCursor: cursor } = body);
  }
  expect(pages).toEqual(whole);
});

test('a page of one badge is full although other instruments lie between', async () => {
  const query = { badge: 'overdue,due-soon,in-date', limit: 2 };
  const first2 = await bench.app.call(listInstruments, bench.engineer, { query });
  expect(tagsOf(first2.body.items)).toEqual([tags.chamber, 'L92']);
  const rest = await bench.app.call(listInstruments, bench.engineer, {
    query: { ...query, limit: 50, cursor: first2.body.nextCursor ?? '' },
  });
  expect(tagsOf(rest.body.items)).toEqual(['L93', tags.meter, tags.source]);
  expect(rest.body.nextCursor).toBeNull();
});

test('kind, state, badge and text narrow the list together', async () => {
  expect(tagsOf(await list({ kind: 'source,meter' }))).toEqual([tags.meter, tags.source]);
  expect(tagsOf(await list({ state: 'awaiting-release' }))).toEqual(['L94']);
  expect(tagsOf(await list({ kind: 'logger', badge: 'overdue' }))).toEqual(['L92']);
  expect(tagsOf(await list({ text: 'TWO-wire' }))).toEqual(['L91']);
  expect(tagsOf(await list({ text: 'f-7' }))).toEqual(['F91']);
  expect(await list({ kind: 'fixture' })).toEqual([]);
});

test('a cursor of another order and words nobody knows are refused', async () => {
  const { body } = await bench.app.call(listInstruments, bench.engineer, { query: { limit: 1 } });
  const refusals = await Promise.all([
    bench.app.callRefused(listInstruments, bench.engineer, {
      query: { sort: 'due', cursor: body.nextCursor ?? '' },
    }),
    bench.app.callRefused(listInstruments, bench.engineer, { query: { kind: 'oven' } }),
    bench.app.callRefused(listInstruments, bench.engineer, { query: { badge: 'green' } }),
  ]);
  expect(refusals.map(({ status }) => status)).toEqual([422, 422, 422]);
});

test('an instrument shows its state by channel and range, its figures and what comes next', async () => {
  const booking = await bench.book(await bench.request(), { startAt: '2026-03-05T09:00:00.000Z' });
  const { db } = bench.app;
  const [path] = bench.chamber.paths;
  await db.insert(limitationsTable).values({
    unitId: path?.meterUnitId ?? 0,
    note: 'not below 1 µA',
    startsAt: new Date('2026-02-01T00:00:00Z'),
    recordedById: bench.scheduler.personId,
    ...stamps,
  });
  const roomId = first(
    await db
      .insert(roomsTable)
      .values({ siteId: bench.keepers.siteId, name: 'Room 2', ...stamps })
      .returning({ id: roomsTable.id }),
  );
  await db
    .update(instrumentsTable)
    .set({ roomId, custodianId: bench.scheduler.personId, firmware: '1.4', note: 'steady' })
    .where(eq(instrumentsTable.id, bench.chamber.meterInstrumentId));

  const { body } = await bench.app.call(getInstrument, bench.engineer, {
    params: { tag: tags.meter },
  });
  expect(body).toMatchObject({
    tag: tags.meter,
    roomName: 'Room 2',
    custodian: { id: bench.scheduler.personId, name: bench.scheduler.name },
    firmware: '1.4',
    note: 'steady',
    badge: 'limited',
    parentTag: null,
    childTags: [],
    unavailability: [],
    assessments: [],
    version: 1,
  });
  expect(body.scopes).toHaveLength(4);
  expect(body.scopes[0]).toMatchObject({
    channelLabel: `${tags.meter}/1`,
    function: 'measure',
    rangeLabel: '100 µA',
    badge: 'limited',
    limitation: 'not below 1 µA',
    dueOn: '2027-01-09',
    calibrationId: body.calibrations[0]?.id,
  });
  expect(body.scopes[1]).toMatchObject({ badge: 'in-date', limitation: null });
  expect(body.calibrations).toMatchObject([{ state: 'approved', performedOn: '2026-01-10' }]);
  expect(body.facts).toEqual([
    {
      name: 'Range 100 µA',
      value:
        'resolution 1 nA, noise 10 nA, ±(500 ppm of reading + 100 ppm of range + 0 µA); burden 10 Ω inside the sense loop',
      source: 'range record',
    },
  ]);
  expect(body.nextBookings).toMatchObject([{ id: booking.id, isVisible: true }]);

  const stranger = await bench.app.signInAs({ roles: ['engineer'] });
  const seen = await bench.app.call(getInstrument, stranger, { params: { tag: tags.meter } });
  expect(seen.body.nextBookings).toMatchObject([
    { id: booking.id, isVisible: false, projectName: null, cellTypeName: null },
  ]);
});

test('a chamber shows its logs, and which ended too long ago to count', async () => {
  bench.app.clock.set('2026-05-16T12:00:00Z');
  const look = async () =>
    (await bench.app.call(getInstrument, bench.engineer, { params: { tag: tags.chamber } })).body;
  const young = await look();
  expect(young.assessments).toMatchObject([
    { setTemperatureC: 25, driftKPerH: 0.0005, isTooOld: false, assessedOn: '2026-02-16' },
    { setTemperatureC: 45, isTooOld: false, assessedBy: 'Sal Scheduler' },
  ]);
  expect(young.scopes).toMatchObject([
    { function: 'temperature', channelId: null, badge: 'in-date' },
  ]);
  expect(young.facts).toContainEqual({
    name: 'Span',
    value: '-20 °C to 80 °C',
    source: 'chamber record',
  });
  bench.app.clock.set('2026-05-16T12:00:01Z');
  expect((await look()).assessments.map(({ isTooOld }) => isTooOld)).toEqual([true, true]);
  bench.app.clock.set('2026-03-02T08:00:00Z');
});

test('a mainframe names what is mounted in it, and that names its mainframe', async () => {
  const { db } = bench.app;
  const { siteId } = bench.keepers;
  const parentId = await buildInstrument(db, { siteId, tag: 'F92', kind: 'mainframe' });
  await buildInstrument(db, { siteId, tag: 'S92', kind: 'source', parentId });
  await buildInstrument(db, { siteId, tag: 'S91', kind: 'source', parentId });
  const look = async (tag: string) =>
    (await bench.app.call(getInstrument, bench.engineer, { params: { tag } })).body;
  expect((await look('F92')).childTags).toEqual(['S91', 'S92']);
  expect(await look('S91')).toMatchObject({ parentTag: 'F92', childTags: [] });
});

test('the register of a site is its own', async () => {
  const elsewhere = await bench.app.signInAs({ roles: ['metrologist@otterholm'] });
  const other = await bench.app.call(listInstruments, elsewhere, { params: { site: 'otterholm' } });
  expect(other.body.items).toEqual([]);
  const refusals = await Promise.all([
    bench.app.callRefused(getInstrument, elsewhere, {
      params: { site: 'otterholm', tag: tags.meter },
    }),
    bench.app.callRefused(getInstrument, elsewhere, { params: { tag: tags.meter } }),
    bench.app.callRefused(getInstrument, bench.engineer, { params: { tag: 'Z99' } }),
    bench.app.callRefused(getInstrument, bench.engineer, { params: { tag: 'meter' } }),
    bench.app.callRefused(getInstrument, null, { params: { tag: tags.meter } }),
  ]);
  expect(refusals.map(({ status }) => status)).toEqual([404, 404, 404, 422, 401]);
});
