import { describe, expect, it } from 'vitest';
import { evaluatePlacement } from '#shared/domain/checks/evaluate-placement.ts';
import { checkCodes } from '#shared/domain/checks/types.ts';
import type { CheckCode, CheckResult, PlacementFacts } from '#shared/domain/checks/types.ts';
import type { TakenSpan } from '#shared/domain/facility/types.ts';
import {
  buildMeter,
  buildPanel,
  buildPosition,
  buildRange,
  buildSource,
  buildValidity,
  dayMs,
  hourMs,
  mondayMs,
} from '#tests/support/build-facility.ts';
import { buildEstimate, buildPath, buildPlacement } from '#tests/support/build-placement.ts';

function result(code: CheckCode, facts: PlacementFacts): CheckResult {
  const found = evaluatePlacement(facts).find((candidate) => candidate.code === code);
  if (found === undefined) {
    throw new Error(`No check named ${code}.`);
  }
  return found;
}
const taken = (change: Partial<TakenSpan> = {}): TakenSpan => ({
  unitId: 2001,
  startMs: mondayMs + 16 * hourMs,
  endMs: mondayMs + 20 * hourMs,
  by: 'booking',
  recordId: 2418,
  label: 'booking 2418',
  ...change,
});

describe('a placement with nothing wrong', () => {
  it('passes every check, in the order of the codes', () => {
    const results = evaluatePlacement(buildPlacement());
    expect(results.map(({ code }) => code)).toEqual(checkCodes);
    expect(results.filter(({ outcome }) => outcome !== 'pass')).toEqual([]);
  });

  it('every sentence is one plain sentence', () => {
    for (const { sentence } of evaluatePlacement(buildPlacement())) {
      expect(sentence).toMatch(/^[A-Z].*\.$/);
    }
  });
});

describe('double use', () => {
  it('stops where a booking has the meter during the slot and says until when', () => {
    const facts = buildPlacement({ facility: { allocations: [taken()] } });
    const found = result('double-use', facts);
    expect(found.outcome).toBe('stop');
    expect(found.sentence).toBe('M01/1 is taken by booking 2418 until Mon 1 Jun 20:00.');
  });

  it('touching is free', () => {
    const touching = taken({ startMs: mondayMs + 17 * hourMs, endMs: mondayMs + 18 * hourMs });
    expect(
      result('double-use', buildPlacement({ facility: { allocations: [touching] } })),
    ).toMatchObject({ outcome: 'pass' });
  });

  it('a booking that is re-checked does not clash with itself, an outage of the same number does', () => {
    const own = { facility: { allocations: [taken()] }, ignoreBookingId: 2418 };
    expect(result('double-use', buildPlacement(own)).outcome).toBe('pass');
    const outage = { allocations: [taken({ by: 'outage' })] };
    expect(
      result('double-use', buildPlacement({ facility: outage, ignoreBookingId: 2418 })).outcome,
    ).toBe('stop');
  });

  it('the same channel cannot serve two cells', () => {
    const facts = buildPlacement({ request: { cellCount: 2 }, paths: [buildPath(), buildPath()] });
    expect(result('double-use', facts).sentence).toBe('S01/1 is chosen twice.');
  });

  it('no deviation lifts it and indicative work does not soften it', () => {
    const facts = buildPlacement({
      facility: { allocations: [taken()] },
      request: {
        grade: 'indicative',
        deviations: [{ id: 5, code: 'double-use', expiresAtMs: mondayMs + dayMs }],
      },
    });
    expect(result('double-use', facts)).toMatchObject({
      outcome: 'stop',
      liftedByDeviationId: null,
    });
    expect(result('double-use', facts).waysOut.map(({ kind }) => kind)).not.toContain('deviation');
  });
});

