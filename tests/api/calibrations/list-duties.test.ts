import { eq } from 'drizzle-orm';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { dutiesTable } from '#server/db/tables/calibration.table.ts';
import { channelsTable } from '#server/db/tables/channel.table.ts';
import { instrumentsTable } from '#server/db/tables/instrument.table.ts';
import { sitesTable } from '#server/db/tables/site.table.ts';
import {
  approveCalibration,
  listDuties,
  recordCalibration,
} from '#shared/contracts/calibrations.contract.ts';
import type { DutyRow } from '#shared/contracts/calibrations.contract.ts';
import { buildBench } from '#tests/support/build-bench.ts';
import type { Bench } from '#tests/support/build-bench.ts';
import { calibrate } from '#tests/support/build-bookable.ts';
import { buildInstrument } from '#tests/support/build-instrument.ts';
import { calibrationWish } from '#tests/support/calibration-wish.ts';
import { startTestApp } from '#tests/support/test-app.ts';
import type { TestPerson } from '#tests/support/test-app.ts';

let bench: Bench;
let metrologist: TestPerson;
let meter = '';

type DutyWish = Partial<typeof dutiesTable.$inferInsert> & { readonly instrumentId: number };

async function addDuty(wish: DutyWish): Promise<void> {
  const at = new Date('2026-01-05T09:00:00Z');
  await bench.app.db
    .insert(dutiesTable)
    .values({ kind: 'calibration', intervalMonths: 12, createdAt: at, updatedAt: at, ...wish });
}

async function addLogger(tag: string, days?: { performedOn: string; dueOn: string }) {
  const { siteId } = bench.keepers;
  const instrumentId = await buildInstrument(bench.app.db, { siteId, tag, kind: 'logger' });
  if (days !== undefined) {
    await calibrate(bench.app.db, bench.keepers, instrumentId, 'temperature', days);
  }
  await addDuty({ instrumentId, custodianId: metrologist.personId });
  return instrumentId;
}

beforeAll(async () => {
  bench = await buildBench(await startTestApp());
  metrologist = await bench.app.signInAs({ roles: ['metrologist'], name: 'Mia Metrologist' });
  meter = bench.chamber.chamberTag.replace('C', 'M');
  await addDuty({ instrumentId: bench.chamber.meterInstrumentId });
  await addLogger('L91');
  await addLogger('L92', { performedOn: '2025-02-20', dueOn: '2026-02-19' });
  await addLogger('L93', { performedOn: '2025-03-04', dueOn: '2026-03-03' });
});
afterAll(() => bench.app.stop());

async function list(
  query: Record<string, string | number> = {},
  person = bench.engineer,
): Promise<DutyRow[]> {
  return (await bench.app.call(listDuties, person, { query })).body.items;
}
const tagsOf = (rows: readonly DutyRow[]) => rows.map(({ tag }) => tag);

test('what falls due comes soonest first, and what was never calibrated before all', async () => {
  const rows = await list();
  expect(rows).toMatchObject([
    { tag: 'L91', badge: 'not-calibrated', dueOn: null, daysLeft: null, lastCalibrationId: null },
    { tag: 'L92', badge: 'overdue', dueOn: '2026-02-19', daysLeft: -11 },
    { tag: 'L93', badge: 'due-soon', dueOn: '2026-03-03', daysLeft: 1 },
    { tag: meter, badge: 'in-date', dueOn: '2027-01-09', scope: 'whole instrument' },
  ]);
  expect(rows[1]?.custodian).toEqual({ id: metrologist.personId, name: 'Mia Metrologist' });
});

test('badge, kind, due day, custodian and text narrow the list', async () => {
  expect(tagsOf(await list({ badge: 'overdue,due-soon' }))).toEqual(['L92', 'L93']);
  expect(tagsOf(await list({ kind: 'meter' }))).toEqual([meter]);
  expect(tagsOf(await list({ dueBefore: '2026-03-03' }))).toEqual(['L91', 'L92']);
  expect(tagsOf(await list({ mine: 'true' }, metrologist))).toEqual(['L91', 'L92', 'L93']);
  expect(await list({ mine: 'true' })).toEqual([]);
  expect(tagsOf(await list({ text: 'l93' }))).toEqual(['L93']);
});

test('pages join up to the whole list, also with a filter', async () => {
  for (const filter of [{}, { badge: 'overdue,due-soon,not-calibrated' }]) {
    const whole = tagsOf(await list(filter));
    const head = await bench.app.call(listDuties, bench.engineer, {
      query: { ...filter, limit: 2 },
    });
    const rest = await bench.app.call(listDuties, bench.engineer, {
      query: { ...filter, limit: 2, cursor: head.body.nextCursor ?? '' },
    });
    expect([...tagsOf(head.body.items), ...tagsOf(rest.body.items)]).toEqual(whole);
    expect(rest.body.nextCursor).toBeNull();
  }
});

