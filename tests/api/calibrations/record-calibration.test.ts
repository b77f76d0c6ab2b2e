import { eq } from 'drizzle-orm';
import { afterAll, beforeAll, expect, test } from 'vitest';
import type { z } from 'zod';
import { calibrationsTable } from '#server/db/tables/calibration.table.ts';
import { channelsTable } from '#server/db/tables/channel.table.ts';
import { listAuditEvents } from '#shared/contracts/audit.contract.ts';
import {
  getCalibration,
  listCalibrations,
  recordCalibration,
} from '#shared/contracts/calibrations.contract.ts';
import { getInstrument } from '#shared/contracts/equipment.contract.ts';
import { uploadFile } from '#shared/contracts/files.contract.ts';
import { buildBench } from '#tests/support/build-bench.ts';
import type { Bench } from '#tests/support/build-bench.ts';
import { buildInstrument } from '#tests/support/build-instrument.ts';
import { calibrationWish } from '#tests/support/calibration-wish.ts';
import { startTestApp } from '#tests/support/test-app.ts';
import type { TestPerson } from '#tests/support/test-app.ts';

type Wish = z.input<typeof recordCalibration.body>;

let bench: Bench;
let metrologist: TestPerson;
let meter = '';
beforeAll(async () => {
  bench = await buildBench(await startTestApp());
  metrologist = await bench.app.signInAs({ roles: ['metrologist'], name: 'Mia Metrologist' });
  meter = bench.chamber.chamberTag.replace('C', 'M');
});
afterAll(() => bench.app.stop());

const record = (change: Partial<Wish> = {}) =>
  bench.app.call(recordCalibration, metrologist, { body: calibrationWish(meter, change) });
const recordRefused = (change: Partial<Wish>) =>
  bench.app.callRefused(recordCalibration, metrologist, { body: calibrationWish(meter, change) });

async function channelIdsOf(instrumentId: number): Promise<number[]> {
  const rows = await bench.app.db
    .select()
    .from(channelsTable)
    .where(eq(channelsTable.instrumentId, instrumentId));
  return rows.map(({ id }) => id).toSorted((a, b) => a - b);
}

function certificate(): Uint8Array {
  const bytes = new Uint8Array(200).fill(0x20);
  bytes.set(new TextEncoder().encode('%PDF-1.7\n'));
  return bytes;
}

test('a record keeps what the certificate says and awaits a second person', async () => {
  const [channelId = 0] = await channelIdsOf(bench.chamber.meterInstrumentId);
  const meterRangeId = bench.chamber.paths[0]?.meterRangeId ?? 0;
  const file = await bench.app.call(uploadFile, metrologist, {
    query: { name: 'CB-2204.pdf' },
    body: certificate(),
  });
  const { body, status } = await record({
    scopes: [
      { channelId: null, function: 'measure', meterRangeId: null, limitation: null },
      { channelId, function: 'measure', meterRangeId, limitation: 'not below 1 µA' },
    ],
    note: 'adjusted at zero',
    conformityAsFound: 'not-stated',
    fileId: file.body.id,
  });
  expect(status).toBe(201);
  expect(body).toMatchObject({
    tag: meter,
    state: 'awaiting-approval',
    performedOn: '2026-03-02',
    dueOn: '2027-03-01',
    provider: 'Calibration bench',
    certificateNumber: 'CB-2204',
    conformityAsFound: 'not-stated',
    conformityAsLeft: 'conforms',
    note: 'adjusted at zero',
    file: { id: file.body.id, name: 'CB-2204.pdf', mediaType: 'application/pdf', sizeBytes: 200 },
    recordedBy: { id: metrologist.personId, name: 'Mia Metrologist' },
    recordedAt: '2026-03-02T08:00:00.000Z',
    decidedBy: null,
    decidedAt: null,
    refusalReason: null,
    replacesId: null,
    replacedById: null,
    version: 1,
  });
  expect(body.scopes).toMatchObject([
    { channelId: null, channelLabel: null, meterRangeId: null, rangeLabel: null },
    {
      channelId,
      channelLabel: `${meter}/1`,
      rangeLabel: '100 µA',
      limitation: 'not below 1 µA',
    },
  ]);
  const again = await bench.app.call(getCalibration, bench.engineer, { params: { id: body.id } });
  expect(again.body).toEqual(body);
  const auditor = await bench.app.signInAs({ roles: ['auditor'] });
  const trail = await bench.app.call(listAuditEvents, auditor, {
    query: { subjectKind: 'calibration', subjectId: body.id },
  });
  expect(trail.body.items).toMatchObject([
    { action: 'calibration.record', actor: { id: metrologist.personId }, before: null },
  ]);
});

