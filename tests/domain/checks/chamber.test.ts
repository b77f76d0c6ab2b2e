import { describe, expect, it } from 'vitest';
import { checkRules } from '#shared/domain/checks/check-rules.ts';
import { evaluatePlacement } from '#shared/domain/checks/evaluate-placement.ts';
import { firstStop } from '#shared/domain/checks/first-stop.ts';
import { summarise } from '#shared/domain/checks/summarise.ts';
import { checkCodes } from '#shared/domain/checks/types.ts';
import type { CheckCode, CheckResult, PlacementFacts } from '#shared/domain/checks/types.ts';
import type { Load, PhaseSpan } from '#shared/domain/facility/types.ts';
import {
  buildChamber,
  buildLoad,
  buildPhaseSpans,
  buildSource,
  buildStability,
  dayMs,
  hourMs,
  mondayMs,
  sitePolicy,
} from '#tests/support/build-facility.ts';
import { buildPath, buildPlacement } from '#tests/support/build-placement.ts';

function result(code: CheckCode, facts: PlacementFacts): CheckResult {
  const found = evaluatePlacement(facts).find((candidate) => candidate.code === code);
  if (found === undefined) {
    throw new Error(`No check named ${code}.`);
  }
  return found;
}
const outcome = (code: CheckCode, facts: PlacementFacts): string => result(code, facts).outcome;
const monday = (hour: number): number => mondayMs + hour * hourMs;
const load = (phases: readonly PhaseSpan[], change: Partial<Load> = {}): Load =>
  buildLoad({
    phases,
    members: [{ bookingId: 900, cells: 2, energyWh: 25, needsS: {} }],
    ...change,
  });

describe('temperature and stillness of a chamber', () => {
  const atFortyFive = buildPhaseSpans(monday(10), 45, [
    ['connect', 15],
    ['ramp', 20],
    ['soak', 60],
  ]);

  it('a load at another temperature stops and is named', () => {
    const found = result(
      'shared-temperature',
      buildPlacement({ chamber: { loads: [load(atFortyFive)] } }),
    );
    expect(found.sentence).toBe(
      'Load 31 keeps C01 at 45 °C until Mon 1 Jun 10:35; this slot wants 25 °C in its hold.',
    );
  });

  it('a cancelled load disturbs nothing', () => {
    const loads = [load(atFortyFive, { state: 'cancelled' })];
    expect(outcome('shared-temperature', buildPlacement({ chamber: { loads } }))).toBe('pass');
    expect(outcome('still-phase', buildPlacement({ chamber: { loads } }))).toBe('pass');
  });

  it('a load that holds only the booking being re-checked does not count', () => {
    const loads = [load(atFortyFive)];
    expect(
      outcome('shared-temperature', buildPlacement({ chamber: { loads }, ignoreBookingId: 900 })),
    ).toBe('pass');
  });

  const door = buildPhaseSpans(monday(10), 25, [['connect', 15]]);

  it('a door during a hold stops under the strict rule and costs nothing under the tolerant one', () => {
    const loads = [load(door)];
    const strict = result('still-phase', buildPlacement({ chamber: { loads } }));
    expect(strict.sentence).toBe(
      'The connect of load 31 would disturb the hold at Mon 1 Jun 10:00.',
    );
    expect(outcome('still-phase', buildPlacement({ chamber: { loads, strictDoor: false } }))).toBe(
      'pass',
    );
  });

  it("the slot's own door must not fall into another load's hold either", () => {
    const other = buildPhaseSpans(monday(8.5), 25, [
      ['match', 20],
      ['hold', 60],
    ]);
    const found = result('still-phase', buildPlacement({ chamber: { loads: [load(other)] } }));
    expect(found.sentence).toMatch(/^The connect would disturb the hold of load 31/);
  });

  it('two loads may share a door opening at the idle temperature', () => {
    const other = buildPhaseSpans(monday(9), 25, [['unload', 15]]);
    const facts = buildPlacement({ chamber: { loads: [load(other)] } });
    expect(outcome('still-phase', facts)).toBe('pass');
    expect(outcome('shared-temperature', facts)).toBe('pass');
  });

  it('ramp and return disturb whatever the door rule', () => {
    const other = buildPhaseSpans(monday(10), 25, [['return', 15]]);
    expect(
      outcome(
        'still-phase',
        buildPlacement({ chamber: { loads: [load(other)], strictDoor: false } }),
      ),
    ).toBe('stop');
  });

  it('the chamber must reach the temperature and the request must tolerate it', () => {
    expect(outcome('chamber-span', buildPlacement({ setTemperatureC: 85 }))).toBe('stop');
    expect(outcome('chamber-span', buildPlacement({ setTemperatureC: 25.5 }))).toBe('pass');
    expect(result('chamber-span', buildPlacement({ setTemperatureC: 25.6 })).sentence).toBe(
      'C01 would be at 25.6 °C; asked is 25 °C ± 0.5 K.',
    );
  });
});

