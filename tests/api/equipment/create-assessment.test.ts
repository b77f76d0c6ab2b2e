import { eq } from 'drizzle-orm';
import { afterAll, beforeAll, expect, test } from 'vitest';
import type { z } from 'zod';
import { stabilityAssessmentsTable } from '#server/db/tables/stability-assessment.table.ts';
import { listAuditEvents } from '#shared/contracts/audit.contract.ts';
import { getBooking } from '#shared/contracts/bookings.contract.ts';
import { createAssessment } from '#shared/contracts/equipment.contract.ts';
import { buildBench } from '#tests/support/build-bench.ts';
import type { Bench } from '#tests/support/build-bench.ts';
import { buildInstrument } from '#tests/support/build-instrument.ts';
import { startTestApp } from '#tests/support/test-app.ts';
import type { TestPerson } from '#tests/support/test-app.ts';

let bench: Bench;
let metrologist: TestPerson;
let tag = '';
beforeAll(async () => {
  bench = await buildBench(await startTestApp());
  metrologist = await bench.app.signInAs({ roles: ['metrologist'], name: 'Mia Metrologist' });
  tag = bench.chamber.chamberTag;
  await buildInstrument(bench.app.db, {
    siteId: bench.keepers.siteId,
    tag: 'L91',
    kind: 'logger',
  });
});
afterAll(() => bench.app.stop());

type Wish = z.input<typeof createAssessment.body>;
const judged: Wish = {
  setTemperatureC: 35.5,
  assessedOn: '2026-03-02',
  hoursLogged: 96,
  driftKPerH: 0.0007,
  halfBandK: 0.001,
  periodS: 540,
  resolutionK: 0.001,
  sensorPlace: 'beside the middle cell',
  loggerTag: 'L91',
  isDoorTolerant: false,
  note: 'quiet weekend',
};

const enter = (change: Partial<Wish> = {}) =>
  bench.app.call(createAssessment, metrologist, {
    params: { tag },
    body: { ...judged, ...change },
  });

test('what a log showed is kept and stands first among the chamber’s logs', async () => {
  const { body, status } = await enter();
  expect(status).toBe(201);
  expect(body.assessments).toHaveLength(3);
  expect(body.assessments[0]).toMatchObject({
    setTemperatureC: 35.5,
    assessedOn: '2026-03-02',
    hoursLogged: 96,
    driftKPerH: 0.0007,
    halfBandK: 0.001,
    periodS: 540,
    resolutionK: 0.001,
    sensorPlace: 'beside the middle cell',
    isTooOld: false,
    assessedBy: 'Mia Metrologist',
  });
  const { db } = bench.app;
  const [row] = await db
    .select()
    .from(stabilityAssessmentsTable)
    .where(eq(stabilityAssessmentsTable.setTempMdegc, 35_500));
  expect(row).toMatchObject({ doorTolerant: false, note: 'quiet weekend' });
  expect(row?.loggerId).not.toBeNull();
  const auditor = await bench.app.signInAs({ roles: ['auditor'] });
  const trail = await bench.app.call(listAuditEvents, auditor, {
    query: { subjectKind: 'stability-assessment' },
  });
  expect(trail.body.items).toMatchObject([
    { action: 'stability.assess', actor: { id: metrologist.personId }, after: { tag } },
  ]);
});

test('a log without period and logger is as good as its other figures', async () => {
  const { body } = await enter({ setTemperatureC: -10, loggerTag: null, periodS: null });
  expect(body.assessments.find((each) => each.setTemperatureC === -10)).toMatchObject({
    periodS: null,
  });
});

test('a log that shows a drifting chamber puts its bookings at risk; a quiet one clears them', async () => {
  const booking = await bench.book(await bench.request(), { startAt: '2026-03-05T09:00:00.000Z' });
  const at = booking.setTemperatureC;
  const look = async () =>
    (await bench.app.call(getBooking, bench.scheduler, { params: { id: booking.id } })).body;

  await enter({ setTemperatureC: at, driftKPerH: 2 });
  expect(await look()).toMatchObject({ isAtRisk: true });
  await enter({ setTemperatureC: at, driftKPerH: 0.0005, halfBandK: 0.0005 });
  expect(await look()).toMatchObject({ isAtRisk: false, atRiskReason: null });
});

test('a day to come, a logger nobody has and figures without sense are refused where they stand', async () => {
  const cases = [
    [{ assessedOn: '2026-03-03' }, '#/assessedOn'],
    [{ loggerTag: 'L77' }, '#/loggerTag'],
    [{ loggerTag: tag }, '#/loggerTag'],
    [{ hoursLogged: 0 }, '#/hoursLogged'],
    [{ driftKPerH: -0.1 }, '#/driftKPerH'],
    [{ resolutionK: 0 }, '#/resolutionK'],
    [{ periodS: 0 }, '#/periodS'],
    [{ setTemperatureC: 200 }, '#/setTemperatureC'],
    [{ sensorPlace: ' ' }, '#/sensorPlace'],
  ] as const;
  for (const [change, pointer] of cases) {
    const { status, problem } = await bench.app.callRefused(createAssessment, metrologist, {
      params: { tag },
      body: { ...judged, ...change },
    });
    expect([pointer, status, problem.code]).toEqual([pointer, 422, 'input.invalid']);
    expect(problem.errors?.map((fault) => fault.pointer)).toEqual([pointer]);
  }
});

test('the day is the site’s: late in the evening in UTC it may be tomorrow there already', async () => {
  bench.app.clock.set('2026-07-01T23:30:00Z');
  const { body } = await enter({ setTemperatureC: 60, assessedOn: '2026-07-02' });
  expect(body.assessments[0]).toMatchObject({ assessedOn: '2026-07-02', setTemperatureC: 60 });
  bench.app.clock.set('2026-03-02T08:00:00Z');
});

test('only a chamber has logs of its stability', async () => {
  const { status, problem } = await bench.app.callRefused(createAssessment, metrologist, {
    params: { tag: tag.replace('C', 'M') },
    body: judged,
  });
  expect([status, problem.code]).toEqual([409, 'instrument.state']);
});

test('a repeat with the same key keeps one log', async () => {
  const input = {
    params: { tag },
    body: { ...judged, setTemperatureC: 70 },
    idempotencyKey: '0c6f3c2a-4d0f-4f8e-9d13-55a1b8f0e7aa',
  };
  const one = await bench.app.call(createAssessment, metrologist, input);
  const two = await bench.app.call(createAssessment, metrologist, input);
  expect(two.body).toEqual(one.body);
  expect(two.body.assessments.filter((each) => each.setTemperatureC === 70)).toHaveLength(1);
});

test('metrologists of the site assess; others do not', async () => {
  const elsewhere = await bench.app.signInAs({ roles: ['metrologist@otterholm'] });
  const refusals = await Promise.all([
    bench.app.callRefused(createAssessment, bench.scheduler, { params: { tag }, body: judged }),
    bench.app.callRefused(createAssessment, elsewhere, {
      params: { site: 'otterholm', tag },
      body: { ...judged, loggerTag: null },
    }),
    bench.app.callRefused(createAssessment, metrologist, { params: { tag: 'C98' }, body: judged }),
  ]);
  expect(refusals.map(({ status }) => status)).toEqual([403, 404, 404]);
});