test('until it is approved nothing is in date by it', async () => {
  const tag = meter.replace('M', 'L');
  await buildInstrument(bench.app.db, { siteId: bench.keepers.siteId, tag, kind: 'logger' });
  await record({
    tag,
    scopes: [{ channelId: null, function: 'temperature', meterRangeId: null, limitation: null }],
  });
  const { body } = await bench.app.call(getInstrument, bench.engineer, { params: { tag } });
  expect(body).toMatchObject({ badge: 'not-calibrated', dueOn: null });
  expect(body.calibrations).toMatchObject([{ state: 'awaiting-approval' }]);
});

test('in-house is known by its word', async () => {
  const { body } = await record({ provider: 'In house' });
  expect(body.provider).toBe('in-house');
  const [row] = await bench.app.db
    .select()
    .from(calibrationsTable)
    .where(eq(calibrationsTable.id, body.id));
  expect(row?.inHouse).toBe(true);
});

test('every line must be a channel, function and range of this instrument, each once', async () => {
  const [own = 0] = await channelIdsOf(bench.chamber.meterInstrumentId);
  const [foreign = 0] = await channelIdsOf(bench.chamber.sourceInstrumentId);
  const line = {
    channelId: own,
    function: 'measure',
    meterRangeId: null,
    limitation: null,
  } as const;
  const { status, problem } = await recordRefused({
    scopes: [
      line,
      { ...line, channelId: foreign },
      { ...line, function: 'source' },
      { ...line, meterRangeId: 987_654 },
      { ...line, limitation: 'the same again' },
    ],
  });
  expect([status, problem.code]).toEqual([422, 'calibration.scope']);
  expect(problem.errors?.map(({ pointer }) => pointer)).toEqual([
    '#/scopes/1',
    '#/scopes/2',
    '#/scopes/3',
    '#/scopes/4',
  ]);
  expect(problem.errors?.[3]?.detail).toContain('named twice');
});

test('what has nothing to calibrate takes no record', async () => {
  const tag = meter.replace('M', 'F');
  await buildInstrument(bench.app.db, { siteId: bench.keepers.siteId, tag, kind: 'fixture' });
  const { status, problem } = await recordRefused({ tag });
  expect([status, problem.code]).toEqual([422, 'calibration.scope']);
});

test('days, words and lines without sense are refused where they stand', async () => {
  const cases = [
    [{ performedOn: '2026-03-03' }, ['#/performedOn']],
    [{ dueOn: '2026-03-02' }, ['#/dueOn']],
    [{ performedOn: '2026-03-04', dueOn: '2026-03-03' }, ['#/performedOn', '#/dueOn']],
    [{ performedOn: '2026-02-30' }, ['#/performedOn']],
    [{ certificateNumber: ' ' }, ['#/certificateNumber']],
    [{ provider: '' }, ['#/provider']],
    [{ scopes: [] }, ['#/scopes']],
  ] as const;
  for (const [change, pointers] of cases) {
    const { status, problem } = await bench.app.callRefused(recordCalibration, metrologist, {
      body: { ...calibrationWish(meter), ...change },
    });
    expect([pointers, status]).toEqual([pointers, 422]);
    expect(problem.errors?.map(({ pointer }) => pointer)).toEqual(pointers);
  }
});

test('the file must have arrived, and at this site', async () => {
  const elsewhere = await bench.app.signInAs({ roles: ['metrologist@otterholm'] });
  const far = await bench.app.call(uploadFile, elsewhere, {
    params: { site: 'otterholm' },
    query: { name: 'far.pdf' },
    body: certificate(),
  });
  for (const fileId of [987_654, far.body.id]) {
    const { status, problem } = await recordRefused({ fileId });
    expect([status, problem.code]).toEqual([409, 'file.incomplete']);
    expect(problem.errors?.map(({ pointer }) => pointer)).toEqual(['#/fileId']);
  }
});

