import { eq } from 'drizzle-orm';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { bookingsTable } from '#server/db/tables/booking.table.ts';
import { deviationsTable } from '#server/db/tables/check-result.table.ts';
import { requestsTable } from '#server/db/tables/request.table.ts';
import { getToday } from '#shared/contracts/board.contract.ts';
import { proposeOffer } from '#shared/contracts/offers.contract.ts';
import { calibrate } from '#tests/support/build-bookable.ts';
import { buildBench } from '#tests/support/build-bench.ts';
import type { Bench } from '#tests/support/build-bench.ts';
import { buildInstrument } from '#tests/support/build-instrument.ts';
import { startTestApp } from '#tests/support/test-app.ts';
import type { TestPerson } from '#tests/support/test-people.ts';

let bench: Bench;
let stranger: TestPerson;
beforeAll(async () => {
  bench = await buildBench(await startTestApp());
  stranger = await bench.app.signInAs({ roles: ['engineer'] });
});
afterAll(() => bench.app.stop());

async function waitsOf(person: TestPerson) {
  const { body } = await bench.app.call(getToday, person);
  return body.waits;
}

/** What waits because of one record. */
async function waitsFor(person: TestPerson, href: string) {
  return (await waitsOf(person)).filter((wait) => wait.href === href);
}

test('a submitted request waits for the scheduler, a draft for its author alone', async () => {
  const asked = await bench.request({
    request: { neededByAt: new Date('2026-03-20T17:00:00Z') },
  });
  const draft = await bench.request({ request: { state: 'draft', submittedAt: null } });
  const askedHref = `/requests/${asked.requestId}`;
  const draftHref = `/requests/${draft.requestId}`;
  expect(await waitsFor(bench.scheduler, askedHref)).toMatchObject([
    {
      kind: 'request',
      what: `Request ${asked.requestId} wants a slot`,
      why: 'Enid Engineer asked and needs it by 20 Mar 2026.',
      since: '2026-02-20T09:00:00.000Z',
    },
  ]);
  expect(await waitsFor(bench.engineer, askedHref)).toEqual([]);
  expect(await waitsFor(bench.engineer, draftHref)).toMatchObject([{ kind: 'draft' }]);
  expect(await waitsFor(bench.scheduler, draftHref)).toEqual([]);
  expect(await waitsOf(stranger)).toEqual([]);
});

test('a declined request is back with its author, with the reason', async () => {
  const back = await bench.request({
    request: { state: 'draft', submittedAt: null, declineReason: 'Say how the cells rested.' },
  });
  expect(await waitsFor(bench.engineer, `/requests/${back.requestId}`)).toMatchObject([
    { kind: 'draft', why: 'Sent back: Say how the cells rested.' },
  ]);
});

test('a proposed slot asks the scheduler for the booking', async () => {
  const made = await bench.request();
  const { placement } = await bench.offer(made);
  await bench.app.call(proposeOffer, bench.engineer, {
    params: { id: made.requestId, lotId: made.lotId },
    body: { placement, offeredAt: '2026-03-02T08:00:00.000Z', version: made.version },
  });
  expect(await waitsFor(bench.scheduler, `/requests/${made.requestId}`)).toMatchObject([
    { kind: 'proposal', action: 'Look and book' },
  ]);
});

test('a booking at risk waits for the scheduler and its owner, one that starts soon for its owner', async () => {
  const made = await bench.book(await bench.request(), { startAt: '2026-03-05T09:00:00.000Z' });
  const href = `/bookings/${made.id}`;
  expect(await waitsFor(bench.engineer, href)).toEqual([]);
  bench.app.clock.set('2026-03-04T08:00:00Z');
  expect(await waitsFor(bench.engineer, href)).toMatchObject([{ kind: 'booking' }]);
  expect(await waitsFor(bench.scheduler, href)).toEqual([]);
  bench.app.clock.set('2026-03-02T08:00:00Z');
  await bench.app.db
    .update(bookingsTable)
    .set({ atRisk: true, atRiskReason: 'M11 is out of service.' })
    .where(eq(bookingsTable.id, made.id));
  expect(await waitsFor(bench.scheduler, href)).toMatchObject([
    { kind: 'at-risk', why: 'M11 is out of service.', action: 'Move or cancel' },
  ]);
  expect(await waitsFor(bench.engineer, href)).toMatchObject([{ kind: 'at-risk' }]);
  expect(await waitsFor(stranger, href)).toEqual([]);
});

