import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { estimateSlot } from '#shared/domain/hold-estimate/estimate-slot.ts';
import { roundPhasesToGrid } from '#shared/domain/hold-estimate/round-phases-to-grid.ts';
import { settlingCurve } from '#shared/domain/hold-estimate/settling-curve.ts';
import type {
  EstimateInput,
  SingleEstimate,
  TooLongEstimate,
} from '#shared/domain/hold-estimate/types.ts';
import {
  buildEstimateCell,
  buildEstimateInput,
  buildMeasuredFigures,
} from '#tests/support/build-estimate-input.ts';

function estimateLengths(input: EstimateInput): SingleEstimate | TooLongEstimate {
  const estimate = estimateSlot(input);
  if (estimate.outcome !== 'ok' && estimate.outcome !== 'too-long') {
    throw new Error(`Expected lengths, got ${estimate.outcome}.`);
  }
  return estimate;
}

function safeOf(input: EstimateInput, phase: string): number | undefined {
  return estimateLengths(input).phases.find((row) => row.phase === phase)?.safeS;
}

const wiring = buildEstimateInput().wiring;
const process = buildEstimateInput().process;

describe('a settled measurement', () => {
  test('the typical 3.5 Ah cell at idle temperature: no ramp, no return, whole minutes', () => {
    const estimate = estimateLengths(buildEstimateInput());
    expect(estimate.outcome).toBe('ok');
    expect(estimate.phases.map((row) => row.phase)).toEqual([
      'connect',
      'soak',
      'match',
      'hold',
      'measure',
      'unload',
    ]);
    for (const row of estimate.phases) {
      expect(row.likelyS % 60).toBe(0);
      expect(row.safeS).toBeGreaterThanOrEqual(row.likelyS);
    }
    expect(estimate.numbers.timeConstantS).toBeCloseTo(1320, 9);
    expect(estimate.numbers.thermalTimeConstantS).toBeCloseTo(644.859813 * 1.0525, 4);
    expect(estimate.numbers.expectedCurrentA).toBeCloseTo(10.5e-6, 15);
    expect(estimate.numbers.allowanceA).toBeCloseTo(1.05e-6, 15);
    expect(estimate.limitedBy).toBe('thermal');
    expect(estimate.safeTotalS).toBe(estimate.phases.reduce((sum, row) => sum + row.safeS, 0));
  });

  test('at 45 °C it ramps there and back; only connect and unload keep the idle temperature', () => {
    const estimate = estimateLengths(buildEstimateInput({ setTemperatureC: 45 }));
    expect(estimate.phases.map((row) => [row.phase, row.setTemperatureC])).toEqual([
      ['connect', 25],
      ['ramp', 45],
      ['soak', 45],
      ['match', 45],
      ['hold', 45],
      ['measure', 45],
      ['return', 45],
      ['unload', 25],
    ]);
    expect(estimate.phases.find((row) => row.phase === 'ramp')?.safeS).toBe(1200);
    // 60 kJ/mol between 25 and 45 °C (Theiler 2021), factor derived here.
    expect(estimate.numbers.expectedCurrentA / 10.5e-6).toBeCloseTo(4.577, 2);
  });

  test('connect takes 10 min and 3 min a cell, 5 min more for a re-cabled path', () => {
    expect(safeOf(buildEstimateInput(), 'connect')).toBe(22 * 60);
    const recabled = buildEstimateInput({ process: { ...process, recabledPaths: 2 } });
    expect(safeOf(recabled, 'connect')).toBe(32 * 60);
    expect(safeOf(recabled, 'unload')).toBe(22 * 60);
  });

  test('connect and unload are attended, the match where the site says so', () => {
    const attended = (matchAttended: boolean): readonly string[] =>
      estimateLengths(buildEstimateInput({ process: { ...process, matchAttended } }))
        .phases.filter((row) => row.isAttended)
        .map((row) => row.phase);
    expect(attended(false)).toEqual(['connect', 'unload']);
    expect(attended(true)).toEqual(['connect', 'match', 'unload']);
  });

  test('safe is the hold alone times 1.94 at 90 %, and equal to likely at 50 %', () => {
    const { hold } = estimateLengths(buildEstimateInput());
    expect(hold.safeS / hold.likelyS).toBeCloseTo(1.94234847, 7);
    const even = buildEstimateInput({ process: { ...process, safePercentile: 0.5 } });
    expect(estimateLengths(even).hold.safeS).toBe(estimateLengths(even).hold.likelyS);
  });

  test('learned ratios replace the prior and move likely and safe together', () => {
    const learned = { mean: 0.195675685, kappa: 7, shape: 4.5, rate: 0.337358446, runCount: 5 };
    const { hold, figures } = estimateLengths(buildEstimateInput({ learnedRatios: learned }));
    expect(hold.likelyS / hold.modelS).toBeCloseTo(1.21613243, 7);
    expect(hold.safeS / hold.modelS).toBeCloseTo(1.8230303, 6);
    expect(figures.find((figure) => figure.key === 'safe-factor')?.origin).toBe('learned');
  });

  test('measured figures win over the class and are marked as measured', () => {
    const measured = buildMeasuredFigures({
      capacitanceFPerAh: 3500,
      resistanceOhm: 0.05,
      thermalTimeConstantS: 500,
      entropicCoefficientVPerK: 0,
      selfDischargeAPerAh: 2e-6,
    });
    const { numbers, figures } = estimateLengths(
      buildEstimateInput({ cell: buildEstimateCell({ measured }) }),
    );
    expect(numbers.capacitanceF).toBe(12_250);
    expect(numbers.timeConstantS).toBeCloseTo(12_250 * 0.11, 9);
    expect(numbers.thermalTimeConstantS).toBe(500);
    expect(numbers.expectedCurrentA).toBeCloseTo(7e-6, 15);
    expect(numbers.entropicBoundVPerK).toBe(0);
    expect(figures.find((figure) => figure.key === 'capacitance')?.origin).toBe('measured');
  });

  test('the range spans likely, and the worst case exceeds it', () => {
    const { hold } = estimateLengths(buildEstimateInput());
    expect(hold.lowS).toBeLessThan(hold.likelyS);
    expect(hold.highS).toBeGreaterThan(hold.likelyS);
    expect(hold.worstS).toBeGreaterThan(hold.likelyS);
  });

  test('a noisy meter is averaged until a quarter of the allowance', () => {
    const noisy = buildEstimateInput({ wiring: { ...wiring, meterNoiseA: 1e-5 } });
    const estimate = estimateLengths(noisy);
    const rule = (1e-5 / (1.05e-6 / 4)) ** 2 * 10;
    const measure = estimate.phases.find((row) => row.phase === 'measure')?.safeS;
    expect(measure).toBe(Math.ceil(rule / 60) * 60);
    expect(estimate.limitedBy).toBe('noise');
    expect(safeOf(buildEstimateInput(), 'measure')).toBe(3600);
  });

  test('a tolerance wider than the start leaves no hold to book', () => {
    const wide = buildEstimateInput({ tolerance: { kind: 'absolute', currentA: 1 } });
    const estimate = estimateLengths(wide);
    expect(estimate.hold.modelS).toBe(0);
    expect(estimate.limitedBy).toBe('already-settled');
    expect(estimate.phases.some((row) => row.phase === 'hold')).toBe(false);
  });

  test('a missing state of charge is told where only dU/dT depends on it', () => {
    const cell = buildEstimateCell({ stateOfChargePct: null });
    const estimate = estimateLengths(buildEstimateInput({ cell }));
    expect(estimate.numbers.entropicBoundVPerK).toBe(4.5e-4);
    expect(estimate.notes.join(' ')).toContain('state of charge is not stated');
  });

  test('every figure carries formula, source and finite numbers', () => {
    const { figures } = estimateLengths(buildEstimateInput({ setTemperatureC: 45 }));
    expect(new Set(figures.map((figure) => figure.key)).size).toBe(figures.length);
    for (const figure of figures) {
      expect(figure.source).not.toBe('');
      expect(figure.formula).not.toBe('');
      for (const number of [figure.value, ...figure.inputs.map((input) => input.value)]) {
        expect(Number.isFinite(number)).toBe(true);
      }
    }
  });
});

