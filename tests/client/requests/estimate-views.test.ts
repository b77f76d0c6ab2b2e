import { describe, expect, test } from 'vitest';
import { estimateSlot } from '#shared/domain/hold-estimate/estimate-slot.ts';
import { settlingCurve } from '#shared/domain/hold-estimate/settling-curve.ts';
import type { EstimateInput, RatioPosterior } from '#shared/domain/hold-estimate/types.ts';
import { estimateSentence, estimatesSentence } from '#src/features/request/estimate-words.view.ts';
import { figureText } from '#src/features/request/figure-text.view.ts';
import { reasonOf, type KnownEstimate } from '#src/features/request/phase-reasons.view.ts';
import { nameStarts } from '#src/features/request/settling-labels.view.ts';
import { estimateToShow } from '#src/features/request/shown-estimate.view.ts';
import { shorterWays } from '#src/features/request/shorter.view.ts';

const plain = (text: string) => text.replaceAll('\u202f', ' ');

function inputOf(change: Partial<EstimateInput> = {}): EstimateInput {
  return {
    kind: 'settled',
    cellCount: 6,
    cell: {
      cellClass: 'prismatic',
      format: 'prismatic',
      chemistry: 'nmc',
      capacityAh: 35,
      stateOfChargePct: 50,
      measured: null,
    },
    holderFactor: 1,
    setTemperatureC: 45,
    chamber: { idleTemperatureC: 25, rampKPerMin: 1 },
    tolerance: { kind: 'relative', fraction: 0.1 },
    screening: { badToGoodRatio: 3, falseAlarm: 0.01, miss: 0.01 },
    wiring: {
      label: 'reference wiring of Larkfen',
      leadResistanceOhm: 0.014,
      sourceOutputOhm: 0.002,
      burdenOhm: 0,
      burdenInsideLoop: true,
      meterNoiseA: 2e-9,
      meterResolutionA: 1e-9,
      sampleIntervalS: 1,
    },
    process: {
      connectFixedMin: 10,
      connectPerCellMin: 3,
      unloadFixedMin: 10,
      unloadPerCellMin: 4,
      recabledPaths: 0,
      recableMinPerPath: 5,
      matchMin: 20,
      matchAttended: false,
      minimumMeasureMin: 60,
      safePercentile: 0.9,
    },
    learnedRatios: null,
    ...change,
  };
}

function known(input: EstimateInput): KnownEstimate {
  const estimate = estimateSlot(input);
  if (estimate.outcome !== 'ok' && estimate.outcome !== 'too-long') {
    throw new Error(`The example has no lengths: ${estimate.outcome}.`);
  }
  return estimate;
}

describe('why a phase is as long as it is', () => {
  test('is said for every phase of a slot, with the kind of source', () => {
    const input = inputOf();
    const estimate = known(input);
    for (const { phase } of estimate.phases) {
      const reason = reasonOf(phase, estimate, input);
      expect(reason.why, phase).not.toBe('');
      expect(reason.origin, phase).not.toBeNull();
    }
  });

  test('names the figures of this very estimate', () => {
    const input = inputOf();
    const estimate = known(input);
    const why = (phase: Parameters<typeof reasonOf>[0]) =>
      plain(reasonOf(phase, estimate, input).why);
    expect(why('connect')).toBe('10 min and 3 min for each of 6 cells.');
    expect(why('unload')).toBe('10 min and 4 min for each of 6 cells.');
    expect(why('ramp')).toBe('25 °C to 45 °C at 1.0 K/min.');
    expect(why('measure')).toContain(plain(figureText(estimate.numbers.allowanceA, 'A')));
  });

  test('does not need the input, which an offer of the server does not carry', () => {
    const estimate = known(inputOf());
    const whys = estimate.phases.map(({ phase }) => reasonOf(phase, estimate, undefined).why);
    expect(whys.every((why) => why !== '')).toBe(true);
  });

  test('tells a learned hold from one by class figures, and a measured cell from both', () => {
    const learnedRatios: RatioPosterior = { mean: 0.1, kappa: 9, shape: 8, rate: 1, runCount: 8 };
    const measured = {
      capacitanceFPerAh: 4100,
      resistanceOhm: null,
      thermalTimeConstantS: null,
      entropicCoefficientVPerK: null,
      massKg: null,
      surfaceM2: null,
      selfDischargeAPerAh: null,
    };
    const originOf = (input: EstimateInput) => reasonOf('hold', known(input), input).origin;
    expect(originOf(inputOf())).toBe('class');
    expect(originOf(inputOf({ cell: { ...inputOf().cell, measured } }))).toBe('measured');
    expect(originOf(inputOf({ learnedRatios }))).toBe('learned');
  });
});

