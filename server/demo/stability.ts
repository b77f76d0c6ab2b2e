import type { ChamberPlan } from './chamber-plan.ts';
import { known, stamped, type DemoContext } from './demo-context.ts';
import { dayFrom, dayMs, hourMs } from './demo-days.ts';
import type { Dice } from './dice.ts';
import type { Register } from './instruments.ts';
import type { People } from './people.ts';
import type { Sites } from './sites.ts';
import type { DemoChamber } from './wiring.ts';

/** A log older than the policy's 90 days no longer counts. */
const staleLog = { tag: 'C02', setC: 45, days: 97 };
const mappingDueInDays: Readonly<Record<string, number>> = { C05: 52, C09: 24, C14: -11 };

/** Judged logs: the newest of each set temperature and some that came before. */
export function layStability(
  context: DemoContext,
  input: {
    readonly chambers: readonly DemoChamber[];
    readonly register: Register;
    readonly sites: Sites;
    readonly people: People;
  },
): void {
  const dice = context.diceFor('stability');
  for (const { plan, instrument } of input.chambers) {
    const zone = input.sites[plan.site].zone;
    for (const setC of plan.loggedC) {
      const newest =
        plan.tag === staleLog.tag && setC === staleLog.setC ? staleLog.days : dice.whole(4, 42);
      for (const ageDays of [newest + 180 + dice.whole(0, 20), newest + 88, newest]) {
        const logToMs = context.nowMs - ageDays * dayMs;
        const hoursLogged = dice.pick([36, 48, 60, 72]);
        context.rows.assessments.push({
          id: context.number('assessments'),
          chamberId: instrument.id,
          setTempMdegc: setC * 1000,
          assessedOn: dayFrom(logToMs, 0, zone),
          logFromAt: new Date(logToMs - hoursLogged * hourMs),
          logToAt: new Date(logToMs),
          hoursLogged,
          ...figuresOf(plan, setC, dice),
          loggerId: known(input.register.byTag, loggerOf(plan)).id,
          doorTolerant: !plan.strict,
          assessedById:
            plan.site === 'larkfen' ? input.people.metrologist : input.people.secondMetrologist,
          note: noteOf(plan),
          ...stamped(logToMs + 2 * hourMs),
        });
      }
    }
    layUpkeep(context, { instrument, plan, zone, dice });
  }
}

function figuresOf(
  plan: ChamberPlan,
  setC: number,
  dice: Dice,
): {
  driftKPerH: number;
  halfBandK: number;
  periodS: number | null;
  resolutionK: number;
  sensorPlace: string;
} {
  const warmer = 1 + Math.abs(setC - 25) / 80;
  if (plan.manner === 'coarse') {
    return {
      driftKPerH: 0.01,
      halfBandK: 0.1,
      periodS: null,
      resolutionK: 0.1,
      sensorPlace: 'air',
    };
  }
  if (plan.manner === 'restless') {
    return {
      driftKPerH: milli(dice.between(14, 19) * warmer),
      halfBandK: milli(dice.between(30, 45)),
      periodS: 780,
      resolutionK: 0.001,
      sensorPlace: 'dummy',
    };
  }
  return {
    driftKPerH: milli(dice.between(0.4, 1.1) * warmer),
    halfBandK: milli(dice.between(1.5, 3)),
    periodS: dice.pick([300, 360, 420]),
    resolutionK: 0.001,
    sensorPlace: 'dummy',
  };
}

/** Millikelvin to one decimal, as kelvin. */
function milli(value: number): number {
  return Math.round(value * 10) / 10_000;
}

function loggerOf(plan: ChamberPlan): string {
  if (plan.site === 'otterholm') {
    return plan.manner === 'coarse' ? 'L06' : 'L05';
  }
  if (plan.manner === 'coarse') {
    return 'L04';
  }
  return plan.room === 'Room 1' ? 'L01' : plan.room === 'Room 2' ? 'L02' : 'L03';
}

function noteOf(plan: ChamberPlan): string | null {
  if (!plan.strict) {
    return 'Two door openings of 90 s at 25 °C: the dummy cell moved 0.4 mK and came back.';
  }
  return plan.manner === 'coarse'
    ? 'The logger shows steps of 0.1 K; small drifts stay unseen.'
    : null;
}

/** Mapping and maintenance fall due as well. */
function layUpkeep(
  context: DemoContext,
  input: {
    readonly instrument: DemoChamber['instrument'];
    readonly plan: ChamberPlan;
    readonly zone: string;
    readonly dice: Dice;
  },
): void {
  const { instrument, plan, zone, dice } = input;
  const mappingIn = mappingDueInDays[plan.tag] ?? dice.whole(70, 600);
  const lines = [
    { kind: 'mapping', intervalMonths: 24, inDays: mappingIn },
    { kind: 'maintenance', intervalMonths: 12, inDays: dice.whole(20, 340) },
  ] as const;
  for (const { kind, intervalMonths, inDays } of lines) {
    context.rows.duties.push({
      id: context.number('duties'),
      instrumentId: instrument.id,
      kind,
      intervalMonths,
      nextDueOn: dayFrom(context.nowMs, inDays, zone),
      custodianId: instrument.custodianId,
      ...stamped(context.nowMs - 1080 * dayMs),
    });
  }
}