describe('what cannot be estimated', () => {
  test('an unknown burden, or its place, stops the estimate', () => {
    for (const gap of [{ burdenOhm: null }, { burdenInsideLoop: null }]) {
      const estimate = estimateSlot(buildEstimateInput({ wiring: { ...wiring, ...gap } }));
      expect(estimate.outcome).toBe('unknown');
      expect(estimate.outcome === 'unknown' ? estimate.reason : '').toContain('on record');
    }
  });

  test('a 10 Ω burden outside the loop is too long, and says why', () => {
    const outside = buildEstimateInput({ wiring: { ...wiring, burdenInsideLoop: false } });
    const estimate = estimateLengths(outside);
    expect(estimate.outcome).toBe('too-long');
    expect(estimate.numbers.timeConstantS / 3600).toBeGreaterThan(39);
    expect(estimate.outcome === 'too-long' ? estimate.reason : '').toContain('burden');
  });

  test('LFP without a state of charge gives a range and a question, with it a single figure', () => {
    const cell = buildEstimateCell({ chemistry: 'lfp', stateOfChargePct: null });
    const open = estimateSlot(buildEstimateInput({ cell }));
    expect(open.outcome).toBe('range');
    if (open.outcome === 'range') {
      expect(open.shortest.holdS).toBeLessThan(open.longest.holdS);
      expect(open.question.field).toBe('stateOfChargePct');
    }
    const known = buildEstimateCell({ chemistry: 'lfp', stateOfChargePct: 22 });
    expect(estimateSlot(buildEstimateInput({ cell: known })).outcome).toBe('ok');
    const measured = buildMeasuredFigures({ capacitanceFPerAh: 9000 });
    const sure = estimateLengths(buildEstimateInput({ cell: { ...cell, measured } }));
    expect(sure.numbers.capacitanceF).toBeCloseTo(31_500, 6);
  });

  test('a coarse meter makes screening impossible', () => {
    const coarse = { ...wiring, meterResolutionA: 1e-4 };
    const estimate = estimateSlot(buildEstimateInput({ kind: 'screening', wiring: coarse }));
    expect(estimate.outcome).toBe('impossible');
    expect(estimate.outcome === 'impossible' ? estimate.reason : '').toContain('No length');
  });

  test.each([
    ['no cells', { cellCount: 0 }],
    ['half a cell', { cellCount: 1.5 }],
    ['a capacity of NaN', { cell: buildEstimateCell({ capacityAh: NaN }) }],
    ['a charge of 120 %', { cell: buildEstimateCell({ stateOfChargePct: 120 }) }],
    ['no tolerance', { tolerance: { kind: 'relative', fraction: 0 } }],
    ['a temperature below absolute zero', { setTemperatureC: -300 }],
    ['a percentile of 99 %', { process: { ...process, safePercentile: 0.99 } }],
    ['negative leads', { wiring: { ...wiring, leadResistanceOhm: -1 } }],
    ['a chamber that cannot ramp', { chamber: { idleTemperatureC: 25, rampKPerMin: 0 } }],
  ] as const)('%s is refused', (_, detail) => {
    expect(() => estimateSlot(buildEstimateInput(detail))).toThrow(RangeError);
  });

  test('a bad cell that leaks no more than a good one is refused', () => {
    const screening = { badToGoodRatio: 1, falseAlarm: 0.01, miss: 0.01 };
    expect(() => estimateSlot(buildEstimateInput({ kind: 'screening', screening }))).toThrow(
      RangeError,
    );
  });
});

