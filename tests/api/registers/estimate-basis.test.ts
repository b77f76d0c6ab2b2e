import { afterAll, beforeAll, expect, test } from 'vitest';
import { describeWeek } from '#server/features/registers/estimate-basis.service.ts';
import { getEstimateBasis, listCellTypes } from '#shared/contracts/registers.contract.ts';
import { getRequest } from '#shared/contracts/requests.contract.ts';
import { setPolicy } from '#shared/contracts/settings.contract.ts';
import { estimateSlot } from '#shared/domain/hold-estimate/estimate-slot.ts';
import { buildBench } from '#tests/support/build-bench.ts';
import type { Bench } from '#tests/support/build-bench.ts';
import { startTestApp } from '#tests/support/test-app.ts';

let bench: Bench;
beforeAll(async () => {
  bench = await buildBench(await startTestApp());
});
afterAll(() => bench.app.stop());

async function setNumber(key: string, value: number): Promise<void> {
  const manager = await bench.app.signInAs({ roles: ['manager'] });
  await bench.app.call(setPolicy, manager, { params: { key }, body: { value, version: 0 } });
}

test('what the browser estimates from it is what an offer over the same wiring says', async () => {
  await setNumber('referenceLeadResistanceOhm', 0.05);
  await setNumber('safePercentile', 75);
  await setNumber('matchMin', 35);
  const made = await bench.request({ cellCount: 3, request: { setTempMdegc: 45_000 } });
  const { estimate: offered } = await bench.offer(made);
  const { body: basis } = await bench.app.call(getEstimateBasis, bench.engineer);
  const { body: types } = await bench.app.call(listCellTypes, bench.engineer);
  const { body: request } = await bench.app.call(getRequest, bench.engineer, {
    params: { id: made.requestId },
  });
  const [lot] = request.lots;
  const cell = types.items.find(({ id }) => id === lot?.cellTypeId);
  if (lot === undefined || cell === undefined || offered.outcome !== 'ok') {
    throw new Error('The request, its cell type or its offer is missing.');
  }

  const estimate = estimateSlot({
    ...basis,
    kind: request.kind,
    cellCount: lot.cellCount ?? 0,
    cell: { ...cell, stateOfChargePct: lot.stateOfChargePct },
    setTemperatureC: request.setTemperatureC ?? 0,
    tolerance: request.tolerance,
    screening: { badToGoodRatio: request.badToGoodRatio, falseAlarm: 0.01, miss: 0.01 },
  });

  expect(estimate).toMatchObject({
    outcome: 'ok',
    phases: offered.phases,
    hold: offered.hold,
    numbers: offered.numbers,
    likelyTotalS: offered.likelyTotalS,
    safeTotalS: offered.safeTotalS,
  });
});

test('it names the wiring it rests on, and the hours somebody is there', async () => {
  const { body } = await bench.app.call(getEstimateBasis, bench.engineer);
  expect(body.wiring).toMatchObject({
    label: 'reference wiring of Larkfen, 100 µA range',
    burdenOhm: 10,
    burdenInsideLoop: true,
  });
  expect(body.chamber).toEqual({ idleTemperatureC: 25, rampKPerMin: 1 });
  expect(body.learnedRatios).toBeNull();
  expect(body.zone).toBe('Europe/Dublin');
});

test('a site without a meter has no burden to estimate with', async () => {
  const elsewhere = await bench.app.signInAs({ roles: ['engineer@otterholm'] });
  const { body } = await bench.app.call(getEstimateBasis, elsewhere, {
    params: { site: 'otterholm' },
  });
  expect(body.wiring).toMatchObject({
    label: 'reference wiring of Otterholm',
    leadResistanceOhm: 0.5,
    burdenOhm: null,
    burdenInsideLoop: null,
  });
});

test.each([
  [{}, 'nobody works here'],
  [{ 3: [{ fromMin: 480, toMin: 750 }] }, 'Wed 08:00-12:30'],
  [
    {
      1: [{ fromMin: 480, toMin: 1080 }],
      2: [{ fromMin: 480, toMin: 1080 }],
      3: [
        { fromMin: 480, toMin: 720 },
        { fromMin: 780, toMin: 1440 },
      ],
      7: [{ fromMin: 0, toMin: 65 }],
    },
    'Mon to Tue 08:00-18:00; Wed 08:00-12:00, 13:00-24:00; Sun 00:00-01:05',
  ],
])('the week %j reads %s', (weekly, text) => {
  expect(describeWeek({ weekly })).toBe(text);
});
