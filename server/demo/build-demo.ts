import type { SingleEstimate } from '#shared/domain/hold-estimate/types.ts';
import type { StabilityFact } from '#shared/domain/facility/types.ts';
import { layAuditTrail } from './audit-trail.ts';
import { layCellTypes } from './cell-types.ts';
import { fillCellStock, openCellStock } from './cells.ts';
import { layChannels } from './channel-plan.ts';
import { createContext, type DemoContext } from './demo-context.ts';
import type { DemoRows } from './demo-rows.ts';
import { openRegister, supportPlans } from './instruments.ts';
import { layCalibrations } from './metrology.ts';
import { openOccupancy } from './occupancy.ts';
import { layOtherWork } from './other-work.ts';
import { layOpenRequests, type WishedRequests } from './open-requests.ts';
import { layOutages } from './outages.ts';
import { layPeople } from './people.ts';
import { planLoads } from './plan-loads.ts';
import { layPolicies } from './policies.ts';
import { layProjects } from './projects.ts';
import { addSecondLot } from './second-lot.ts';
import { laySites } from './sites.ts';
import { layStability } from './stability.ts';
import { layChambers, type DemoChamber } from './wiring.ts';
import { writeWork } from './write-work.ts';

export const defaultDemoSeed = 20_260_616;

export type Demo = {
  readonly rows: DemoRows;
  /** The moment it is seen from. */
  readonly nowMs: number;
  readonly wished: WishedRequests;
  /** Estimates of all bookings, by number. */
  readonly estimates: ReadonlyMap<number, SingleEstimate>;
};

/** Builds every row of the demo; the same seed and moment give the same rows. */
export function buildDemo(input: { readonly seed: number; readonly nowMs: number }): Demo {
  const context = createContext(input);
  const sites = laySites(context);
  const people = layPeople(context, { larkfen: sites.larkfen.id, otterholm: sites.otterholm.id });
  layPolicies(context, sites, people);
  const projects = layProjects(context, people);
  const types = layCellTypes(context, people);
  const register = openRegister(context, sites, people);
  supportPlans.forEach((plan) => register.enter(plan));
  const pools = layChannels(context, register);
  const chambers = layChambers(context, register, pools, people);
  const dueDays = layCalibrations(context, register, sites, people);
  layStability(context, { chambers, register, sites, people });
  const occupancy = openOccupancy();
  layOutages(context, { register, sites, people, occupancy });
  layOtherWork(context, { chambers, sites, people, projects, occupancy });
  const stock = openCellStock(context, { sites, projects, types });
  fillCellStock(context, stock);
  const loads = planLoads(
    {
      nowMs: context.nowMs,
      sites,
      dice: context.diceFor('loads'),
      batches: stock.batches,
      occupancy,
      dueDays,
      stabilityOf: stabilityIn(context),
      risksLeft: new Map([
        ['M07', 2],
        ['S03', 1],
        ['S02', 1],
        ['C09', 2],
        ['M11', 1],
      ]),
    },
    { chambers, sites },
  );
  const estimates = writeWork(
    { context, sites, people, dueDays, dice: context.diceFor('work') },
    loads,
  );
  addSecondLot(context, stock);
  const wished = layOpenRequests({ context, stock, sites, people });
  layAuditTrail(context, people);
  return { rows: context.rows, nowMs: context.nowMs, wished, estimates };
}

/** The newest judged log by chamber and set temperature. */
function stabilityIn(
  context: DemoContext,
): (chamber: DemoChamber, setC: number) => StabilityFact | undefined {
  const newest = new Map<string, StabilityFact>();
  for (const row of context.rows.assessments) {
    const assessedAtMs = row.logToAt?.getTime() ?? 0;
    const key = `${row.chamberId} ${row.setTempMdegc}`;
    if (assessedAtMs > (newest.get(key)?.assessedAtMs ?? 0)) {
      newest.set(key, {
        id: row.id ?? 0,
        setTemperatureC: row.setTempMdegc / 1000,
        assessedAtMs,
        hoursLogged: row.hoursLogged,
        driftKPerH: row.driftKPerH,
        halfBandK: row.halfBandK,
        periodS: row.periodS ?? null,
        resolutionK: row.resolutionK,
        sensorPlace: row.sensorPlace,
      });
    }
  }
  return (chamber, setC) => newest.get(`${chamber.instrument.id} ${setC * 1000}`);
}