describe('screening', () => {
  test('it is shorter than settling and allows a quarter of the difference', () => {
    const screening = estimateLengths(buildEstimateInput({ kind: 'screening' }));
    const settled = estimateLengths(buildEstimateInput());
    expect(screening.hold.likelyS).toBeLessThan(settled.hold.likelyS);
    expect(screening.numbers.toleranceA).toBeCloseTo(21e-6, 12);
    expect(screening.numbers.allowanceA).toBeCloseTo(5.25e-6, 12);
  });
});

describe('properties', () => {
  const detail = fc.record({
    capacityAh: fc.double({ min: 0.02, max: 300, noNaN: true }),
    fraction: fc.double({ min: 0.01, max: 0.5, noNaN: true }),
    leadOhm: fc.double({ min: 0.001, max: 1, noNaN: true }),
    setC: fc.integer({ min: -20, max: 70 }),
    kind: fc.constantFrom('settled', 'screening'),
  });

  function inputOf(value: {
    capacityAh: number;
    fraction: number;
    leadOhm: number;
    setC: number;
    kind: 'settled' | 'screening';
  }): EstimateInput {
    return buildEstimateInput({
      kind: value.kind,
      cell: buildEstimateCell({ capacityAh: value.capacityAh }),
      tolerance: { kind: 'relative', fraction: value.fraction },
      wiring: {
        ...wiring,
        leadResistanceOhm: value.leadOhm,
        meterNoiseA: 1e-12,
        meterResolutionA: 0,
      },
      setTemperatureC: value.setC,
    });
  }

  test('a wider tolerance never lengthens the hold; a larger cell or longer leads never settle faster', () => {
    fc.assert(
      fc.property(detail, fc.double({ min: 1, max: 3, noNaN: true }), (value, factor) => {
        const settled = { ...value, kind: 'settled' } as const;
        const { modelS } = estimateLengths(inputOf(settled)).hold;
        const slack = 1e-6 * modelS + 1e-6;
        const wider = { ...settled, fraction: value.fraction * factor };
        expect(estimateLengths(inputOf(wider)).hold.modelS).toBeLessThanOrEqual(modelS + slack);
        const longer = { ...settled, leadOhm: value.leadOhm * factor };
        const larger = { ...settled, capacityAh: value.capacityAh * factor };
        const tauS = estimateLengths(inputOf(settled)).numbers.timeConstantS;
        for (const slower of [longer, larger]) {
          expect(estimateLengths(inputOf(slower)).numbers.timeConstantS).toBeGreaterThanOrEqual(
            tauS,
          );
        }
      }),
    );
  });

  test('phases add up, stay in order and are never shorter when safe', () => {
    fc.assert(
      fc.property(detail, (value) => {
        const estimate = estimateLengths(inputOf(value));
        const { phases, hold } = estimate;
        expect(phases.reduce((sum, row) => sum + row.safeS, 0)).toBe(estimate.safeTotalS);
        expect(phases.every((row) => row.safeS >= row.likelyS && row.safeS > 0)).toBe(true);
        expect(hold.worstS).toBeGreaterThanOrEqual(hold.modelS * (1 - 1e-9));
        expect(phases[0]?.phase).toBe('connect');
        expect(phases.at(-1)?.phase).toBe('unload');
      }),
    );
  });
});

