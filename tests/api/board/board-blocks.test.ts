import { afterAll, beforeAll, expect, test } from 'vitest';
import { eq } from 'drizzle-orm';
import { instrumentsTable } from '#server/db/tables/instrument.table.ts';
import { getBoard } from '#shared/contracts/board.contract.ts';
import { reportBreakdown } from '#shared/contracts/equipment.contract.ts';
import { buildBookableChamber } from '#tests/support/build-bookable.ts';
import type { BookableChamber } from '#tests/support/build-bookable.ts';
import { buildBench } from '#tests/support/build-bench.ts';
import type { Bench } from '#tests/support/build-bench.ts';
import { buildOtherWork, buildOutage } from '#tests/support/build-closures.ts';
import { buildProject } from '#tests/support/build-request.ts';
import { startTestApp } from '#tests/support/test-app.ts';

let bench: Bench;
beforeAll(async () => {
  bench = await buildBench(await startTestApp());
});
afterAll(() => bench.app.stop());

const week = { from: '2026-03-02T00:00:00Z', to: '2026-03-09T00:00:00Z' };
let nextNumber = 50;

/** A chamber of three paths that no other test touches. */
async function lab(): Promise<BookableChamber & { number: string }> {
  nextNumber += 1;
  const number = String(nextNumber);
  const chamber = await buildBookableChamber(bench.app.db, bench.keepers, { number, size: 3 });
  return { ...chamber, number };
}

async function look(query: Record<string, string>, person = bench.engineer) {
  const { body } = await bench.app.call(getBoard, person, { query: { ...week, ...query } });
  return body;
}

const planned = () => ({
  siteId: bench.keepers.siteId,
  plannedById: bench.keepers.authorId,
  from: '2026-03-04T09:00:00Z',
  to: '2026-03-12T12:00:00Z',
});

test('an outage of a whole chamber closes it and its positions, cut to the window', async () => {
  const { chamberId, chamberTag, paths } = await lab();
  await buildOutage(bench.app.db, {
    ...planned(),
    title: 'door seal, repair',
    unitIds: paths.map(({ positionUnitId }) => positionUnitId),
    instrumentIds: [chamberId],
  });
  const { blocks, tides } = await look({ text: chamberTag, open: chamberTag });
  expect(blocks.map(({ rowKey }) => rowKey)).toEqual([
    chamberTag,
    ...[1, 2, 3].map((place) => `${chamberTag}/${place}`),
  ]);
  for (const block of blocks) {
    expect(block).toMatchObject({
      kind: 'outage',
      startAt: '2026-03-04T09:00:00.000Z',
      endAt: '2026-03-09T00:00:00.000Z',
      sentence: 'door seal, repair, until Thu 12 Mar 12:00',
    });
  }
  expect(tides[0]?.taken).toEqual([{ at: '2026-03-02T00:00:00.000Z', count: 0 }]);
});

test('an outage of one position closes that position and leaves the chamber open', async () => {
  const { chamberId, chamberTag, paths } = await lab();
  await buildOutage(bench.app.db, {
    ...planned(),
    title: 'holder renewed',
    unitIds: paths.slice(1, 2).map(({ positionUnitId }) => positionUnitId),
    instrumentIds: [chamberId],
  });
  const { blocks } = await look({ text: chamberTag, open: chamberTag });
  expect(blocks.map(({ rowKey }) => rowKey)).toEqual([`${chamberTag}/2`]);
});

test('other work takes places in sight of all, but only who sees its project reads what it is', async () => {
  const { chamberId, chamberTag, paths } = await lab();
  const projectId = await buildProject(bench.app.db);
  await buildOtherWork(bench.app.db, {
    ...planned(),
    title: 'Calendar ageing for the Silt project',
    chamberId,
    setTempMdegc: 60_000,
    unitIds: paths.slice(0, 1).map(({ positionUnitId }) => positionUnitId),
    projectId,
  });
  const query = { text: chamberTag, open: chamberTag };
  const own = await look(query, bench.scheduler);
  expect(own.blocks).toMatchObject([
    {
      rowKey: `${chamberTag}/1`,
      sentence: 'Calendar ageing for the Silt project, until Thu 12 Mar 12:00',
    },
  ]);
  expect(own.tides[0]?.taken.map(({ count }) => count)).toEqual([0, 1]);
  expect(own.tides[0]?.temperature.at(-1)?.setTemperatureC).toBe(60);
  const foreign = await look(query);
  expect(foreign.blocks).toMatchObject([
    { rowKey: `${chamberTag}/1`, sentence: 'Taken by other work, until Thu 12 Mar 12:00' },
  ]);
  expect(JSON.stringify(foreign)).not.toContain('Silt');
});

test('a breakdown closes the instrument and its channels from now on, with the reason', async () => {
  const { number } = await lab();
  const tag = `M${number}`;
  bench.app.clock.set('2026-03-03T10:00:00Z');
  await bench.app.call(reportBreakdown, bench.engineer, {
    params: { tag },
    body: { reason: 'Reads zero on the 100 µA range.', until: null },
  });
  const { blocks } = await look({ text: tag, open: tag });
  expect(blocks.map(({ rowKey }) => rowKey)).toEqual([
    tag,
    ...[1, 2, 3].map((place) => `${tag}/${place}`),
  ]);
  expect(blocks[0]).toMatchObject({
    kind: 'unavailable',
    startAt: '2026-03-03T10:00:00.000Z',
    endAt: '2026-03-09T00:00:00.000Z',
  });
  expect(blocks[0]?.sentence).toBe('Reads zero on the 100 µA range; nobody knows until when.');
  bench.app.clock.set('2026-03-02T08:00:00Z');
});

test('what is not in service is closed from now on, once', async () => {
  const { number, sourceInstrumentId } = await lab();
  await bench.app.db
    .update(instrumentsTable)
    .set({ state: 'awaiting-release' })
    .where(eq(instrumentsTable.id, sourceInstrumentId));
  const { blocks, rows } = await look({ text: `S${number}` });
  expect(rows[0]?.badge).toBe('awaiting-release');
  expect(blocks).toEqual([
    {
      rowKey: `S${number}`,
      kind: 'unavailable',
      startAt: '2026-03-02T08:00:00.000Z',
      endAt: '2026-03-09T00:00:00.000Z',
      sentence: `S${number} awaits release.`,
    },
  ]);
});

test('from the end of the due day on nothing is bookable, and the sentence names the day', async () => {
  const { number } = await lab();
  const tag = `S${number}`;
  const { blocks } = await look({
    from: '2027-01-04T00:00:00Z',
    to: '2027-01-18T00:00:00Z',
    text: tag,
  });
  expect(blocks).toEqual([
    {
      rowKey: tag,
      kind: 'not-bookable',
      startAt: '2027-01-10T00:00:00.000Z',
      endAt: '2027-01-18T00:00:00.000Z',
      sentence: `Not bookable: ${tag} falls due 9 Jan 2027.`,
    },
  ]);
});
