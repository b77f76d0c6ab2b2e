import { afterAll, beforeAll, expect, test } from 'vitest';
import { findOffers } from '#shared/contracts/offers.contract.ts';
import { buildBench } from '#tests/support/build-bench.ts';
import type { Bench } from '#tests/support/build-bench.ts';
import { startTestApp } from '#tests/support/test-app.ts';

let bench: Bench;
beforeAll(async () => {
  bench = await buildBench(await startTestApp());
});
afterAll(() => bench.app.stop());

test('a complete request gets slots that pass every check, the earliest first', async () => {
  const { requestId, lotId } = await bench.request({ cellCount: 2 });

  const { body } = await bench.app.call(findOffers, bench.engineer, {
    params: { id: requestId, lotId },
  });

  expect(body).toMatchObject({
    offeredAt: '2026-03-02T08:00:00.000Z',
    expiresAt: '2026-03-02T08:10:00.000Z',
    mayConfirm: false,
    reasons: [],
  });
  const [first] = body.offers;
  expect(first?.startAt).toBe('2026-03-02T08:00:00.000Z');
  expect(first?.paths).toHaveLength(2);
  expect(first?.checks).toHaveLength(25);
  expect(first?.checks.filter(({ outcome }) => outcome === 'stop')).toEqual([]);
  expect(first?.phases.map(({ phase }) => phase)).toEqual(
    expect.arrayContaining(['connect', 'soak', 'match', 'hold', 'measure', 'unload']),
  );
  const starts = body.offers.map(({ startAt }) => startAt);
  expect(starts).toEqual(starts.toSorted());
});

test('a scheduler may confirm, an engineer only where the site lets engineers', async () => {
  const { requestId, lotId } = await bench.request();
  const params = { id: requestId, lotId };
  const { body } = await bench.app.call(findOffers, bench.scheduler, { params });
  expect(body.mayConfirm).toBe(true);
});

test('later slots come after the instant asked for', async () => {
  const { requestId, lotId } = await bench.request();
  const { body } = await bench.app.call(findOffers, bench.scheduler, {
    params: { id: requestId, lotId },
    query: { after: '2026-03-05T10:07:00Z' },
  });
  expect(body.offers[0]?.startAt).toBe('2026-03-05T10:15:00.000Z');
});

test('a slot that settles with nobody there says so, and how it lies to the date it is needed by', async () => {
  const { requestId, lotId } = await bench.request({
    request: {
      earliestStartAt: new Date('2026-03-02T14:00:00Z'),
      neededByAt: new Date('2026-03-03T20:00:00Z'),
    },
  });
  const { body } = await bench.app.call(findOffers, bench.scheduler, {
    params: { id: requestId, lotId },
  });
  expect(body.offers[0]?.remark).toMatch(
    /^Settles after working hours\. Waits \d+ h \d\d min .* Ends \d+ h \d\d min before/,
  );
});

test('a temperature no chamber was logged at is refused with the reason', async () => {
  const { requestId, lotId } = await bench.request({ request: { setTempMdegc: 40_000 } });
  const { body } = await bench.app.call(findOffers, bench.scheduler, {
    params: { id: requestId, lotId },
  });
  expect(body.offers).toEqual([]);
  expect(body.reasons[0]).toMatchObject({ code: 'stability-logged' });
  expect(body.blockedEarlier?.blockedBy).toMatchObject({ code: 'stability-logged' });
});

test('a draft without set temperature is told what is missing', async () => {
  const { requestId, lotId } = await bench.request({
    request: { state: 'draft', setTempMdegc: null },
  });
  const { problem } = await bench.app.callRefused(findOffers, bench.engineer, {
    params: { id: requestId, lotId },
  });
  expect(problem).toMatchObject({ code: 'request.incomplete', missing: ['the set temperature'] });
});

test('a withdrawn request and a lot that is booked have nothing to offer', async () => {
  const withdrawn = await bench.request({ request: { state: 'withdrawn' } });
  const booked = await bench.request();
  await bench.book(booked);
  for (const made of [withdrawn, booked]) {
    const { status, problem } = await bench.app.callRefused(findOffers, bench.scheduler, {
      params: { id: made.requestId, lotId: made.lotId },
    });
    expect([status, problem.code]).toEqual([409, 'request.state']);
  }
});

test('nobody is told of a request outside their projects, site or sign-in', async () => {
  const { requestId, lotId } = await bench.request();
  const params = { id: requestId, lotId };
  const stranger = await bench.app.signInAs({ roles: ['engineer'] });
  const elsewhere = await bench.app.signInAs({ roles: ['scheduler@otterholm'] });
  const refusals = await Promise.all([
    bench.app.callRefused(findOffers, null, { params }),
    bench.app.callRefused(findOffers, stranger, { params }),
    bench.app.callRefused(findOffers, elsewhere, { params }),
    bench.app.callRefused(findOffers, elsewhere, { params: { ...params, site: 'otterholm' } }),
    bench.app.callRefused(findOffers, bench.scheduler, { params: { ...params, lotId: 'x' } }),
    bench.app.callRefused(findOffers, bench.scheduler, { params, query: { after: 'soon' } }),
  ]);
  expect(refusals.map(({ status }) => status)).toEqual([401, 404, 404, 404, 422, 422]);
});