describe('the booking grid', () => {
  test('ends are rounded by themselves, the inside into the hold', () => {
    const rounded = roundPhasesToGrid([
      { phase: 'connect', lengthS: 22 * 60 },
      { phase: 'soak', lengthS: 34 * 60 },
      { phase: 'hold', lengthS: 100 * 60 },
      { phase: 'unload', lengthS: 15 * 60 },
    ]);
    expect(rounded.map((row) => row.lengthS / 60)).toEqual([30, 34, 101, 15]);
  });

  test('inner phases on the grid already need no hold; others without one are refused', () => {
    expect(roundPhasesToGrid([{ phase: 'measure', lengthS: 3600 }])[0]?.lengthS).toBe(3600);
    expect(() => roundPhasesToGrid([{ phase: 'measure', lengthS: 3660 }])).toThrow(RangeError);
  });
});

describe('the settling curve', () => {
  test('the slower branch comes inside the band at the model hold and both end near the leakage', () => {
    const { numbers, hold } = estimateLengths(buildEstimateInput());
    const curve = settlingCurve({ numbers, hold, pointCount: 2001 });
    const first = curve.points.find((point) => point.timeS >= hold.modelS);
    const before = curve.points.findLast((point) => point.timeS < hold.modelS);
    expect(first?.negativeA).toBeGreaterThanOrEqual(curve.bandLowA);
    expect(before?.negativeA).toBeLessThan(curve.bandLowA);
    expect(curve.points.at(-1)?.timeS).toBeGreaterThan(hold.safeS);
    expect(curve.points[0]?.positiveA).toBeCloseTo(2e-6 / numbers.seriesResistanceOhm, 12);
    expect(() => settlingCurve({ numbers, hold, pointCount: 1 })).toThrow(RangeError);
  });
});

describe('speed', () => {
  test('a thousand estimates take less than a second', () => {
    const inputs = Array.from({ length: 1000 }, (_, index) =>
      buildEstimateInput({ setTemperatureC: 20 + (index % 40) }),
    );
    inputs.slice(0, 100).forEach(estimateSlot);
    const startMs = performance.now();
    inputs.forEach(estimateSlot);
    expect(performance.now() - startMs).toBeLessThan(1000);
  });
});