test('a calibration waits for a second person, never for who recorded it', async () => {
  const author = await bench.app.signInAs({ roles: ['metrologist'], name: 'Ann Author' });
  const second = await bench.app.signInAs({ roles: ['metrologist'] });
  const id = await calibrate(
    bench.app.db,
    { ...bench.keepers, authorId: author.personId },
    bench.chamber.meterInstrumentId,
    'measure',
    { state: 'awaiting-approval', decidedById: null, decidedAt: null },
  );
  const href = `/metrology/calibrations/${id}`;
  expect(await waitsFor(second, href)).toMatchObject([
    { kind: 'second-signature', why: 'Ann Author recorded it; it counts once you have signed.' },
  ]);
  expect(await waitsFor(author, href)).toEqual([]);
  expect(await waitsFor(bench.scheduler, href)).toEqual([]);
});

test('what awaits release waits for the metrologists of its site', async () => {
  await buildInstrument(bench.app.db, {
    tag: 'S97',
    kind: 'source',
    siteId: bench.keepers.siteId,
    state: 'awaiting-release',
    note: 'Delivered on Monday.',
  });
  const here = await bench.app.signInAs({ roles: ['metrologist'] });
  expect(await waitsFor(here, '/equipment/S97')).toMatchObject([
    { kind: 'release', why: 'Delivered on Monday.' },
  ]);
  expect(await waitsFor(bench.engineer, '/equipment/S97')).toEqual([]);
});

test('a deviation waits for who may grant it, and not for who asked', async () => {
  const asked = new Date('2026-02-25T09:00:00Z');
  const manager = await bench.app.signInAs({ roles: ['manager', 'engineer'] });
  /** The link to a request for which somebody asks that a rule be lifted. */
  const ask = async (requestedById: number) => {
    const { requestId } = await bench.request();
    await bench.app.db.insert(deviationsTable).values({
      requestId,
      checkCode: 'stability-logged',
      state: 'asked',
      reason: 'The chamber has been quiet for years.',
      requestedById,
      requestedAt: asked,
      createdAt: asked,
      updatedAt: asked,
    });
    return `/requests/${requestId}`;
  };
  const byEngineer = await ask(bench.engineer.personId);
  expect(await waitsFor(manager, byEngineer)).toMatchObject([
    {
      kind: 'deviation',
      why: 'Enid Engineer: The chamber has been quiet for years.',
      since: asked.toISOString(),
      action: 'Answer',
    },
  ]);
  expect(await waitsFor(bench.engineer, byEngineer)).toEqual([]);
  expect(await waitsFor(manager, await ask(manager.personId))).toEqual([]);
});

test('what waits longest comes first', async () => {
  const old = await bench.request({
    request: { submittedAt: new Date('2026-01-10T09:00:00Z') },
  });
  const waits = await waitsOf(bench.scheduler);
  expect(waits[0]?.href).toBe(`/requests/${old.requestId}`);
  const since = waits.map((wait) => wait.since);
  expect(since).toEqual(since.toSorted((a, b) => a.localeCompare(b)));
  await bench.app.db
    .update(requestsTable)
    .set({ state: 'withdrawn' })
    .where(eq(requestsTable.id, old.requestId));
  expect(await waitsFor(bench.scheduler, `/requests/${old.requestId}`)).toEqual([]);
});