describe('position and path', () => {
  const withPosition = (change: Parameters<typeof buildPosition>[0]): PlacementFacts =>
    buildPlacement({ paths: [buildPath({ position: buildPosition(change) })] });

  it('a position takes only formats, capacities and hazards on its record', () => {
    expect(result('position-fit', withPosition({ formats: ['pouch'] })).sentence).toBe(
      'C01/1 takes pouch cells, not 18650.',
    );
    expect(result('position-fit', withPosition({ formats: [] })).outcome).toBe('stop');
    expect(result('position-fit', withPosition({ maxCapacityAh: 3.4 })).outcome).toBe('stop');
    expect(result('position-fit', withPosition({ maxCapacityAh: 3.5 })).outcome).toBe('pass');
    expect(result('position-fit', withPosition({ maxHazard: 3 })).outcome).toBe('stop');
  });

  it('every cell needs a path of its own', () => {
    expect(result('path-connects', buildPlacement({ request: { cellCount: 2 } })).sentence).toBe(
      '2 cells need 2 paths; 1 are chosen in C01.',
    );
  });

  it('all three must hang on one panel of the chamber', () => {
    const off = buildPath({ panel: buildPanel({ meterUnitIds: [2002] }) });
    expect(result('path-connects', buildPlacement({ paths: [off] })).outcome).toBe('stop');
    const elsewhere = buildPath({ position: buildPosition({ chamberId: 2 }) });
    expect(result('path-connects', buildPlacement({ paths: [elsewhere] })).sentence).toMatch(
      /is not in C01/,
    );
  });

  it('channels of one instrument go together or not at all', () => {
    const range = buildRange();
    const lonely = buildPath({ source: buildSource({ pairedUnitId: 2009 }), range });
    expect(result('path-connects', buildPlacement({ paths: [lonely] })).sentence).toMatch(
      /S01\/1.*pair/,
    );
    const paired = buildPath({
      source: buildSource({ pairedUnitId: 2001 }),
      meter: buildMeter({ pairedUnitId: 1001, ranges: [range] }),
      range,
    });
    expect(result('path-connects', buildPlacement({ paths: [paired] })).outcome).toBe('pass');
  });
});

describe('service and calibration', () => {
  it('what is awaiting release, out of service or retired stops', () => {
    for (const state of ['awaiting-release', 'out-of-service', 'retired'] as const) {
      const facts = buildPlacement({ paths: [buildPath({ source: buildSource({ state }) })] });
      expect(result('in-service', facts).outcome).toBe('stop');
      expect(result('in-service', buildPlacement({ chamber: { state } })).outcome).toBe('stop');
    }
  });

  it('a breakdown during the slot stops and is named', () => {
    const broken = taken({ by: 'unavailability', recordId: null, label: 'fan broken' });
    const facts = buildPlacement({ facility: { unavailabilities: [broken] } });
    expect(result('in-service', facts).sentence).toBe('M01/1 is unavailable: fan broken.');
  });

  it('a calibration that ends with the slot is enough, one minute less is not', () => {
    const endMs = mondayMs + 17 * hourMs;
    const until = (end: number): PlacementFacts =>
      buildPlacement({
        paths: [buildPath({ source: buildSource({ validity: [buildValidity({ endMs: end })] }) })],
      });
    expect(result('calibration-valid', until(endMs)).outcome).toBe('pass');
    expect(result('calibration-valid', until(endMs - 60_000)).outcome).toBe('stop');
  });

  it('the range that is booked counts, not another of the same meter', () => {
    const good = buildRange({ id: 2, label: '1 mA', fullScaleA: 1e-3 });
    const range = buildRange({ validity: [] });
    const path = buildPath({ range, meter: buildMeter({ ranges: [range, good] }) });
    const found = result('calibration-valid', buildPlacement({ paths: [path] }));
    expect(found.sentence).toBe('M01/1 100 µA is not validly calibrated at the start of the slot.');
    expect(found.waysOut.map(({ kind }) => kind)).toEqual([
      'record-calibration',
      'other-path',
      'deviation',
    ]);
  });

  it('the due day is named where it ends the validity', () => {
    const validity = [buildValidity({ endMs: mondayMs + 12 * hourMs, dueOn: '2026-05-31' })];
    const found = result('calibration-valid', buildPlacement({ chamber: { validity } }));
    expect(found.sentence).toBe(
      'C01 temperature is due 31 May 2026; the slot ends Mon 1 Jun 17:00.',
    );
  });

  it('a limitation in force is a caution with its words', () => {
    const validity = [buildValidity({ limitation: 'only up to 4 V' })];
    const facts = buildPlacement({ paths: [buildPath({ source: buildSource({ validity }) })] });
    expect(result('calibration-valid', facts)).toMatchObject({ outcome: 'caution' });
    expect(result('calibration-valid', facts).sentence).toMatch(/only up to 4 V/);
  });

  it('two calibrations that touch cover the slot together', () => {
    const noon = mondayMs + 12 * hourMs;
    const validity = [
      buildValidity({ endMs: noon, dueOn: null }),
      buildValidity({ startMs: noon, calibrationId: 2 }),
    ];
    expect(result('calibration-valid', buildPlacement({ chamber: { validity } })).outcome).toBe(
      'pass',
    );
  });
});