test('only an approved record of the same instrument can be corrected', async () => {
  const waiting = await record();
  const { body } = await bench.app.call(listCalibrations, metrologist, {
    query: { tag: meter.replace('M', 'S'), state: 'approved' },
  });
  const ofSource = body.items[0]?.id ?? 0;
  for (const replacesId of [waiting.body.id, ofSource, 987_654]) {
    const { status, problem } = await recordRefused({ replacesId });
    expect([status, problem.code]).toEqual([409, 'calibration.state']);
  }
  const approved = await bench.app.call(listCalibrations, metrologist, {
    query: { tag: meter, state: 'approved' },
  });
  const replacesId = approved.body.items[0]?.id ?? 0;
  expect((await record({ replacesId })).body).toMatchObject({
    replacesId,
    state: 'awaiting-approval',
  });
});

test('a repeat with the same key records once', async () => {
  const input = {
    body: calibrationWish(meter, { certificateNumber: 'CB-TWICE' }),
    idempotencyKey: 'a3b0d7c4-52fd-4d6f-8f5e-9c7e0b3d6a10',
  };
  const one = await bench.app.call(recordCalibration, metrologist, input);
  const two = await bench.app.call(recordCalibration, metrologist, input);
  expect(two.body).toEqual(one.body);
  const { body } = await bench.app.call(listCalibrations, metrologist, {
    query: { text: 'CB-TWICE' },
  });
  expect(body.items).toHaveLength(1);
});

test('metrologists of the site record; others do not, and a foreign tag is not there', async () => {
  const manager = await bench.app.signInAs({ roles: ['manager'] });
  const elsewhere = await bench.app.signInAs({ roles: ['metrologist@otterholm'] });
  const body = calibrationWish(meter);
  const refusals = await Promise.all([
    bench.app.callRefused(recordCalibration, manager, { body }),
    bench.app.callRefused(recordCalibration, bench.scheduler, { body }),
    bench.app.callRefused(recordCalibration, elsewhere, { params: { site: 'otterholm' }, body }),
    bench.app.callRefused(recordCalibration, elsewhere, { body }),
    bench.app.callRefused(recordCalibration, metrologist, { body: { ...body, tag: 'M98' } }),
  ]);
  expect(refusals.map(({ status }) => status)).toEqual([403, 403, 404, 404, 404]);
});

test('records come newest first, by state, instrument or text, page after page', async () => {
  const list = async (query: Record<string, string | number>) =>
    (await bench.app.call(listCalibrations, bench.engineer, { query })).body;
  const all = await list({});
  const ids = all.items.map(({ id }) => id);
  expect(ids).toEqual(ids.toSorted((a, b) => b - a));
  const head = await list({ limit: 3 });
  expect(head.items.map(({ id }) => id)).toEqual(ids.slice(0, 3));
  const rest = await list({ limit: 200, cursor: head.nextCursor ?? '' });
  expect(rest.items.map(({ id }) => id)).toEqual(ids.slice(3));
  expect(rest.nextCursor).toBeNull();

  const ofMeter = await list({ tag: meter });
  expect(new Set(ofMeter.items.map(({ tag }) => tag))).toEqual(new Set([meter]));
  const waiting = await list({ state: 'awaiting-approval,refused' });
  expect(new Set(waiting.items.map(({ state }) => state))).toEqual(new Set(['awaiting-approval']));
  expect((await list({ text: 'calibration BENCH' })).items.length).toBeGreaterThan(0);
  expect((await list({ text: '%' })).items).toEqual([]);
});

test('the records of a site are its own', async () => {
  const elsewhere = await bench.app.signInAs({ roles: ['metrologist@otterholm'] });
  const { body } = await record();
  const other = await bench.app.call(listCalibrations, elsewhere, {
    params: { site: 'otterholm' },
  });
  expect(other.body.items).toEqual([]);
  const answer = await bench.app.callRefused(getCalibration, elsewhere, {
    params: { site: 'otterholm', id: body.id },
  });
  expect(answer.status).toBe(404);
});
