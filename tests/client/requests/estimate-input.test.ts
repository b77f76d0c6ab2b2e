import { describe, expect, test } from 'vitest';
import type { CellTypeDto } from '#shared/contracts/registers.contract.ts';
import { estimatePath } from '#shared/domain/availability/estimate-path.ts';
import type { SlotRequest } from '#shared/domain/availability/types.ts';
import { facilityPolicyOf } from '#shared/domain/policies/facility-policy-of.ts';
import { sitePolicyFrom } from '#shared/domain/policies/site-policy-from.ts';
import { estimateLot, type Basis } from '#src/features/request/estimate-input.view.ts';
import type { LooseFields } from '#src/features/request/loose-fields.view.ts';

const cellType: CellTypeDto = {
  id: 7,
  name: 'NP35',
  cellClass: 'prismatic',
  format: 'prismatic',
  chemistry: 'nmc',
  capacityAh: 35,
  hazardLevel: 4,
  isReleased: true,
  minTemperatureC: -20,
  maxTemperatureC: 60,
  minVoltageV: 2.7,
  maxVoltageV: 4.2,
  maxHoldStateOfChargePct: 80,
  energyWh: 128,
  measured: null,
};

const policy = facilityPolicyOf(sitePolicyFrom([{ key: 'safePercentile', value: 80 }]));
const basis: Basis = {
  wiring: {
    label: 'reference wiring of Larkfen',
    leadResistanceOhm: 0.014,
    sourceOutputOhm: 0.002,
    burdenOhm: 0.5,
    burdenInsideLoop: true,
    meterNoiseA: 2e-9,
    meterResolutionA: 1e-9,
    sampleIntervalS: 1,
  },
  process: {
    connectFixedMin: policy.connectFixedMin,
    connectPerCellMin: policy.connectPerCellMin,
    unloadFixedMin: policy.unloadFixedMin,
    unloadPerCellMin: policy.unloadPerCellMin,
    recabledPaths: 0,
    recableMinPerPath: 5,
    matchMin: policy.matchMin,
    matchAttended: policy.matchAttended,
    minimumMeasureMin: policy.minimumMeasureMin,
    safePercentile: policy.safePercentile,
  },
  chamber: { idleTemperatureC: 25, rampKPerMin: 1 },
  holderFactor: 1.3,
  learnedRatios: null,
  staffedHours: 'Mon to Fri 08:00-18:00',
  zone: 'Europe/Dublin',
};

const settled: Omit<LooseFields, 'lots'> = {
  kind: 'settled',
  tolerance: { kind: 'relative', fraction: 0.05 },
  badToGoodRatio: null,
  setTemperatureC: 45,
};
const screening: Omit<LooseFields, 'lots'> = {
  ...settled,
  kind: 'screening',
  tolerance: null,
  badToGoodRatio: 2,
};
const lot = { cellCount: 6, stateOfChargePct: 50 };

/** The way the server takes for an offer, from a request as it reads it from its tables. */
function serverEstimate(wish: Omit<LooseFields, 'lots'>) {
  const request: SlotRequest = {
    requestId: 1187,
    kind: wish.kind,
    grade: 'reported',
    cellTypeName: cellType.name,
    cellCount: lot.cellCount,
    cell: {
      cellClass: cellType.cellClass,
      format: cellType.format,
      chemistry: cellType.chemistry,
      capacityAh: cellType.capacityAh,
      stateOfChargePct: lot.stateOfChargePct,
      measured: cellType.measured,
    },
    limits: {
      released: true,
      hazardLevel: cellType.hazardLevel,
      minTemperatureC: cellType.minTemperatureC,
      maxTemperatureC: cellType.maxTemperatureC,
      minVoltageV: cellType.minVoltageV,
      maxVoltageV: cellType.maxVoltageV,
      openCircuitVoltageV: null,
      energyWh: cellType.energyWh,
      maxHoldStateOfCharge: cellType.maxHoldStateOfChargePct,
    },
    tolerance: wish.tolerance ?? { kind: 'relative', fraction: 0.1 },
    screening: { badToGoodRatio: wish.badToGoodRatio ?? 3, falseAlarm: 0.01, miss: 0.01 },
    setTemperatureC: 45,
    setToleranceK: 0.5,
    earliestStartMs: 0,
    neededByMs: null,
    cellsReceived: true,
    cellsDamaged: false,
    restedSinceMs: null,
    deviations: [],
  };
  return estimatePath({
    request,
    policy,
    chamber: basis.chamber,
    setTemperatureC: 45,
    wiring: basis.wiring,
    holderFactor: basis.holderFactor,
  });
}

describe('the estimate beside the form', () => {
  test.each([
    ['a settled value', settled],
    ['screening', screening],
  ])('is the one the server would make, for %s', (_, wish) => {
    const result = estimateLot(wish, lot, cellType, basis);
    expect(result.kind === 'estimate' ? result.estimate : null).toEqual(serverEstimate(wish));
  });

  test('asks for everything that is open, and for the aim of its own kind only', () => {
    const open = { ...settled, tolerance: null, setTemperatureC: null };
    const nothing = { cellCount: null, stateOfChargePct: null };
    expect(estimateLot(open, nothing, undefined, basis)).toEqual({
      kind: 'needs',
      needs: ['cellType', 'cellCount', 'temperature', 'tolerance'],
    });
    expect(estimateLot({ ...screening, badToGoodRatio: null }, lot, cellType, basis)).toEqual({
      kind: 'needs',
      needs: ['ratio'],
    });
  });

  test('gives a range and a question where the state of charge decides and is not stated', () => {
    const lfp: CellTypeDto = { ...cellType, chemistry: 'lfp' };
    const result = estimateLot(settled, { ...lot, stateOfChargePct: null }, lfp, basis);
    expect(result.kind === 'estimate' ? result.estimate.outcome : null).toBe('range');
  });

  test('says that it cannot say anything where the burden of the meter is not on record', () => {
    const unknown = { ...basis, wiring: { ...basis.wiring, burdenOhm: null } };
    const result = estimateLot(settled, lot, cellType, unknown);
    expect(result.kind === 'estimate' ? result.estimate.outcome : null).toBe('unknown');
  });
});
