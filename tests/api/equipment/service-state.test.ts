import { eq } from 'drizzle-orm';
import { afterAll, afterEach, beforeAll, beforeEach, expect, test } from 'vitest';
import { instrumentsTable } from '#server/db/tables/instrument.table.ts';
import { unavailabilitiesTable } from '#server/db/tables/outage.table.ts';
import { listAuditEvents } from '#shared/contracts/audit.contract.ts';
import { getBooking } from '#shared/contracts/bookings.contract.ts';
import {
  getInstrument,
  reportBreakdown,
  returnToService,
  takeOutOfService,
} from '#shared/contracts/equipment.contract.ts';
import { buildBench } from '#tests/support/build-bench.ts';
import type { Bench } from '#tests/support/build-bench.ts';
import { buildInstrument } from '#tests/support/build-instrument.ts';
import { startTestApp } from '#tests/support/test-app.ts';
import type { TestApp, TestPerson } from '#tests/support/test-app.ts';

let app: TestApp;
let metrologist: TestPerson;
let bench: Bench;
let source = '';
beforeAll(async () => {
  app = await startTestApp();
  metrologist = await app.signInAs({ roles: ['metrologist'], name: 'Mia Metrologist' });
});
beforeEach(async () => {
  bench = await buildBench(app);
  source = bench.chamber.chamberTag.replace('C', 'S');
});
afterEach(async () => {
  // Only a few chambers are offered at once: this one makes room for the next test's.
  await app.db
    .update(instrumentsTable)
    .set({ state: 'retired' })
    .where(eq(instrumentsTable.id, bench.chamber.chamberId));
});
afterAll(() => app.stop());

const thursday = { startAt: '2026-03-05T09:00:00.000Z' };

function takeOut(tag: string, change: { readonly version?: number; until?: string | null } = {}) {
  return app.call(takeOutOfService, metrologist, {
    params: { tag },
    body: { version: 1, reason: 'fan fails', until: null, ...change },
  });
}

async function standing(bookingId: number) {
  const { body } = await app.call(getBooking, bench.scheduler, { params: { id: bookingId } });
  return { isAtRisk: body.isAtRisk, reason: body.atRiskReason };
}

test('out of service at once: its bookings are at risk, and its return clears them', async () => {
  const booking = await bench.book(await bench.request(), thursday);

  const out = await takeOut(source);
  expect(out.body.instrument).toMatchObject({
    state: 'out-of-service',
    badge: 'out-of-service',
    version: 2,
    unavailability: [
      {
        kind: 'withdrawn',
        from: '2026-03-02T08:00:00.000Z',
        until: null,
        reason: 'fan fails',
        reportedBy: 'Mia Metrologist',
      },
    ],
  });
  expect(out.body.affected).toMatchObject([
    { id: booking.id, isAtRisk: true, atRiskReason: `${source}/1 is out of service.` },
  ]);
  expect(await standing(booking.id)).toMatchObject({ isAtRisk: true });
  await expect(bench.offer(await bench.request())).rejects.toThrow('No offer');

  const back = await app.call(returnToService, metrologist, {
    params: { tag: source },
    body: { version: 2, note: 'fan replaced' },
  });
  expect(back.body.instrument).toMatchObject({
    state: 'in-service',
    badge: 'in-date',
    version: 3,
    unavailability: [],
  });
  expect(back.body.affected).toMatchObject([{ id: booking.id, isAtRisk: false }]);
  expect(await standing(booking.id)).toEqual({ isAtRisk: false, reason: null });
  await expect(bench.offer(await bench.request())).resolves.toBeDefined();
});

test('the trail keeps who took it out, why, and what it did to the bookings', async () => {
  const booking = await bench.book(await bench.request(), thursday);
  await takeOut(source);
  const auditor = await app.signInAs({ roles: ['auditor'] });
  const { body } = await app.call(listAuditEvents, auditor, {
    query: { subjectKind: 'instrument', limit: 1 },
  });
  expect(body.items).toMatchObject([
    {
      actor: { id: metrologist.personId },
      action: 'equipment.take-out-of-service',
      before: { state: 'in-service' },
      after: { state: 'out-of-service', reason: 'fan fails', until: null },
    },
  ]);
  const risks = await app.call(listAuditEvents, auditor, {
    query: { subjectKind: 'booking', limit: 1 },
  });
  expect(risks.body.items).toMatchObject([
    { action: 'booking.at-risk', actor: { id: metrologist.personId } },
  ]);
  expect(risks.body.items[0]?.subjectId).toBe(booking.id);
});