describe('joining a load', () => {
  const joined = (change: Partial<Load>): PlacementFacts => {
    const joins = load(buildPhaseSpans(monday(9), 25, [['connect', 15]]), change);
    return buildPlacement({ joins, chamber: { loads: [joins] } });
  };

  it('an open load may be joined until it closes or begins', () => {
    expect(outcome('load-open', joined({}))).toBe('pass');
    expect(outcome('load-open', joined({ closesAtMs: monday(7) }))).toBe('stop');
    expect(outcome('load-open', joined({ closesAtMs: monday(7) + 1 }))).toBe('pass');
    expect(outcome('load-open', joined({ state: 'closed' }))).toBe('stop');
    expect(outcome('load-open', { ...joined({}), nowMs: monday(9) })).toBe('stop');
  });

  it('a member that is re-checked has joined already', () => {
    expect(outcome('load-open', { ...joined({ state: 'closed' }), ignoreBookingId: 900 })).toBe(
      'pass',
    );
  });
});

describe('logged stability', () => {
  const withLog = (change: Parameters<typeof buildStability>[0]): PlacementFacts =>
    buildPlacement({ chamber: { assessments: [buildStability(change)] } });

  it('a log may be 90 days old at the start of the slot and no older', () => {
    const startMs = monday(9);
    expect(outcome('stability-logged', withLog({ assessedAtMs: startMs - 90 * dayMs }))).toBe(
      'pass',
    );
    expect(
      result('stability-logged', withLog({ assessedAtMs: startMs - 97 * dayMs })).sentence,
    ).toBe('The last stability log of C01 at 25 °C is 97 days old at the start, the limit is 90.');
  });

  it('a log half a kelvin away counts, one further away does not', () => {
    expect(outcome('stability-logged', withLog({ setTemperatureC: 25.5 }))).toBe('pass');
    expect(outcome('stability-logged', withLog({ setTemperatureC: 25.6 }))).toBe('stop');
    expect(outcome('stability-logged', buildPlacement({ chamber: { assessments: [] } }))).toBe(
      'stop',
    );
  });

  it('a log of the future proves nothing', () => {
    expect(outcome('stability-logged', withLog({ assessedAtMs: monday(10) }))).toBe('stop');
  });

  it('a steady chamber is ok, a drifting one disturbs, a coarse log cannot tell', () => {
    expect(outcome('temperature-current', withLog({}))).toBe('pass');
    const drifting = result('temperature-current', withLog({ driftKPerH: 0.02 }));
    expect(drifting.outcome).toBe('stop');
    expect(drifting.sentence).toMatch(/^Chamber and source induce about .* 1\.05 µA is allowed\.$/);
    const coarse = withLog({ resolutionK: 0.1 });
    expect(outcome('temperature-current', coarse)).toBe('caution');
    expect(result('temperature-current', coarse).sentence).toMatch(/cannot tell/);
  });

  it('where the log cannot tell, policy decides for reported work and not for indicative', () => {
    const coarse = (grade: 'reported' | 'indicative'): string =>
      outcome(
        'temperature-current',
        buildPlacement({
          request: { grade },
          chamber: { assessments: [buildStability({ resolutionK: 0.1 })] },
          facility: { policy: { ...sitePolicy, logCannotTell: 'stop' } },
        }),
      );
    expect(coarse('reported')).toBe('stop');
    expect(coarse('indicative')).toBe('caution');
  });

  it('the drift of the source counts in the forecast', () => {
    const source = buildSource({ stabilityVPerH: 2.5e-7 });
    expect(
      outcome('temperature-current', buildPlacement({ paths: [buildPath({ source })] })),
    ).not.toBe('pass');
  });

  it('a mapping must be in date to the end; none recorded is a caution', () => {
    expect(outcome('mapping', buildPlacement({ chamber: { mappingDueOn: '2026-06-01' } }))).toBe(
      'pass',
    );
    expect(outcome('mapping', buildPlacement({ chamber: { mappingDueOn: '2026-05-31' } }))).toBe(
      'stop',
    );
    expect(outcome('mapping', buildPlacement({ chamber: { mappingDueOn: null } }))).toBe('caution');
  });
});