describe('what would shorten a slot', () => {
  test('is worked out with the same model and only said where it gains a quarter of an hour', () => {
    const input = inputOf();
    const { safeTotalS } = known(input);
    const ways = shorterWays(input, safeTotalS);
    expect(ways.map(({ key }) => key)).toContain('tolerance');
    const wider = known({ ...input, tolerance: { kind: 'relative', fraction: 0.2 } });
    expect(ways.find(({ key }) => key === 'tolerance')?.safeTotalS).toBe(wider.safeTotalS);
    expect(ways.every((way) => way.safeTotalS <= safeTotalS - 900)).toBe(true);
    expect(ways.map((way) => way.safeTotalS)).toEqual(
      ways.map((way) => way.safeTotalS).toSorted((a, b) => a - b),
    );
  });

  test('does not offer screening to who screens already, nor leads where there are none', () => {
    const input = inputOf({
      kind: 'screening',
      wiring: { ...inputOf().wiring, leadResistanceOhm: 0 },
    });
    const keys = shorterWays(input, Number.MAX_SAFE_INTEGER).map(({ key }) => key);
    expect(keys).toEqual(['ratio']);
  });

  test('never offers a tolerance wider than one can ask for', () => {
    const input = inputOf({ tolerance: { kind: 'relative', fraction: 0.4 } });
    const way = shorterWays(input, Number.MAX_SAFE_INTEGER).find(({ key }) => key === 'tolerance');
    expect(plain(way?.text ?? '')).toBe('± 50 % instead of ± 40 %');
  });
});

describe('an estimate read out', () => {
  test('is one sentence for each outcome', () => {
    const input = inputOf();
    const of = (change: Partial<EstimateInput>) => {
      const made = inputOf(change);
      return estimateSentence({ kind: 'estimate', input: made, estimate: estimateSlot(made) });
    };
    expect(plain(of({}))).toMatch(/^The slot takes \d+ h \d+ min likely, \d+ h \d+ min safely\.$/);
    expect(of({ cell: { ...input.cell, chemistry: 'lfp', stateOfChargePct: null } })).toContain(
      'At which state of charge',
    );
    expect(of({ wiring: { ...input.wiring, burdenOhm: null } })).not.toBe('');
    expect(estimateSentence({ kind: 'needs', needs: ['cellType', 'temperature'] })).toBe(
      'Give a cell type, a set temperature and the estimate appears here.',
    );
  });

  test('names the lots where there are several', () => {
    const needs = { kind: 'needs', needs: ['cellCount'] } as const;
    expect(estimatesSentence([needs, needs])).toMatch(/^Lot 1: .* Lot 2: /);
    expect(estimatesSentence([needs])).not.toContain('Lot');
  });
});

describe('the estimate of a saved lot', () => {
  const input = inputOf();
  const reference = { kind: 'estimate', input, estimate: estimateSlot(input) } as const;

  test('is the one over the real path as soon as a slot is found', () => {
    const real = estimateSlot(inputOf({ wiring: { ...input.wiring, leadResistanceOhm: 0.004 } }));
    if (real.outcome !== 'ok') {
      throw new Error('The example has no lengths.');
    }
    const estimate = { ...real, figures: [], notes: [], phases: [...real.phases] };
    const shown = estimateToShow({ estimate, chamberTag: 'C08' }, reference);
    expect(shown.kind === 'estimate' ? shown.estimate : null).toBe(estimate);
    expect(shown.kind === 'estimate' ? shown.over : '').toContain('C08');
  });

  test('is the one over the reference wiring before, and says so', () => {
    const shown = estimateToShow(undefined, reference);
    expect(shown.kind === 'estimate' ? shown.over : '').toContain('reference wiring of Larkfen');
    expect(estimateToShow(undefined, { kind: 'needs', needs: ['temperature'] })).toEqual({
      kind: 'needs',
      sentence: 'Give a set temperature and the estimate appears here.',
    });
  });
});

describe('a figure of an estimate', () => {
  test.each([
    [2.4e-5, 'A', '24.0 µA'],
    [0.0174, 'ohm', '17.4 mΩ'],
    [140_000, 'F', '140 000 F'],
    [-5e-5, 'V/K', '−50.0 µV/K'],
    [1495.4, 's', '1495 s'],
    [1.94312, '', '1.94'],
    [6, '', '6'],
    [0, 'ohm', '0 Ω'],
  ])('%d %s is written %s', (value, unit, text) => {
    expect(plain(figureText(value, unit))).toBe(text);
  });
});

describe('the names at the settling lines', () => {
  const curveOf = (leadResistanceOhm: number) => {
    const { numbers, hold } = known(
      inputOf({ wiring: { ...inputOf().wiring, leadResistanceOhm } }),
    );
    return settlingCurve({ numbers, hold: { ...hold, modelS: hold.likelyS } });
  };

  test('are two where the starts lie apart, and one where the lines run together', () => {
    expect(nameStarts(curveOf(0.004)).upper).toBe('source starts high');
    expect(nameStarts(curveOf(0.5))).toEqual({
      lower: 'source starts high or low',
      upper: undefined,
    });
  });
});
