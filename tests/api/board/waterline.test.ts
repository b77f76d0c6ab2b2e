import { afterAll, beforeAll, expect, test } from 'vitest';
import { getWaterline } from '#shared/contracts/board.contract.ts';
import type { Waterline } from '#shared/contracts/board.contract.ts';
import { reportBreakdown } from '#shared/contracts/equipment.contract.ts';
import { buildBookableChamber } from '#tests/support/build-bookable.ts';
import { buildBench } from '#tests/support/build-bench.ts';
import type { Bench } from '#tests/support/build-bench.ts';
import { buildOtherWork, buildOutage } from '#tests/support/build-closures.ts';
import { startTestApp } from '#tests/support/test-app.ts';

let bench: Bench;
beforeAll(async () => {
  bench = await buildBench(await startTestApp());
});
afterAll(() => bench.app.stop());

async function read(at: string): Promise<Waterline> {
  bench.app.clock.set(at);
  const { body } = await bench.app.call(getWaterline, bench.engineer);
  bench.app.clock.set('2026-03-02T08:00:00Z');
  return body;
}

async function vesselAt(tag: string, at: string) {
  const { vessels } = await read(at);
  const vessel = vessels.find((each) => each.tag === tag);
  if (vessel === undefined) {
    throw new Error(`No vessel for ${tag}.`);
  }
  return vessel;
}

test('a vessel fills while a booking is in it and is empty before and after', async () => {
  const tag = bench.chamber.chamberTag;
  const booking = await bench.book(
    await bench.request({ cellCount: 3, request: { setTempMdegc: 45_000 } }),
    { startAt: '2026-03-05T09:00:00.000Z' },
  );
  const hold = booking.phases.find(({ phase }) => phase === 'hold');
  expect(await vesselAt(tag, '2026-03-05T08:59:59Z')).toMatchObject({ taken: 0 });
  expect(await vesselAt(tag, hold?.startAt ?? '')).toEqual({
    tag,
    setTemperatureC: 45,
    taken: 3,
    positions: 4,
    state: 'ok',
    sentence: `${tag}: 3 of 4 positions taken at 45 °C, as planned`,
  });
  expect(await vesselAt(tag, booking.endAt)).toMatchObject({ taken: 0, setTemperatureC: 25 });
  const { positionsTaken, positions } = await read(hold?.startAt ?? '');
  expect([positionsTaken, positions]).toEqual([3, 4]);
});

test('a chamber whose last judged log is older than the rule allows is stale', async () => {
  const tag = bench.chamber.chamberTag;
  expect(await vesselAt(tag, '2026-05-17T12:00:00Z')).toMatchObject({ state: 'ok' });
  const old = await vesselAt(tag, '2026-05-18T12:00:00Z');
  expect(old.state).toBe('stale');
  expect(old.sentence).toContain('the last judged log is too old');
});

test('outage and breakdown put a chamber out, with the reason; other work only fills it', async () => {
  const { db } = bench.app;
  const [closed, broken, ageing] = await Promise.all(
    ['61', '62', '63'].map((number) =>
      buildBookableChamber(db, bench.keepers, { number, size: 2 }),
    ),
  );
  const stretch = {
    siteId: bench.keepers.siteId,
    plannedById: bench.keepers.authorId,
    from: '2026-03-04T09:00:00Z',
    to: '2026-03-06T12:00:00Z',
  };
  await buildOutage(db, {
    ...stretch,
    title: 'mapping',
    instrumentIds: [closed?.chamberId ?? 0],
    unitIds: closed?.paths.map(({ positionUnitId }) => positionUnitId) ?? [],
  });
  await buildOtherWork(db, {
    ...stretch,
    title: 'ageing',
    chamberId: ageing?.chamberId ?? 0,
    setTempMdegc: 60_000,
    unitIds: ageing?.paths.slice(0, 1).map(({ positionUnitId }) => positionUnitId) ?? [],
  });
  await bench.app.call(reportBreakdown, bench.engineer, {
    params: { tag: 'C62' },
    body: { reason: 'The heater trips.', until: null },
  });
  expect(broken?.chamberTag).toBe('C62');
  const at = '2026-03-05T03:00:00Z';
  expect(await vesselAt('C61', at)).toMatchObject({
    state: 'out',
    taken: 0,
    sentence: 'C61: 0 of 2 positions taken; out of use: mapping',
  });
  expect((await vesselAt('C62', at)).sentence).toContain('The heater trips.');
  expect(await vesselAt('C62', at)).toMatchObject({ state: 'out' });
  expect(await vesselAt('C63', at)).toMatchObject({
    state: 'ok',
    taken: 1,
    setTemperatureC: 60,
  });
  expect(await vesselAt('C61', stretch.to)).toMatchObject({ state: 'ok' });
});

test('the waterline of a site is not there for who has no role at it', async () => {
  const { status } = await bench.app.callRefused(getWaterline, bench.engineer, {
    params: { site: 'otterholm' },
  });
  expect(status).toBe(404);
});