describe('cells and safety', () => {
  const limits = buildPlacement().request.limits;

  it('temperature, voltage, charge and release are limits nobody lifts', () => {
    const deviations = [{ id: 1, code: 'cell-limits', expiresAtMs: monday(999) }] as const;
    const stops = [
      { limits: { ...limits, released: false } },
      { limits: { ...limits, maxTemperatureC: 20 } },
      { limits: { ...limits, openCircuitVoltageV: 4.3 } },
      { limits: { ...limits, maxHoldStateOfCharge: 40 } },
    ];
    for (const change of stops) {
      const facts = buildPlacement({ request: { ...change, deviations, grade: 'indicative' } });
      expect(outcome('cell-limits', facts)).toBe('stop');
    }
    expect(outcome('cell-limits', buildPlacement())).toBe('pass');
  });

  it('the idle temperature must be within the limits too', () => {
    const facts = buildPlacement({
      chamber: { idleTemperatureC: 5 },
      request: { limits: { ...limits, minTemperatureC: 10 } },
    });
    expect(result('cell-limits', facts).sentence).toMatch(/not at 5 °C/);
  });

  it("the chamber's protection must suit the hazard level", () => {
    expect(outcome('hazard-protection', buildPlacement({ chamber: { protectionLevel: 4 } }))).toBe(
      'pass',
    );
    expect(outcome('hazard-protection', buildPlacement({ chamber: { protectionLevel: 3 } }))).toBe(
      'stop',
    );
  });

  it('cells of loads at the same time count against the chamber, later loads do not', () => {
    const beside = load(buildPhaseSpans(monday(9), 25, [['wait', 60]]));
    const after = load(buildPhaseSpans(monday(10), 25, [['wait', 60]]), { id: 32 });
    const inChamber = (maxCells: number, loads: readonly Load[]): string =>
      outcome('energy-and-count', buildPlacement({ chamber: { maxCells, loads } }));
    expect(inChamber(3, [beside])).toBe('pass');
    expect(inChamber(2, [beside])).toBe('stop');
    expect(inChamber(3, [beside, after])).toBe('pass');
  });

  it('energy counts in the chamber and in the room', () => {
    expect(outcome('energy-and-count', buildPlacement({ chamber: { maxEnergyWh: 12 } }))).toBe(
      'stop',
    );
    const chamber = buildChamber();
    const neighbour = buildChamber({
      id: 2,
      loads: [load(buildPhaseSpans(monday(9), 25, [['wait', 60]]))],
    });
    const room = (maxEnergyWh: number): CheckResult =>
      result(
        'energy-and-count',
        buildPlacement({
          facility: { chambers: [chamber, neighbour], rooms: [{ name: 'Room 1', maxEnergyWh }] },
        }),
      );
    expect(room(38).outcome).toBe('pass');
    expect(room(37).sentence).toBe('Room 1 would hold 37.6 of 37 Wh.');
  });

  it('a night needs a permission that covers temperature, hazard, charge, type and time', () => {
    const phases = buildPhaseSpans(monday(9), 25, [
      ['connect', 15],
      ['hold', 340],
      ['measure', 60],
      ['wait', 1010],
      ['unload', 15],
    ]);
    const [permission] = buildChamber().unattended;
    if (permission === undefined) {
      throw new Error('The chamber has no permission.');
    }
    const night = (change: Partial<typeof permission>): string =>
      outcome(
        'unattended',
        buildPlacement({ phases, chamber: { unattended: [{ ...permission, ...change }] } }),
      );
    expect(night({})).toBe('pass');
    expect(night({ maxTemperatureC: 20 })).toBe('stop');
    expect(night({ maxHazard: 3 })).toBe('stop');
    expect(night({ maxStateOfCharge: 40 })).toBe('stop');
    expect(night({ cellTypeName: 'LF-60' })).toBe('stop');
    expect(night({ during: { startMs: 0, endMs: monday(20) } })).toBe('stop');
    expect(outcome('unattended', buildPlacement({ chamber: { unattended: [] } }))).toBe('pass');
  });

  it('announced cells are a caution, damaged ones a stop', () => {
    expect(outcome('cells-received', buildPlacement({ request: { cellsReceived: false } }))).toBe(
      'caution',
    );
    const damaged = buildPlacement({ request: { cellsDamaged: true, grade: 'indicative' } });
    expect(outcome('cells-received', damaged)).toBe('stop');
  });

  it('rest: 24 h, 7 and 30 days for a settled value; 7 days for a screening', () => {
    const rest = (days: number, kind: 'settled' | 'screening'): string =>
      outcome(
        'rest-time',
        buildPlacement({ request: { kind, restedSinceMs: monday(9) - days * dayMs } }),
      );
    expect([0.99, 1, 7, 29.9, 30].map((days) => rest(days, 'settled'))).toEqual([
      'stop',
      'caution',
      'caution',
      'caution',
      'pass',
    ]);
    expect([0.5, 6.9, 7].map((days) => rest(days, 'screening'))).toEqual([
      'caution',
      'caution',
      'pass',
    ]);
    expect(outcome('rest-time', buildPlacement({ request: { restedSinceMs: null } }))).toBe(
      'caution',
    );
  });
});