describe('meter and source', () => {
  const withRange = (change: Parameters<typeof buildRange>[0]): PlacementFacts =>
    buildPlacement({ paths: [buildPath({ range: buildRange(change) })] });

  it('the range must take one and a half times the expected 10.5 µA', () => {
    expect(result('meter-range', withRange({ fullScaleA: 1.5e-5 })).sentence).toBe(
      'M01/1 100 µA ends at 15 µA; 15.8 µA must fit.',
    );
    expect(result('meter-range', withRange({ fullScaleA: 1.6e-5 })).outcome).toBe('pass');
  });

  it('half of the allowance of 1.05 µA is a caution, all of it a stop', () => {
    // error = ppm of range × 100 µA; derived here: 5000 ppm are 0.5 µA (48 %), 6000 ppm 57 %, 11000 ppm 105 %
    const outcome = (accuracyPpmRange: number): string =>
      result('meter-range', withRange({ accuracyPpmRange, accuracyPpmReading: 0 })).outcome;
    expect([outcome(5000), outcome(6000), outcome(11_000)]).toEqual(['pass', 'caution', 'stop']);
  });

  it('a resolution of more than half the allowance stops', () => {
    expect(result('meter-range', withRange({ resolutionA: 6e-7 })).outcome).toBe('stop');
  });

  it('a screening needs room for a bad cell', () => {
    const request = {
      kind: 'screening',
      screening: { badToGoodRatio: 12, falseAlarm: 0.01, miss: 0.01 },
    } as const;
    const facts = buildPlacement({ request });
    expect(result('meter-range', facts).outcome).toBe('stop');
  });

  it('the source must reach the stated open-circuit voltage', () => {
    const span = (maxVoltageV: number, openCircuitVoltageV: number | null): string => {
      const base = buildPlacement();
      return result('source-span', {
        ...base,
        paths: [buildPath({ source: buildSource({ maxVoltageV }) })],
        request: { ...base.request, limits: { ...base.request.limits, openCircuitVoltageV } },
      }).outcome;
    };
    expect(span(3.7, 3.7)).toBe('pass');
    expect(span(3.6, 3.7)).toBe('stop');
    expect(span(4.2, null)).toBe('pass');
    expect(span(4, null)).toBe('caution');
    expect(span(2, null)).toBe('stop');
  });

  it('1 µV/h at 14000 F is 3.89 µA and more than 1.05 µA', () => {
    // C/3.6e9 A per µV/h; derived here
    const drift = (stabilityVPerH: number | null): CheckResult =>
      result(
        'source-stability',
        buildPlacement({ paths: [buildPath({ source: buildSource({ stabilityVPerH }) })] }),
      );
    expect(drift(1e-6).sentence).toBe('The drift of S01/1 takes 3.89 µA of 1.05 µA.');
    expect(drift(1e-6).outcome).toBe('stop');
    expect(drift(2e-7).outcome).toBe('caution');
    expect(drift(1e-7).outcome).toBe('pass');
    expect(drift(null).sentence).toBe('The drift of S01/1 was never stated.');
  });

  it('leads and burden must be recorded and nobody can lift that', () => {
    const path = buildPath({ panel: buildPanel({ leadResistanceOhm: null }) });
    const facts = buildPlacement({
      paths: [path],
      request: {
        grade: 'indicative',
        deviations: [{ id: 5, code: 'burden-known', expiresAtMs: mondayMs + 30 * dayMs }],
      },
    });
    expect(result('burden-known', facts).outcome).toBe('stop');
    expect(result('burden-known', withRange({ burdenOhm: null })).outcome).toBe('stop');
    expect(result('burden-known', withRange({ burdenInsideLoop: null })).outcome).toBe('stop');
    expect(result('burden-known', withRange({ burdenInsideLoop: false })).outcome).toBe('pass');
  });

  it('without an estimate the figures of meter and source are a caution, not a pass', () => {
    const base = buildPlacement();
    const estimate = buildEstimate({
      ...base.request,
      cell: { ...base.request.cell, chemistry: 'lfp', stateOfChargePct: null },
    });
    const facts = { ...base, estimate };
    expect(estimate.outcome).toBe('range');
    expect(result('meter-range', facts).outcome).toBe('caution');
    expect(result('source-stability', facts).outcome).toBe('caution');
    expect(result('temperature-current', facts).outcome).toBe('caution');
    expect(result('slot-length', facts).outcome).toBe('stop');
  });
});
