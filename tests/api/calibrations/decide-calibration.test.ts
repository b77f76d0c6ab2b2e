import { eq } from 'drizzle-orm';
import { afterAll, afterEach, beforeAll, beforeEach, expect, test } from 'vitest';
import type { z } from 'zod';
import { dutiesTable } from '#server/db/tables/calibration.table.ts';
import { instrumentsTable } from '#server/db/tables/instrument.table.ts';
import { listAuditEvents } from '#shared/contracts/audit.contract.ts';
import { confirmBooking, getBooking } from '#shared/contracts/bookings.contract.ts';
import {
  approveCalibration,
  getCalibration,
  listCalibrations,
  listDuties,
  recordCalibration,
  refuseCalibration,
} from '#shared/contracts/calibrations.contract.ts';
import type { CalibrationDto } from '#shared/contracts/calibrations.contract.ts';
import { getInstrument } from '#shared/contracts/equipment.contract.ts';
import { buildBench } from '#tests/support/build-bench.ts';
import type { Bench } from '#tests/support/build-bench.ts';
import { buildInstrument } from '#tests/support/build-instrument.ts';
import { calibrationWish } from '#tests/support/calibration-wish.ts';
import { startTestApp } from '#tests/support/test-app.ts';
import type { TestApp, TestPerson } from '#tests/support/test-app.ts';

type Wish = z.input<typeof recordCalibration.body>;