describe('time', () => {
  const slot = (startMs: number, match = 20): readonly PhaseSpan[] =>
    buildPhaseSpans(startMs, 25, [
      ['connect', 15],
      ['match', match],
      ['hold', 340],
      ['measure', 60],
      ['unload', 15],
    ]);

  it('connect and unload lie in working hours', () => {
    expect(outcome('working-hours', buildPlacement({ phases: slot(monday(8)) }))).toBe('pass');
    expect(result('working-hours', buildPlacement({ phases: slot(monday(7.75)) })).sentence).toBe(
      'The connect from Mon 1 Jun 07:45 to Mon 1 Jun 08:00 is outside working hours.',
    );
    expect(outcome('working-hours', buildPlacement({ phases: slot(monday(12)) }))).toBe('stop');
  });

  it('the match is attended only where the site says so', () => {
    const phases = buildPhaseSpans(monday(17.5), 25, [
      ['connect', 15],
      ['match', 20],
    ]);
    const match = (matchAttended: boolean): string =>
      outcome(
        'working-hours',
        buildPlacement({ phases, facility: { policy: { ...sitePolicy, matchAttended } } }),
      );
    expect(match(false)).toBe('pass');
    expect(match(true)).toBe('stop');
  });

  it('a hold below the likely length stops, below the safe length it is a caution', () => {
    // the estimate of the placement: likely 106 min, safe 205 min
    const hold = (minutes: number): string =>
      outcome(
        'slot-length',
        buildPlacement({
          phases: buildPhaseSpans(monday(9), 25, [
            ['connect', 15],
            ['hold', minutes],
            ['measure', 60],
          ]),
        }),
      );
    expect([100, 150, 190, 205].map(hold)).toEqual(['stop', 'caution', 'pass', 'pass']);
    expect(hold(73 * 60)).toBe('stop');
  });

  it('a date that is missed is never more than a caution', () => {
    const needed = (hour: number): string =>
      outcome('needed-by', buildPlacement({ request: { neededByMs: monday(hour) } }));
    expect([needed(17), needed(16)]).toEqual(['pass', 'caution']);
  });
});

describe('rules of the checks', () => {
  const old = {
    chamber: { assessments: [buildStability({ assessedAtMs: monday(9) - 97 * dayMs })] },
  };

  it('a deviation in force to the end turns a stop into a caution and is named', () => {
    const lifted = (expiresAtMs: number): CheckResult =>
      result(
        'stability-logged',
        buildPlacement({
          ...old,
          request: { deviations: [{ id: 12, code: 'stability-logged', expiresAtMs }] },
        }),
      );
    expect(lifted(monday(17))).toMatchObject({ outcome: 'caution', liftedByDeviationId: 12 });
    expect(lifted(monday(17) - 1)).toMatchObject({ outcome: 'stop', liftedByDeviationId: null });
  });

  it('quality stops become cautions for indicative work, the others do not', () => {
    expect(
      outcome('stability-logged', buildPlacement({ ...old, request: { grade: 'indicative' } })),
    ).toBe('caution');
    expect(
      outcome(
        'chamber-span',
        buildPlacement({ setTemperatureC: 85, request: { grade: 'indicative' } }),
      ),
    ).toBe('stop');
  });

  it('what protects people and other work is never lifted and never softens', () => {
    const never: readonly CheckCode[] = [
      'double-use',
      'path-connects',
      'shared-temperature',
      'still-phase',
      'cell-limits',
      'hazard-protection',
      'energy-and-count',
      'unattended',
      'position-fit',
      'cells-received',
    ];
    for (const code of never) {
      expect(checkRules[code]).toMatchObject({ isNeverLifted: true, softensForIndicative: false });
    }
    expect(checkCodes.every((code) => checkRules[code].title.length > 0)).toBe(true);
  });

  it('the first stop is the first of the order and null where all is well', () => {
    const facts = buildPlacement({ ...old, setTemperatureC: 85 });
    expect(firstStop(facts)?.code).toBe('chamber-span');
    expect(firstStop(buildPlacement())).toBeNull();
  });

  it('a summary has the worst outcome and the tightest measure', () => {
    const results = evaluatePlacement(buildPlacement(old));
    const summary = summarise(results);
    expect(summary.outcome).toBe('stop');
    expect(summary.stops.map(({ code }) => code)).toEqual(['stability-logged']);
    expect(summary.tightest?.code).toBe('stability-logged');
    expect(summary.passes.length + summary.cautions.length + 1).toBe(results.length);
    expect(summarise([])).toMatchObject({ outcome: 'pass', tightest: null });
  });
});
