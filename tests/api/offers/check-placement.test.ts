import { afterAll, beforeAll, expect, test } from 'vitest';
import { checkPlacement } from '#shared/contracts/offers.contract.ts';
import type { CheckResultDto } from '#shared/contracts/check.schemas.ts';
import { buildBench } from '#tests/support/build-bench.ts';
import type { Bench } from '#tests/support/build-bench.ts';
import { startTestApp } from '#tests/support/test-app.ts';

let bench: Bench;
beforeAll(async () => {
  bench = await buildBench(await startTestApp(), { size: 1 });
});
afterAll(() => bench.app.stop());

function stopsIn(checks: readonly CheckResultDto[] | undefined) {
  return (checks ?? []).filter(({ outcome }) => outcome === 'stop').map(({ code }) => code);
}

test('a chamber and a start are enough: the free paths are chosen and everything is checked', async () => {
  const { requestId, lotId } = await bench.request();
  const { body } = await bench.app.call(checkPlacement, bench.engineer, {
    params: { id: requestId, lotId },
    body: { chamberTag: bench.chamber.chamberTag, startAt: '2026-03-04T09:30:00Z' },
  });
  expect(body.offer).toMatchObject({
    startAt: '2026-03-04T09:30:00.000Z',
    placement: { paths: bench.chamber.paths },
  });
  expect(stopsIn(body.offer?.checks)).toEqual([]);
  expect(body.offeredAt).toBe('2026-03-02T08:00:00.000Z');
});

test('a start at night is shown with the rule that stops it', async () => {
  const { requestId, lotId } = await bench.request();
  const { body } = await bench.app.call(checkPlacement, bench.engineer, {
    params: { id: requestId, lotId },
    body: { chamberTag: bench.chamber.chamberTag, startAt: '2026-03-04T03:00:00Z' },
  });
  expect(stopsIn(body.offer?.checks)).toEqual(['working-hours']);
});

test('a place that is taken names who has it; the booking that moves does not clash with itself', async () => {
  const made = await bench.request();
  const booking = await bench.book(made);
  const other = await bench.request();
  const { chamberTag } = bench.chamber;
  const startAt = booking.startAt;

  const seen = await bench.app.call(checkPlacement, bench.scheduler, {
    params: { id: other.requestId, lotId: other.lotId },
    body: { chamberTag, startAt },
  });
  const clash = seen.body.offer?.checks.find(({ code }) => code === 'double-use');
  expect(clash).toMatchObject({ outcome: 'stop' });
  expect(clash?.sentence).toContain(`is taken by booking ${booking.id} until Mon 2 Mar`);

  const moved = await bench.app.call(checkPlacement, bench.scheduler, {
    params: { id: made.requestId, lotId: made.lotId },
    body: { chamberTag, startAt: '2026-03-02T08:15:00Z', movesBookingId: booking.id },
  });
  expect(stopsIn(moved.body.offer?.checks)).toEqual([]);
  expect(moved.body.offer?.startAt).toBe('2026-03-02T08:15:00.000Z');
});

test('where nothing can be placed at all, a sentence says why', async () => {
  const wide = await bench.request({ cellCount: 3 });
  const { requestId, lotId } = await bench.request();
  const ask = (id: number, lot: number, chamberTag: string) =>
    bench.app.call(checkPlacement, bench.scheduler, {
      params: { id, lotId: lot },
      body: { chamberTag, startAt: '2026-03-04T09:30:00Z' },
    });
  const unknown = await ask(requestId, lotId, 'C99');
  expect(unknown.body).toMatchObject({ offer: null, reason: 'There is no chamber C99 here.' });
  const tooWide = await ask(wide.requestId, wide.lotId, bench.chamber.chamberTag);
  expect(tooWide.body.offer).toBeNull();
  expect(tooWide.body.reason).toMatch(/\.$/);
});

test('strangers, wrong bookings and wrong shapes are refused', async () => {
  const { requestId, lotId } = await bench.request();
  const params = { id: requestId, lotId };
  const body = { chamberTag: bench.chamber.chamberTag, startAt: '2026-03-04T09:30:00Z' };
  const stranger = await bench.app.signInAs({ roles: ['engineer'] });
  const refusals = await Promise.all([
    bench.app.callRefused(checkPlacement, null, { params, body }),
    bench.app.callRefused(checkPlacement, bench.engineer, { params, body, csrfToken: null }),
    bench.app.callRefused(checkPlacement, stranger, { params, body }),
    bench.app.callRefused(checkPlacement, bench.scheduler, {
      params,
      body: { ...body, movesBookingId: 999_999 },
    }),
    bench.app.callRefused(checkPlacement, bench.scheduler, {
      params,
      body: { ...body, startAt: 'now' },
    }),
  ]);
  expect(refusals.map(({ status }) => status)).toEqual([401, 403, 404, 404, 422]);
});

test('a lot that lacks something or is booked already has nothing to check', async () => {
  const body = { chamberTag: bench.chamber.chamberTag, startAt: '2026-03-04T09:30:00Z' };
  const open = await bench.request({ request: { state: 'draft', setTempMdegc: null } });
  const incomplete = await bench.app.callRefused(checkPlacement, bench.engineer, {
    params: { id: open.requestId, lotId: open.lotId },
    body,
  });
  expect(incomplete.problem.code).toBe('request.incomplete');
  expect(incomplete.problem.detail).toContain('the set temperature');

  const booked = await bench.request();
  await bench.book(booked);
  const taken = await bench.app.callRefused(checkPlacement, bench.engineer, {
    params: { id: booked.requestId, lotId: booked.lotId },
    body,
  });
  expect(taken.problem.code).toBe('request.state');
});
