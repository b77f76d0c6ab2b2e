import { findWorkingStart } from '#shared/domain/calendar/find-working-start.ts';
import type { LoadPhase } from '#shared/domain/hold-estimate/types.ts';
import { known, stamped, type DemoContext } from './demo-context.ts';
import { dayMs, hourMs, minuteMs } from './demo-days.ts';
import type { DemoProject } from './projects.ts';
import type { Occupancy } from './occupancy.ts';
import type { People } from './people.ts';
import type { Sites } from './sites.ts';
import type { DemoChamber } from './wiring.ts';

const plans = [
  {
    tag: 'C10',
    kind: 'cycling',
    title: 'Cycling of 5 cells, 1C, for the Silt project',
    setC: 25,
    cellCount: 5,
    fromDays: 3,
    lengthDays: 4,
    project: 'SILT',
  },
  {
    tag: 'C14',
    kind: 'ageing',
    title: 'Calendar ageing at 60 °C, 8 cells',
    setC: 60,
    cellCount: 8,
    fromDays: -6,
    lengthDays: 20,
    project: 'MAPLE',
  },
  {
    tag: 'C09',
    kind: 'ageing',
    title: 'Calendar ageing at 45 °C, 6 cells',
    setC: 45,
    cellCount: 6,
    fromDays: -64,
    lengthDays: 14,
    project: 'HEDGE',
  },
] as const;

/** Work on the same chambers that is no leakage measurement; it holds a load of its own. */
export function layOtherWork(
  context: DemoContext,
  input: {
    readonly chambers: readonly DemoChamber[];
    readonly sites: Sites;
    readonly people: People;
    readonly projects: readonly DemoProject[];
    readonly occupancy: Occupancy;
  },
): void {
  const chambers = new Map(input.chambers.map((chamber) => [chamber.plan.tag, chamber]));
  const projects = new Map(input.projects.map((project) => [project.code, project.id]));
  for (const plan of plans) {
    const chamber = known(chambers, plan.tag);
    const { calendar, id: siteId } = input.sites[chamber.plan.site];
    const phases = layPhases(calendar, context.nowMs, plan, chamber.plan.rampKPerMin);
    const [first, last] = [phases.at(0), phases.at(-1)];
    if (first === undefined || last === undefined) {
      continue;
    }
    const span = { startMs: first.startMs, endMs: last.endMs };
    const loadId = context.number('loads');
    const chamberId = chamber.instrument.id;
    const made = stamped(Math.min(span.startMs, context.nowMs) - 9 * dayMs);
    context.rows.loads.push({
      id: loadId,
      chamberId,
      strict: chamber.plan.strict,
      state:
        span.endMs <= context.nowMs ? 'done' : span.startMs <= context.nowMs ? 'running' : 'closed',
      closesAt: new Date(span.startMs - dayMs),
      setTempMdegc: plan.setC * 1000,
      live: true,
      ...made,
    });
    phases.forEach((phase, seq) => {
      context.rows.loadPhases.push({
        id: context.number('loadPhases'),
        loadId,
        chamberId,
        strict: chamber.plan.strict,
        seq,
        phase: phase.phase,
        setTempMdegc: phase.setC * 1000,
        during: { startMs: phase.startMs, endMs: phase.endMs },
        live: true,
      });
    });
    const otherWorkId = context.number('otherWork');
    context.rows.otherWork.push({
      id: otherWorkId,
      siteId,
      loadId,
      projectId: known(projects, plan.project),
      kind: plan.kind,
      title: plan.title,
      cellCount: plan.cellCount,
      during: span,
      plannedById: input.people.scheduler,
      ...made,
    });
    for (const path of chamber.paths.slice(-plan.cellCount)) {
      input.occupancy.take(path.positionUnitId, span);
      context.rows.allocations.push({
        id: context.number('allocations'),
        unitId: path.positionUnitId,
        during: span,
        live: true,
        otherWorkId,
        createdAt: made.createdAt,
      });
    }
    input.occupancy.closeChamber(chamberId, span);
  }
}

type OtherPhase = {
  readonly phase: LoadPhase;
  readonly setC: number;
  readonly startMs: number;
  readonly endMs: number;
};

function layPhases(
  calendar: Sites['larkfen']['calendar'],
  nowMs: number,
  plan: (typeof plans)[number],
  rampKPerMin: number,
): OtherPhase[] {
  const startMs = findWorkingStart(calendar, {
    fromMs: nowMs + plan.fromDays * dayMs,
    lengthMs: hourMs,
    untilMs: nowMs + (plan.fromDays + 12) * dayMs,
  });
  const unloadMs = findWorkingStart(calendar, {
    fromMs: nowMs + (plan.fromDays + plan.lengthDays) * dayMs,
    lengthMs: hourMs,
    untilMs: nowMs + (plan.fromDays + plan.lengthDays + 12) * dayMs,
  });
  if (startMs === null || unloadMs === null) {
    return [];
  }
  const rampMs = Math.ceil(Math.abs(plan.setC - 25) / rampKPerMin) * minuteMs;
  const heldMs = unloadMs - rampMs * 2;
  const lines: readonly (readonly [LoadPhase, number, number])[] = [
    ['connect', 25, startMs + hourMs],
    ['ramp', plan.setC, startMs + hourMs + rampMs],
    ['hold', plan.setC, heldMs],
    ['return', plan.setC, heldMs + rampMs],
    ['wait', 25, unloadMs],
    ['unload', 25, unloadMs + hourMs],
  ];
  const phases: OtherPhase[] = [];
  let atMs = startMs;
  for (const [phase, setC, endMs] of lines) {
    if (endMs > atMs) {
      phases.push({ phase, setC, startMs: atMs, endMs });
      atMs = endMs;
    }
  }
  return phases;
}
