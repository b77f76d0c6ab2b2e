import { restVoltage, type DemoCellType } from './cell-types.ts';
import { known, stamped, type DemoContext } from './demo-context.ts';
import { dayMs, hourMs } from './demo-days.ts';
import type { Dice } from './dice.ts';
import type { DemoProject } from './projects.ts';
import type { SiteKey, Sites } from './sites.ts';

/** Cells of one type that came together and have the same history. */
export type Batch = {
  readonly key: string;
  readonly site: SiteKey;
  readonly project: DemoProject;
  readonly type: DemoCellType;
  readonly cellIds: readonly number[];
  /** From when on they can be measured, and until when they are in the house. */
  readonly fromMs: number;
  readonly untilMs: number;
  readonly isAnnounced: boolean;
  readonly stateOfChargePct: number;
  readonly restedSinceMs: number;
};
export type BatchPlan = {
  readonly key: string;
  readonly project: DemoProject;
  readonly type: DemoCellType;
  readonly count: number;
  readonly receivedMs: number;
  readonly leavesMs: number;
  readonly stateOfChargePct: number;
  readonly restedSinceMs: number;
  readonly isAnnounced?: boolean;
};
export type CellStock = {
  readonly batches: Batch[];
  readonly receive: (plan: BatchPlan) => Batch;
  readonly typeNamed: (name: string) => DemoCellType;
  readonly projectNamed: (code: string) => DemoProject;
};

export function openCellStock(
  context: DemoContext,
  input: {
    readonly sites: Sites;
    readonly projects: readonly DemoProject[];
    readonly types: readonly DemoCellType[];
  },
): CellStock {
  const types = new Map(input.types.map((type) => [type.name, type]));
  const projects = new Map(input.projects.map((project) => [project.code, project]));
  const serials = new Map<string, number>();
  const dice = context.diceFor('cells');
  const batches: Batch[] = [];

  function nextSerial(type: DemoCellType): string {
    const next = (serials.get(type.name) ?? 100) + 1;
    serials.set(type.name, next);
    return `${type.name}-${String(next).padStart(4, '0')}`;
  }
  function receive(plan: BatchPlan): Batch {
    const site = plan.project.site;
    const isAnnounced = plan.isAnnounced ?? false;
    const hasLeft = plan.leavesMs < context.nowMs;
    const cellIds = Array.from({ length: plan.count }, () => {
      const id = context.number('cells');
      context.rows.cells.push({
        id,
        serial: isAnnounced ? null : nextSerial(plan.type),
        lotCode: plan.key,
        siteId: input.sites[site].id,
        projectId: plan.project.id,
        cellTypeId: plan.type.id,
        ...(isAnnounced ? announced : present(plan, hasLeft, dice)),
        stateOfChargePct: plan.stateOfChargePct,
        lastChargedAt: new Date(plan.restedSinceMs),
        lastChargeDirection: 'charge',
        lastChargeTemperatureC: 23,
        storageTemperatureC: isAnnounced ? null : 22,
        ...stamped(Math.min(plan.receivedMs, context.nowMs - dayMs)),
      });
      return id;
    });
    const batch: Batch = {
      key: plan.key,
      site,
      project: plan.project,
      type: plan.type,
      cellIds,
      fromMs: plan.receivedMs + dayMs,
      untilMs: plan.leavesMs,
      isAnnounced,
      stateOfChargePct: plan.stateOfChargePct,
      restedSinceMs: plan.restedSinceMs,
    };
    batches.push(batch);
    return batch;
  }
  return {
    batches,
    receive,
    typeNamed: (name) => known(types, name),
    projectNamed: (code) => known(projects, code),
  };
}

const announced = { status: 'announced', place: null } as const;

function present(
  plan: BatchPlan,
  hasLeft: boolean,
  dice: Dice,
): Partial<DemoContext['rows']['cells'][number]> & { status: 'stored' | 'returned' | 'disposed' } {
  const ocvV = restVoltage(plan.type, plan.stateOfChargePct) + dice.normal() * 0.0015;
  return {
    status: hasLeft ? (dice.chance(0.8) ? 'returned' : 'disposed') : 'stored',
    receivedAt: new Date(plan.receivedMs),
    condition: 'good',
    ocvV: Math.round(ocvV * 1e5) / 1e5,
    place: hasLeft ? null : `Cell store, shelf ${dice.whole(1, 9)}-${dice.whole(1, 6)}`,
  };
}

/** Deliveries over nineteen months; a few are still on their way. */
export function fillCellStock(context: DemoContext, stock: CellStock): void {
  const dice = context.diceFor('deliveries');
  const names = [
    'HEDGE',
    'SILT',
    'ANVIL',
    'BEACON',
    'WREN',
    'DRUM',
    'MAPLE',
    'FERRY',
    'MAPLE',
    'FERRY',
  ];
  for (let index = 0; index < 106; index += 1) {
    const project = stock.projectNamed(names[index % names.length] ?? 'HEDGE');
    const type = stock.typeNamed(dice.pick(project.types));
    const isLarge = type.capacityAh >= 20;
    const receivedMs = workingHour(
      context.nowMs - (560 - (index * 545) / 106 + dice.between(0, 4)) * dayMs,
      dice,
    );
    const leavesMs = receivedMs + dice.between(150, 420) * dayMs;
    stock.receive({
      key: `L${String(240 + index)}`,
      project,
      type,
      count: isLarge ? dice.whole(5, 8) : dice.whole(7, 12),
      receivedMs,
      leavesMs: leavesMs > context.nowMs - 20 * dayMs ? context.nowMs + 900 * dayMs : leavesMs,
      stateOfChargePct: chargeOf(type, dice),
      restedSinceMs: receivedMs - dice.between(9, 40) * dayMs,
    });
  }
  for (const [code, typeName, inDays] of [
    ['HEDGE', 'CY48', 9],
    ['ANVIL', 'NP35', 13],
    ['MAPLE', 'CY50', 8],
  ] as const) {
    stock.receive({
      key: `L${typeName}-next`,
      project: stock.projectNamed(code),
      type: stock.typeNamed(typeName),
      count: 6,
      receivedMs: context.nowMs + inDays * dayMs,
      leavesMs: context.nowMs + 900 * dayMs,
      stateOfChargePct: 40,
      restedSinceMs: context.nowMs - 21 * dayMs,
      isAnnounced: true,
    });
  }
}

/** LFP is measured below its plateau; everything else near the middle. */
export function chargeOf(type: DemoCellType, dice: Dice): number {
  return type.chemistry === 'lfp' ? dice.pick([20, 22, 25]) : dice.pick([30, 40, 50, 50, 60]);
}

function workingHour(atMs: number, dice: Dice): number {
  const startOfDayMs = Math.floor(atMs / dayMs) * dayMs;
  return startOfDayMs + dice.whole(18, 30) * (hourMs / 2);
}