test('a booking at risk for another reason too stays at risk, with that reason', async () => {
  const booking = await bench.book(await bench.request(), thursday);
  const meter = source.replace('S', 'M');
  await takeOut(source);
  await app.call(reportBreakdown, metrologist, {
    params: { tag: meter },
    body: { reason: 'display dark', until: null },
  });
  const back = await app.call(returnToService, metrologist, {
    params: { tag: source },
    body: { version: 2, note: '' },
  });
  expect(back.body.affected).toMatchObject([{ id: booking.id, isAtRisk: true }]);
  const { isAtRisk, reason } = await standing(booking.id);
  expect(isAtRisk).toBe(true);
  expect(reason).toContain(`${meter}/1 is unavailable: display dark`);
});

test('what befalls a mainframe befalls all that is mounted in it', async () => {
  const tag = source.replace('S', 'F');
  const parentId = await buildInstrument(app.db, {
    siteId: bench.keepers.siteId,
    tag,
    kind: 'mainframe',
  });
  await app.db
    .update(instrumentsTable)
    .set({ parentId })
    .where(eq(instrumentsTable.id, bench.chamber.sourceInstrumentId));
  const booking = await bench.book(await bench.request(), thursday);

  const out = await takeOut(tag);
  expect(out.body.affected.map(({ id }) => id)).toEqual([booking.id]);
  const child = await app.call(getInstrument, bench.engineer, { params: { tag: source } });
  expect(child.body).toMatchObject({ badge: 'out-of-service', parentTag: tag });
  expect(child.body.unavailability.map(({ reason }) => reason)).toEqual(['fan fails']);

  const back = await app.call(returnToService, metrologist, {
    params: { tag },
    body: { version: 2, note: '' },
  });
  expect(back.body.affected).toMatchObject([{ id: booking.id, isAtRisk: false }]);

  const broken = await app.call(reportBreakdown, bench.engineer, {
    params: { tag },
    body: { reason: 'smells burnt', until: null },
  });
  expect(broken.body.affected).toMatchObject([{ id: booking.id, isAtRisk: true }]);
});

test('a breakdown with an end puts only the bookings before that end at risk', async () => {
  const early = await bench.book(await bench.request(), thursday);
  const late = await bench.book(await bench.request(), { startAt: '2026-03-12T09:00:00.000Z' });
  const answer = await app.call(reportBreakdown, bench.engineer, {
    params: { tag: bench.chamber.chamberTag },
    body: { reason: 'door seal torn', until: '2026-03-10T12:00:00Z' },
  });
  expect(answer.status).toBe(201);
  expect(answer.body.affected.map(({ id }) => id)).toEqual([early.id]);
  expect(answer.body.instrument).toMatchObject({
    state: 'in-service',
    version: 1,
    unavailability: [{ kind: 'breakdown', until: '2026-03-10T12:00:00.000Z' }],
  });
  expect(await standing(late.id)).toEqual({ isAtRisk: false, reason: null });

  const back = await app.call(returnToService, metrologist, {
    params: { tag: bench.chamber.chamberTag },
    body: { version: 1, note: 'seal replaced' },
  });
  expect(back.body.instrument.unavailability).toEqual([]);
  expect(back.body.affected).toMatchObject([{ id: early.id, isAtRisk: false }]);
});

test('who does not see the project learns that a booking is touched, not whose', async () => {
  const booking = await bench.book(await bench.request(), thursday);
  const stranger = await app.signInAs({ roles: ['engineer'] });
  const { body } = await app.call(reportBreakdown, stranger, {
    params: { tag: source },
    body: { reason: 'beeps', until: null },
  });
  expect(body.affected).toMatchObject([
    { id: booking.id, isVisible: false, projectName: null, atRiskReason: null },
  ]);
});

test('a repeat with the same key acts once and gives the same answer', async () => {
  const input = {
    params: { tag: source },
    body: { reason: 'beeps', until: null },
    idempotencyKey: '6f0ddcb4-4b79-4a65-8a2c-8a6f6e0f5a11',
  };
  const one = await app.call(reportBreakdown, bench.engineer, input);
  const two = await app.call(reportBreakdown, bench.engineer, input);
  expect(two.body).toEqual(one.body);
  const rows = await app.db
    .select()
    .from(unavailabilitiesTable)
    .where(eq(unavailabilitiesTable.instrumentId, bench.chamber.sourceInstrumentId));
  expect(rows).toHaveLength(1);
});

test('an old version is refused with the instrument as it stands, and nothing is written', async () => {
  await takeOut(source);
  await app.call(returnToService, metrologist, {
    params: { tag: source },
    body: { version: 2, note: '' },
  });
  const { status, problem } = await app.callRefused(takeOutOfService, metrologist, {
    params: { tag: source },
    body: { version: 2, reason: 'fan fails', until: null },
  });
  expect(status).toBe(409);
  expect(problem).toMatchObject({
    code: 'version.stale',
    current: { tag: source, state: 'in-service', version: 3, unavailability: [] },
  });
});