let app: TestApp;
let recorder: TestPerson;
let approver: TestPerson;
let bench: Bench;
let meter = '';
beforeAll(async () => {
  app = await startTestApp();
  recorder = await app.signInAs({ roles: ['metrologist'], name: 'Mia Metrologist' });
  approver = await app.signInAs({ roles: ['metrologist'], name: 'Max Metrologist' });
});
beforeEach(async () => {
  bench = await buildBench(app);
  meter = bench.chamber.chamberTag.replace('C', 'M');
  await app.db.insert(dutiesTable).values({
    instrumentId: bench.chamber.meterInstrumentId,
    kind: 'calibration',
    intervalMonths: 12,
    nextDueOn: '2027-01-09',
    createdAt: app.clock.now(),
    updatedAt: app.clock.now(),
  });
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
const failed = {
  conformityAsFound: 'does-not-conform',
  conformityAsLeft: 'does-not-conform',
} as const;

async function record(change: Partial<Wish> = {}): Promise<CalibrationDto> {
  return (await app.call(recordCalibration, recorder, { body: calibrationWish(meter, change) }))
    .body;
}
const approve = ({ id, version }: CalibrationDto, person = approver) =>
  app.call(approveCalibration, person, { params: { id }, body: { version } });

const look = async (tag = meter) =>
  (await app.call(getInstrument, bench.engineer, { params: { tag } })).body;
const dutyOf = async (tag = meter) =>
  (await app.call(listDuties, bench.engineer, { query: { text: tag } })).body.items[0];

test('approved by a second person, a calibration moves badge, due day and duty at once', async () => {
  const made = await record();
  expect(await look()).toMatchObject({ badge: 'in-date', dueOn: '2027-01-09' });
  expect(await dutyOf()).toMatchObject({ awaitingApprovalId: made.id, dueOn: '2027-01-09' });

  const { body } = await approve(made);
  expect(body.calibration).toMatchObject({
    id: made.id,
    state: 'approved',
    decidedBy: { id: approver.personId, name: 'Max Metrologist' },
    decidedAt: '2026-03-02T08:00:00.000Z',
    version: 2,
  });
  expect(body.affected).toEqual([]);
  expect(await look()).toMatchObject({ badge: 'in-date', dueOn: '2027-03-01' });
  expect(await dutyOf()).toMatchObject({
    dueOn: '2027-03-01',
    daysLeft: 364,
    awaitingApprovalId: null,
    lastCalibrationId: made.id,
  });
  const [duty] = await app.db
    .select()
    .from(dutiesTable)
    .where(eq(dutiesTable.instrumentId, bench.chamber.meterInstrumentId));
  expect(duty?.nextDueOn).toBe('2027-03-01');
});

test('left not conforming, it takes the instrument out of calibration and its bookings are at risk', async () => {
  const booking = await bench.book(await bench.request(), thursday);
  const { body } = await approve(await record(failed));
  expect(body.affected).toMatchObject([{ id: booking.id, isAtRisk: true }]);
  expect(body.affected[0]?.atRiskReason).toMatch(/calibrat/);
  // In date to the end of the day before: it counts from the start of the day it was performed.
  expect(await look()).toMatchObject({ badge: 'overdue', dueOn: '2026-03-01' });
  expect(await dutyOf()).toMatchObject({ badge: 'overdue', dueOn: '2026-03-01', daysLeft: -1 });
  await expect(bench.offer(await bench.request())).rejects.toThrow('No offer');

  const repaired = await approve(await record({ certificateNumber: 'CB-2205' }));
  expect(repaired.body.affected).toMatchObject([{ id: booking.id, isAtRisk: false }]);
  expect(await look()).toMatchObject({ badge: 'in-date', dueOn: '2027-03-01' });
  expect(await dutyOf()).toMatchObject({ badge: 'in-date', dueOn: '2027-03-01' });
});

test('a calibration of one channel that fails leaves the others bookable', async () => {
  const scopes = (await look()).scopes;
  const [first] = scopes;
  await approve(
    await record({
      ...failed,
      scopes: [
        {
          channelId: first?.channelId ?? 0,
          function: 'measure',
          meterRangeId: first?.meterRangeId ?? 0,
          limitation: null,
        },
      ],
    }),
  );
  expect((await look()).scopes.map(({ badge }) => badge)).toEqual([
    'overdue',
    'in-date',
    'in-date',
    'in-date',
  ]);
});

test('a due day before a booking’s end puts it at risk, one after it clears it', async () => {
  const booking = await bench.book(await bench.request(), thursday);
  const short = await approve(await record({ dueOn: '2026-03-04' }));
  expect(short.body.affected).toMatchObject([{ id: booking.id, isAtRisk: true }]);
  expect(await dutyOf()).toMatchObject({
    badge: 'due-soon',
    dueOn: '2026-03-04',
    daysLeft: 2,
    bookingsPastDue: 1,
    atRisk: 1,
  });
  const long = await approve(await record({ dueOn: '2026-06-30' }));
  expect(long.body.affected).toMatchObject([{ id: booking.id, isAtRisk: false }]);
});

test('a limited calibration limits, with its words', async () => {
  await approve(
    await record({
      scopes: [
        {
          channelId: null,
          function: 'measure',
          meterRangeId: null,
          limitation: 'above 1 µA only',
        },
      ],
    }),
  );
  const { badge, scopes } = await look();
  expect(badge).toBe('limited');
  expect(scopes.map(({ limitation }) => limitation)).toEqual(Array(4).fill('above 1 µA only'));
});

test('a correction replaces the record it names, and only once', async () => {
  const original = await approve(await record({ dueOn: '2028-03-01' }));
  const replacesId = original.body.calibration.id;
  const [one, other] = [
    await record({ dueOn: '2027-02-01', replacesId }),
    await record({ dueOn: '2027-01-31', replacesId }),
  ];
  await approve(one);
  expect(await look()).toMatchObject({ dueOn: '2027-02-01' });
  const old = await app.call(getCalibration, recorder, { params: { id: replacesId } });
  expect(old.body).toMatchObject({ state: 'replaced', replacedById: one.id, dueOn: '2028-03-01' });

  const late = await app.callRefused(approveCalibration, approver, {
    params: { id: other.id },
    body: { version: 1 },
  });
  expect([late.status, late.problem.code]).toEqual([409, 'calibration.state']);
  expect(late.problem).toMatchObject({ current: { id: other.id, state: 'awaiting-approval' } });
  expect(await look()).toMatchObject({ dueOn: '2027-02-01' });
});

test('who recorded it does not decide about it, whatever roles they hold', async () => {
  const both = await app.signInAs({ roles: ['metrologist', 'manager'] });
  const made = await app.call(recordCalibration, both, { body: calibrationWish(meter) });
  const params = { id: made.body.id };
  const refusals = await Promise.all([
    app.callRefused(approveCalibration, both, { params, body: { version: 1 } }),
    app.callRefused(refuseCalibration, both, { params, body: { version: 1, reason: 'mine' } }),
  ]);
  expect(refusals.map(({ status, problem }) => [status, problem.code])).toEqual([
    [409, 'calibration.same-person'],
    [409, 'calibration.same-person'],
  ]);
  const manager = await app.signInAs({ roles: ['manager'] });
  expect((await approve(made.body, manager)).body.calibration.state).toBe('approved');
});

test('refused with its reason, it counts for nothing and stays as it was', async () => {
  const booking = await bench.book(await bench.request(), thursday);
  const made = await record(failed);
  const { body } = await app.call(refuseCalibration, approver, {
    params: { id: made.id },
    body: { version: 1, reason: 'wrong certificate attached' },
  });
  expect(body).toMatchObject({
    calibration: {
      state: 'refused',
      refusalReason: 'wrong certificate attached',
      decidedBy: { id: approver.personId },
      version: 2,
    },
    affected: [],
  });
  expect(await look()).toMatchObject({ badge: 'in-date', dueOn: '2027-01-09' });
  const seen = await app.call(getBooking, bench.scheduler, { params: { id: booking.id } });
  expect(seen.body.isAtRisk).toBe(false);
});

test('the trail keeps who recorded, who decided and why', async () => {
  const made = await record();
  await app.call(refuseCalibration, approver, {
    params: { id: made.id },
    body: { version: 1, reason: 'wrong certificate attached' },
  });
  const auditor = await app.signInAs({ roles: ['auditor'] });
  const trail = await app.call(listAuditEvents, auditor, {
    query: { subjectKind: 'calibration', subjectId: made.id },
  });
  expect(trail.body.items).toMatchObject([
    {
      action: 'calibration.refuse',
      actor: { id: approver.personId },
      before: { state: 'awaiting-approval' },
      after: { state: 'refused', refusalReason: 'wrong certificate attached' },
    },
    { action: 'calibration.record', actor: { id: recorder.personId } },
  ]);
});

test.each(['M', 'L'])(
  'two who decide about %s at once: one does, the other is told',
  async (kind) => {
    const tag = meter.replace('M', kind);
    if (kind === 'L') {
      // Nothing of it can be booked, so that there is no unit to wait at.
      await buildInstrument(app.db, { siteId: bench.keepers.siteId, tag, kind: 'logger' });
    }
    const use = kind === 'L' ? 'temperature' : 'measure';
    const scopes = [
      { channelId: null, function: use, meterRangeId: null, limitation: null } as const,
    ];
    const { id } = await record({ tag, scopes });
    const manager = await app.signInAs({ roles: ['manager'] });
    const answers = await Promise.all([
      app.send(approveCalibration, approver, { params: { id }, body: { version: 1 } }),
      app.send(refuseCalibration, manager, {
        params: { id },
        body: { version: 1, reason: 'wrong certificate' },
      }),
    ]);
    expect(answers.map(({ status }) => status).toSorted()).toEqual([200, 409]);
  },
);

test('no booking slips past a failed calibration that is approved at the same time', async () => {
  const made = await bench.request();
  const { placement } = await bench.offer(made);
  const bad = await record(failed);
  const [booked] = await Promise.all([
    app.send(confirmBooking, bench.scheduler, {
      body: {
        requestId: made.requestId,
        lotId: made.lotId,
        requestVersion: made.version,
        placement,
      },
    }),
    approve(bad),
  ]);
  if (booked.status === 201) {
    const { id } = confirmBooking.response.parse(await booked.json());
    const seen = await app.call(getBooking, bench.scheduler, { params: { id } });
    expect(seen.body.isAtRisk).toBe(true);
  } else {
    expect(await booked.json()).toMatchObject({ code: 'booking.checks' });
  }
});

test('a decided record and an old version are refused with the record as it stands', async () => {
  const made = await record();
  const stale = await app.callRefused(approveCalibration, approver, {
    params: { id: made.id },
    body: { version: 7 },
  });
  expect(stale.status).toBe(409);
  expect(stale.problem).toMatchObject({
    code: 'version.stale',
    current: { id: made.id, state: 'awaiting-approval', version: 1 },
  });
  await approve(made);
  const again = await app.callRefused(refuseCalibration, approver, {
    params: { id: made.id },
    body: { version: 2, reason: 'on second thoughts' },
  });
  expect(again.status).toBe(409);
  expect(again.problem).toMatchObject({
    code: 'calibration.state',
    current: { state: 'approved' },
  });
  expect(again.problem.detail).toContain('by Max Metrologist');
});

test('a repeat with the same key decides once and gives the same answer', async () => {
  const made = await record();
  const input = {
    params: { id: made.id },
    body: { version: 1 },
    idempotencyKey: '5b8d1a7e-7f43-4e0e-b1c9-2f6ce2f6e9d4',
  };
  const one = await app.call(approveCalibration, approver, input);
  const two = await app.call(approveCalibration, approver, input);
  expect(two.body).toEqual(one.body);
});

test('metrologists and managers of the site decide; a record of another site is not there', async () => {
  const made = await record();
  const params = { id: made.id };
  const elsewhere = await app.signInAs({ roles: ['metrologist@otterholm'] });
  const refusals = await Promise.all([
    app.callRefused(approveCalibration, bench.scheduler, { params, body: { version: 1 } }),
    app.callRefused(refuseCalibration, bench.engineer, {
      params,
      body: { version: 1, reason: 'no' },
    }),
    app.callRefused(approveCalibration, elsewhere, {
      params: { ...params, site: 'otterholm' },
      body: { version: 1 },
    }),
    app.callRefused(refuseCalibration, approver, {
      params: { id: 987_654 },
      body: { version: 1, reason: 'nothing there' },
    }),
    app.callRefused(refuseCalibration, approver, { params, body: { version: 1, reason: ' ' } }),
  ]);
  expect(refusals.map(({ status }) => status)).toEqual([403, 403, 404, 404, 422]);
  const { body } = await app.call(listCalibrations, approver, { query: { tag: meter } });
  expect(body.items.find(({ id }) => id === made.id)?.state).toBe('awaiting-approval');
});