test('days are counted in the zone of the site, not in UTC', async () => {
  const [otterholm] = await bench.app.db
    .select()
    .from(sitesTable)
    .where(eq(sitesTable.code, 'otterholm'));
  const siteId = otterholm?.id ?? 0;
  const instrumentId = await buildInstrument(bench.app.db, { siteId, tag: 'L81', kind: 'logger' });
  await calibrate(bench.app.db, bench.keepers, instrumentId, 'temperature', {
    performedOn: '2025-03-04',
    dueOn: '2026-03-02',
  });
  await addDuty({ instrumentId });
  const person = await bench.app.signInAs({ roles: ['metrologist@otterholm'] });
  const look = async () =>
    (await bench.app.call(listDuties, person, { params: { site: 'otterholm' } })).body.items;
  // 04:30 UTC is still the evening of the due day there, 05:30 the day after.
  bench.app.clock.set('2026-03-03T04:30:00Z');
  expect(await look()).toMatchObject([{ tag: 'L81', badge: 'due-soon', daysLeft: 0 }]);
  bench.app.clock.set('2026-03-03T05:30:00Z');
  expect(await look()).toMatchObject([{ tag: 'L81', badge: 'overdue', daysLeft: -1 }]);
  bench.app.clock.set('2026-03-02T08:00:00Z');
});

test('a duty names the record that awaits approval and the latest that counts, by its day', async () => {
  const scopes = [
    { channelId: null, function: 'temperature', meterRangeId: null, limitation: null } as const,
  ];
  const record = async (performedOn: string) =>
    (
      await bench.app.call(recordCalibration, metrologist, {
        body: calibrationWish('L92', { scopes, performedOn, dueOn: '2027-02-01' }),
      })
    ).body;
  const approver = await bench.app.signInAs({ roles: ['manager'] });
  const newest = await record('2026-02-25');
  expect(await list({ text: 'L92' })).toMatchObject([{ awaitingApprovalId: newest.id }]);
  // Entered later, performed earlier.
  for (const { id } of [newest, await record('2026-02-22')]) {
    await bench.app.call(approveCalibration, approver, { params: { id }, body: { version: 1 } });
  }
  expect(await list({ text: 'L92' })).toMatchObject([
    { awaitingApprovalId: null, lastCalibrationId: newest.id, badge: 'in-date' },
  ]);
});

test('bookings that reach past the due day are counted, and those at risk', async () => {
  const { meterInstrumentId } = bench.chamber;
  await calibrate(bench.app.db, bench.keepers, meterInstrumentId, 'measure', {
    performedOn: '2026-01-11',
    dueOn: '2026-03-06',
  });
  await bench.book(await bench.request(), { startAt: '2026-03-05T09:00:00.000Z' });
  expect(await list({ text: meter })).toMatchObject([
    { dueOn: '2026-03-06', bookingsPastDue: 0, atRisk: 0 },
  ]);
  await calibrate(bench.app.db, bench.keepers, meterInstrumentId, 'measure', {
    performedOn: '2026-01-12',
    dueOn: '2026-03-04',
  });
  expect(await list({ text: meter })).toMatchObject([{ bookingsPastDue: 1 }]);
});

test('a duty of one channel goes by that channel alone, and moves with it', async () => {
  const { meterInstrumentId } = bench.chamber;
  const [channel] = await bench.app.db
    .select()
    .from(channelsTable)
    .where(eq(channelsTable.label, `${meter}/2`));
  const channelId = channel?.id ?? 0;
  await addDuty({ instrumentId: meterInstrumentId, channelId, function: 'measure' });
  const made = await bench.app.call(recordCalibration, metrologist, {
    body: calibrationWish(meter, {
      scopes: [{ channelId, function: 'measure', meterRangeId: null, limitation: null }],
      dueOn: '2026-08-31',
    }),
  });
  const approver = await bench.app.signInAs({ roles: ['manager'] });
  await bench.app.call(approveCalibration, approver, {
    params: { id: made.body.id },
    body: { version: 1 },
  });
  expect(await list({ text: meter })).toMatchObject([
    { scope: 'whole instrument', dueOn: '2026-03-04' },
    { scope: `${meter}/2`, dueOn: '2026-08-31', badge: 'in-date' },
  ]);
  const rows = await bench.app.db
    .select()
    .from(dutiesTable)
    .where(eq(dutiesTable.instrumentId, meterInstrumentId));
  expect(rows.map(({ nextDueOn }) => nextDueOn).toSorted()).toEqual(['2026-03-04', '2026-08-31']);
});

test('what is retired or ended falls due no more', async () => {
  const retired = await addLogger('L94', { performedOn: '2025-03-04', dueOn: '2026-03-03' });
  const ended = await addLogger('L95', { performedOn: '2025-03-04', dueOn: '2026-03-03' });
  expect(await list({ text: 'L94' })).toHaveLength(1);
  const { db } = bench.app;
  await db
    .update(instrumentsTable)
    .set({ state: 'retired' })
    .where(eq(instrumentsTable.id, retired));
  await db
    .update(dutiesTable)
    .set({ endedAt: bench.app.clock.now() })
    .where(eq(dutiesTable.instrumentId, ended));
  expect(tagsOf(await list())).not.toContain('L94');
  expect(tagsOf(await list())).not.toContain('L95');
});

test('duties are for people of the site', async () => {
  const elsewhere = await bench.app.signInAs({ roles: ['metrologist@otterholm'] });
  const refusals = await Promise.all([
    bench.app.callRefused(listDuties, null),
    bench.app.callRefused(listDuties, elsewhere),
    bench.app.callRefused(listDuties, bench.engineer, { query: { dueBefore: 'soon' } }),
    bench.app.callRefused(listDuties, bench.engineer, { query: { cursor: 'nonsense' } }),
  ]);
  expect(refusals.map(({ status }) => status)).toEqual([401, 404, 422, 422]);
});
