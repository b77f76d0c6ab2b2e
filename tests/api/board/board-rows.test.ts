import { afterAll, beforeAll, expect, test } from 'vitest';
import { channelsTable } from '#server/db/tables/channel.table.ts';
import { unitsTable } from '#server/db/tables/unit.table.ts';
import { getBoard } from '#shared/contracts/board.contract.ts';
import { buildBookableChamber } from '#tests/support/build-bookable.ts';
import { buildBench } from '#tests/support/build-bench.ts';
import type { Bench } from '#tests/support/build-bench.ts';
import { buildInstrument } from '#tests/support/build-instrument.ts';
import { startTestApp } from '#tests/support/test-app.ts';

let bench: Bench;
beforeAll(async () => {
  bench = await buildBench(await startTestApp());
  await buildBookableChamber(bench.app.db, bench.keepers, { number: '41', size: 2 });
});
afterAll(() => bench.app.stop());

const week = { from: '2026-03-02T00:00:00Z', to: '2026-03-09T00:00:00Z' };

async function look(query: Record<string, string | number> = {}) {
  const { body } = await bench.app.call(getBoard, bench.engineer, { query: { ...week, ...query } });
  return body;
}

const keysOf = ({ rows }: { rows: readonly { key: string }[] }) => rows.map(({ key }) => key);

test('folded, the board has one row for each chamber, source and meter, in this order', async () => {
  const tag = bench.chamber.chamberTag;
  const number = tag.slice(1);
  const board = await look();
  expect(keysOf(board)).toEqual([tag, 'C41', `S${number}`, 'S41', `M${number}`, 'M41']);
  expect(board.rowCount).toBe(6);
  expect(board.rows[0]).toEqual({
    key: tag,
    group: 'chambers',
    parentKey: null,
    label: tag,
    note: '4 positions',
    badge: 'in-date',
    childCount: 4,
    href: `/equipment/${tag}`,
  });
  expect(board.rows[3]).toMatchObject({ group: 'sources', note: '2 channels', badge: 'in-date' });
});

test('an open row is followed by its positions or channels, each under its own key', async () => {
  const board = await look({ open: 'C41,M41' });
  expect(keysOf(board).filter((key) => key.includes('41'))).toEqual([
    'C41',
    'C41/1',
    'C41/2',
    'S41',
    'M41',
    'M41/1',
    'M41/2',
  ]);
  const position = board.rows.find(({ key }) => key === 'C41/1');
  expect(position).toMatchObject({ parentKey: 'C41', badge: null, note: '18650, 21700' });
  const channel = board.rows.find(({ key }) => key === 'M41/2');
  expect(channel).toMatchObject({ parentKey: 'M41', badge: 'in-date', childCount: 0 });
});

test('groups and a part of a tag narrow the rows; nothing that matches is an empty board', async () => {
  expect(keysOf(await look({ groups: 'meters,chambers', text: '41' }))).toEqual(['C41', 'M41']);
  expect(keysOf(await look({ text: 's4' }))).toEqual(['S41']);
  const none = await look({ text: 'X99' });
  expect(none).toMatchObject({ rows: [], rowCount: 0, bars: [], blocks: [], tides: [] });
});

test('pages follow each other without a gap and count the whole', async () => {
  const all = await look({ open: 'C41' });
  const pages = [
    await look({ open: 'C41', limit: 3 }),
    await look({ open: 'C41', limit: 3, offset: 3 }),
    await look({ open: 'C41', limit: 3, offset: 6 }),
  ];
  expect(pages.flatMap((page) => keysOf(page))).toEqual(keysOf(all));
  expect(pages.map(({ rowCount }) => rowCount)).toEqual([8, 8, 8]);
  const beyond = await look({ open: 'C41', offset: 8 });
  expect(beyond).toMatchObject({ rows: [], rowCount: 8 });
});

test('an instrument that sources and measures stands in both groups, its channels once in each', async () => {
  const { db } = bench.app;
  const id = await buildInstrument(db, {
    tag: 'Q42',
    kind: 'source',
    siteId: bench.keepers.siteId,
  });
  const at = new Date('2026-01-05T09:00:00Z');
  const made = { instrumentId: id, createdAt: at, updatedAt: at };
  const channels = await db
    .insert(channelsTable)
    .values([
      { ...made, label: 'Q42/1', function: 'source' },
      { ...made, label: 'Q42/2', function: 'measure' },
    ])
    .returning({ channelId: channelsTable.id, does: channelsTable.function });
  await db.insert(unitsTable).values(
    channels.map(({ channelId, does }) => ({
      instrumentId: id,
      channelId,
      kind: does === 'source' ? ('source-channel' as const) : ('meter-channel' as const),
    })),
  );
  const folded = await look({ text: 'Q42' });
  expect(folded.rows.map(({ key, group, label }) => [key, group, label])).toEqual([
    ['Q42', 'sources', 'Q42'],
    ['Q42:meters', 'meters', 'Q42'],
  ]);
  expect(keysOf(await look({ text: 'Q42', open: 'Q42:meters' }))).toEqual([
    'Q42',
    'Q42:meters',
    'Q42/2',
  ]);
  expect(keysOf(await look({ text: 'Q42', open: 'Q42' }))).toEqual(['Q42', 'Q42/1', 'Q42:meters']);
});

test('staffed hours are those of the site in the window', async () => {
  const { staffed } = await look({ from: '2026-03-06T12:00:00Z', to: '2026-03-09T09:00:00Z' });
  expect(staffed).toEqual([
    { startAt: '2026-03-06T12:00:00.000Z', endAt: '2026-03-06T18:00:00.000Z' },
    { startAt: '2026-03-09T08:00:00.000Z', endAt: '2026-03-09T09:00:00.000Z' },
  ]);
});

test.each([
  ['turned round', '2026-03-09T00:00:00Z', '2026-03-02T00:00:00Z'],
  ['empty', '2026-03-09T00:00:00Z', '2026-03-09T00:00:00Z'],
  ['longer than five weeks', '2026-03-02T00:00:00Z', '2026-04-08T00:00:00Z'],
])('a window that is %s is refused with what fits', async (_name, from, to) => {
  const { status, problem } = await bench.app.callRefused(getBoard, bench.engineer, {
    query: { from, to },
  });
  expect([status, problem.code]).toEqual([422, 'input.invalid']);
  expect(problem.errors).toEqual([
    {
      detail: 'A window ends after it starts and is at most 36 days long.',
      pointer: '#/query/to',
    },
  ]);
});

test('another site has its own rows, and its board is not there for who has no role at it', async () => {
  const both = await bench.app.signInAs({ roles: ['engineer', 'engineer@otterholm'] });
  const { body } = await bench.app.call(getBoard, both, {
    params: { site: 'otterholm' },
    query: week,
  });
  expect(body.rows).toEqual([]);
  const { status } = await bench.app.callRefused(getBoard, bench.engineer, {
    params: { site: 'otterholm' },
    query: week,
  });
  expect(status).toBe(404);
});
