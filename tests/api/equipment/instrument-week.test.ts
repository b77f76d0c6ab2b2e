import { afterAll, beforeAll, expect, test } from 'vitest';
import { outageInstrumentsTable, outagesTable } from '#server/db/tables/outage.table.ts';
import { allocationsTable } from '#server/db/tables/allocation.table.ts';
import type { BookingDto } from '#shared/contracts/bookings.contract.ts';
import { getInstrumentWeek, reportBreakdown } from '#shared/contracts/equipment.contract.ts';
import { buildBench } from '#tests/support/build-bench.ts';
import type { Bench } from '#tests/support/build-bench.ts';
import { first } from '#tests/support/build-bookable.ts';
import { startTestApp } from '#tests/support/test-app.ts';

let bench: Bench;
let booking: BookingDto;
let chamber = '';
let meter = '';
beforeAll(async () => {
  bench = await buildBench(await startTestApp());
  chamber = bench.chamber.chamberTag;
  meter = chamber.replace('C', 'M');
  booking = await bench.book(await bench.request(), { startAt: '2026-03-05T09:00:00.000Z' });
});
afterAll(() => bench.app.stop());

const week = { from: '2026-03-02T00:00:00Z', to: '2026-03-09T00:00:00Z' };

async function look(tag: string, query = week, person = bench.engineer) {
  const { body } = await bench.app.call(getInstrumentWeek, person, { params: { tag }, query });
  return body;
}

test('a booking is drawn once, with its phases and the channels or positions it holds', async () => {
  for (const tag of [chamber, meter]) {
    const { bars, blocks } = await look(tag);
    expect(blocks).toEqual([]);
    expect(bars).toMatchObject([
      {
        bookingId: booking.id,
        isVisible: true,
        state: 'confirmed',
        startAt: booking.startAt,
        endAt: booking.endAt,
      },
    ]);
    const held = bench.chamber.paths.slice(0, booking.paths.length).map((_path, at) => at + 1);
    expect(bars[0]?.rowKey).toBe(`${tag}/${held.join(', ')}`);
    expect(bars[0]?.title).toContain(String(booking.id));
    expect(bars[0]?.phases[0]).toMatchObject({ phase: 'connect', startAt: booking.startAt });
  }
});

test('who does not see the project sees that the place is taken', async () => {
  const stranger = await bench.app.signInAs({ roles: ['engineer'] });
  const { bars } = await look(chamber, week, stranger);
  expect(bars).toMatchObject([
    { bookingId: booking.id, isVisible: false, title: '', atRiskReason: null },
  ]);
});

test('a week with nothing in it is empty', async () => {
  const quiet = { from: '2026-02-02T00:00:00Z', to: '2026-02-09T00:00:00Z' };
  expect(await look(meter, quiet)).toEqual({ bars: [], blocks: [] });
});

test('after its due day an instrument is not bookable, and the week says so', async () => {
  const { blocks } = await look(meter, {
    from: '2027-01-04T00:00:00Z',
    to: '2027-01-18T00:00:00Z',
  });
  expect(blocks).toMatchObject([
    {
      kind: 'not-bookable',
      startAt: '2027-01-10T00:00:00.000Z',
      endAt: '2027-01-18T00:00:00.000Z',
    },
  ]);
  expect(blocks[0]?.sentence).toContain(`${meter} falls due 9 Jan 2027`);
});

test('planned outages and breakdowns close it, each with its reason', async () => {
  const { db } = bench.app;
  const stamps = { createdAt: bench.app.clock.now(), updatedAt: bench.app.clock.now() };
  const during = {
    startMs: Date.parse('2026-03-25T09:00:00Z'),
    endMs: Date.parse('2026-03-25T17:00:00Z'),
  };
  await db.transaction(async (tx) => {
    const outageId = first(
      await tx
        .insert(outagesTable)
        .values({
          siteId: bench.keepers.siteId,
          title: 'Mapping',
          state: 'planned',
          during,
          plannedById: bench.scheduler.personId,
          ...stamps,
        })
        .returning({ id: outagesTable.id }),
    );
    await tx
      .insert(outageInstrumentsTable)
      .values({ outageId, instrumentId: bench.chamber.chamberId });
    await tx.insert(allocationsTable).values(
      bench.chamber.paths.map(({ positionUnitId }) => ({
        unitId: positionUnitId,
        outageId,
        during,
        live: true,
        ...stamps,
      })),
    );
  });
  await bench.app.call(reportBreakdown, bench.engineer, {
    params: { tag: chamber },
    body: { reason: 'Door seal torn.', until: '2026-03-04T12:00:00Z' },
  });
  const { blocks } = await look(chamber, {
    from: '2026-03-01T00:00:00Z',
    to: '2026-04-05T00:00:00Z',
  });
  expect(blocks.map(({ kind, startAt, endAt }) => [kind, startAt, endAt])).toEqual([
    ['outage', '2026-03-25T09:00:00.000Z', '2026-03-25T17:00:00.000Z'],
    ['unavailable', '2026-03-02T08:00:00.000Z', '2026-03-04T12:00:00.000Z'],
  ]);
  expect(blocks[0]?.sentence).toMatch(/^Mapping, until/);
  expect(blocks[1]?.sentence).toMatch(/^Door seal torn\W.*until Wed 4 Mar 12:00/i);
  expect((await look(meter)).blocks).toEqual([]);
});

test('a window that is turned round, empty, too long or no time at all is refused', async () => {
  const windows = [
    { from: week.to, to: week.from },
    { from: week.from, to: week.from },
    { from: '2026-03-01T00:00:00Z', to: '2026-04-07T00:00:00Z' },
    { from: 'Monday', to: week.to },
    { from: week.from },
  ];
  for (const query of windows) {
    const { status, problem } = await bench.app.callRefused(getInstrumentWeek, bench.engineer, {
      params: { tag: chamber },
      query: Object.fromEntries(Object.entries(query)),
    });
    expect([status, problem.code]).toEqual([422, 'input.invalid']);
  }
});

test('the week of an instrument is for people of its site', async () => {
  const elsewhere = await bench.app.signInAs({ roles: ['scheduler@otterholm'] });
  const refusals = await Promise.all([
    bench.app.callRefused(getInstrumentWeek, elsewhere, {
      params: { site: 'otterholm', tag: chamber },
      query: week,
    }),
    bench.app.callRefused(getInstrumentWeek, elsewhere, { params: { tag: chamber }, query: week }),
    bench.app.callRefused(getInstrumentWeek, bench.engineer, {
      params: { tag: 'C98' },
      query: week,
    }),
  ]);
  expect(refusals.map(({ status }) => status)).toEqual([404, 404, 404]);
});