test('two who take it out at once: one does, the other is told', async () => {
  const answers = await Promise.all(
    [metrologist, bench.scheduler].map((person) =>
      app.send(takeOutOfService, person, {
        params: { tag: source },
        body: { version: 1, reason: 'fan fails', until: null },
      }),
    ),
  );
  expect(answers.map(({ status }) => status).toSorted()).toEqual([200, 409]);
});

test('what is not in service is not taken out, and what is in service is not returned', async () => {
  const inService = await app.callRefused(returnToService, metrologist, {
    params: { tag: source },
    body: { version: 1, note: '' },
  });
  expect([inService.status, inService.problem.code]).toEqual([409, 'instrument.state']);
  await takeOut(source);
  const twice = await app.callRefused(takeOutOfService, metrologist, {
    params: { tag: source },
    body: { version: 2, reason: 'again', until: null },
  });
  expect([twice.status, twice.problem.code]).toEqual([409, 'instrument.state']);

  await app.db
    .update(instrumentsTable)
    .set({ state: 'retired' })
    .where(eq(instrumentsTable.id, bench.chamber.sourceInstrumentId));
  const retired = await Promise.all(
    [
      [takeOutOfService, { version: 2, reason: 'again', until: null }] as const,
      [returnToService, { version: 2, note: '' }] as const,
    ].map(([contract, body]) =>
      app.callRefused(contract, metrologist, { params: { tag: source }, body }),
    ),
  );
  expect(retired.map(({ problem }) => problem.code)).toEqual([
    'instrument.state',
    'instrument.state',
  ]);
});

test('a new instrument is released into service', async () => {
  const tag = source.replace('S', 'L');
  await buildInstrument(app.db, {
    siteId: bench.keepers.siteId,
    tag,
    kind: 'logger',
    state: 'awaiting-release',
  });
  const { body } = await app.call(returnToService, metrologist, {
    params: { tag },
    body: { version: 1, note: 'checked on arrival' },
  });
  expect(body).toMatchObject({
    instrument: { state: 'in-service', badge: 'not-calibrated', version: 2 },
    affected: [],
  });
  const [row] = await app.db.select().from(instrumentsTable).where(eq(instrumentsTable.tag, tag));
  expect(row).toMatchObject({
    releasedById: metrologist.personId,
    releasedAt: new Date('2026-03-02T08:00:00Z'),
  });
});

test('an end that is over is refused where it stands in the form', async () => {
  for (const [contract, body] of [
    [takeOutOfService, { version: 1, reason: 'fan fails', until: '2026-03-02T08:00:00Z' }],
    [reportBreakdown, { reason: 'fan fails', until: '2026-03-01T08:00:00Z' }],
  ] as const) {
    const { status, problem } = await app.callRefused(contract, metrologist, {
      params: { tag: source },
      body,
    });
    expect(status).toBe(422);
    expect(problem.errors?.map(({ pointer }) => pointer)).toEqual(['#/until']);
  }
  const short = await app.callRefused(reportBreakdown, metrologist, {
    params: { tag: source },
    body: { reason: 'x', until: null },
  });
  expect(short.problem.errors?.map(({ pointer }) => pointer)).toEqual(['#/reason']);
});

test('engineers report but neither take out nor release; schedulers take out but do not release', async () => {
  const out = { version: 1, reason: 'fan fails', until: null };
  const back = { version: 1, note: '' };
  const manager = await app.signInAs({ roles: ['manager'] });
  const refusals = await Promise.all([
    app.callRefused(takeOutOfService, bench.engineer, { params: { tag: source }, body: out }),
    app.callRefused(returnToService, bench.engineer, { params: { tag: source }, body: back }),
    app.callRefused(returnToService, bench.scheduler, { params: { tag: source }, body: back }),
    app.callRefused(reportBreakdown, manager, {
      params: { tag: source },
      body: { reason: 'beeps', until: null },
    }),
  ]);
  expect(refusals.map(({ status }) => status)).toEqual([403, 403, 403, 403]);
  const { status } = await app.call(takeOutOfService, bench.scheduler, {
    params: { tag: source },
    body: out,
  });
  expect(status).toBe(200);
});

test('an instrument of another site is not there, whatever one is at one’s own', async () => {
  const elsewhere = await app.signInAs({ roles: ['metrologist@otterholm'] });
  for (const [contract, body] of [
    [takeOutOfService, { version: 1, reason: 'fan fails', until: null }],
    [returnToService, { version: 1, note: '' }],
    [reportBreakdown, { reason: 'fan fails', until: null }],
  ] as const) {
    const there = { params: { site: 'otterholm', tag: source }, body };
    const here = { params: { tag: source }, body };
    const answers = [
      await app.callRefused(contract, elsewhere, there),
      await app.callRefused(contract, elsewhere, here),
    ];
    expect(answers.map(({ status }) => status)).toEqual([404, 404]);
  }
});
