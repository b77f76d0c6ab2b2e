import { layCellTypes } from './cell-types.ts';
import { fillCellStock, openCellStock } from './cells.ts';
import { layChannels } from './channel-plan.ts';
import { createContext, known, type DemoContext } from './demo-context.ts';
import type { DemoRows } from './demo-rows.ts';
import { openRegister, supportPlans } from './instruments.ts';
import { layCalibrations } from './metrology.ts';
import { openOccupancy } from './occupancy.ts';
import { layOtherWork } from './other-work.ts';
import { layOutages } from './outages.ts';
import { layPeople } from './people.ts';
import { planLoads } from './plan-loads.ts';
import { layProjects } from './projects.ts';
import { laySites } from './sites.ts';
import { layStability } from './stability.ts';
import { layChambers, type DemoPath } from './wiring.ts';
import { writeWork } from './write-work.ts';

export const defaultDemoSeed = 20_260_616;

/** Builds every row of the demo; the same seed and moment give the same rows. */
export function buildDemo(input: { readonly seed: number; readonly nowMs: number }): DemoRows {
  const context = createContext(input);
  const sites = laySites(context);
  const people = layPeople(context, { larkfen: sites.larkfen.id, otterholm: sites.otterholm.id });
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
      driftOf: driftsOf(context),
      risksLeft: { count: 9 },
    },
    { chambers, sites },
  );
  writeWork({ context, sites, people, dueDays, dice: context.diceFor('work') }, loads);
  return context.rows;
}

function driftsOf(context: DemoContext): (path: DemoPath) => number {
  const drifts = new Map(
    context.rows.sourceSpecs.map((row) => [row.instrumentId, row.stabilityVPerH ?? 0]),
  );
  return (path) => known(drifts, path.source.instrument.id);
}
