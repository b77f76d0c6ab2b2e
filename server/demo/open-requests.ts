import { previousWorkingMoment } from '#shared/domain/calendar/previous-working-moment.ts';
import type { Batch, CellStock } from './cells.ts';
import { stamped, type DemoContext } from './demo-context.ts';
import { dayMs, hourMs } from './demo-days.ts';
import { openRequestPlans, type OpenRequestPlan } from './open-request-plan.ts';
import type { People } from './people.ts';
import type { DemoProject } from './projects.ts';
import type { Sites } from './sites.ts';

type Tools = {
  readonly context: DemoContext;
  readonly stock: CellStock;
  readonly sites: Sites;
  readonly people: People;
};
/** Requests whose engineer already has a slot in mind; the slot is looked up once all is written. */
export type WishedRequests = readonly {
  readonly requestId: number;
  readonly lotId: number;
  readonly siteId: number;
}[];

export function layOpenRequests(tools: Tools): WishedRequests {
  return openRequestPlans.flatMap((plan, index) => {
    const written = layRequest(tools, plan, index);
    if (plan.deviation !== undefined) {
      layDeviation(tools, plan.deviation, written);
    }
    return plan.hasProposal === true ? [written] : [];
  });
}

type Written = {
  readonly requestId: number;
  readonly lotId: number;
  readonly siteId: number;
  readonly requesterId: number;
  readonly submittedMs: number;
};

function layRequest(tools: Tools, plan: OpenRequestPlan, index: number): Written {
  const { context, stock, sites } = tools;
  const project = stock.projectNamed(plan.project);
  const site = sites[project.site];
  const batch = batchFor(tools, plan, project, index);
  const requesterId = project.requesterIds[index % project.requesterIds.length] ?? 0;
  const aimedMs = context.nowMs - plan.daysAgo * dayMs;
  const submittedMs = previousWorkingMoment(site.calendar, aimedMs) ?? aimedMs;
  const requestId = context.number('requests');
  context.rows.requests.push({
    id: requestId,
    siteId: site.id,
    projectId: project.id,
    requesterId,
    setTempMdegc: plan.setC * 1000,
    setToleranceMk: 500,
    ...aimOf(plan),
    ...deskOf(plan, { submittedMs, nowMs: context.nowMs }),
    ...stamped(submittedMs - hourMs, submittedMs),
  });
  const lotId = context.number('lots');
  const type = stock.typeNamed(plan.type);
  context.rows.lots.push({
    id: lotId,
    requestId,
    seq: 1,
    cellTypeId: type.id,
    cellCount: plan.count,
    stateOfChargePct: plan.chargePct,
    restedSinceAt: batch === undefined ? null : new Date(batch.restedSinceMs),
    storageTemperatureC: 22,
    isDamaged: plan.cells === 'quarantined',
  });
  for (const cellId of batch?.cellIds ?? []) {
    context.rows.lotCells.push({ lotId, cellId });
  }
  return { requestId, lotId, siteId: site.id, requesterId, submittedMs };
}

function aimOf(plan: OpenRequestPlan) {
  const grade = plan.grade ?? 'reported';
  if (plan.screening !== undefined) {
    return { kind: 'screening', grade, badToGoodRatio: plan.screening } as const;
  }
  const { settledA, settled = 0.1 } = plan;
  const tolerance =
    settledA === undefined
      ? ({ toleranceKind: 'relative', toleranceFraction: settled } as const)
      : ({ toleranceKind: 'absolute', toleranceCurrentA: settledA } as const);
  return { kind: 'settled', grade, ...tolerance } as const;
}

/** Where the request stands and what was written on it. */
function deskOf(plan: OpenRequestPlan, at: { submittedMs: number; nowMs: number }) {
  const { state = 'submitted', declineReason = null, neededInDays } = plan;
  const wasSubmitted = state !== 'draft' || declineReason !== null;
  return {
    state,
    declineReason,
    submittedAt: wasSubmitted ? new Date(at.submittedMs) : null,
    neededByAt: neededInDays === null ? null : new Date(at.nowMs + neededInDays * dayMs),
    maySplit: plan.maySplit ?? false,
    note: plan.note ?? null,
    priority: plan.priority ?? 'normal',
  };
}

function batchFor(
  tools: Tools,
  plan: OpenRequestPlan,
  project: DemoProject,
  index: number,
): Batch | undefined {
  const { context, stock } = tools;
  if (plan.cells === 'unnamed') {
    return undefined;
  }
  const isAnnounced = plan.cells === 'announced';
  const batch = stock.receive({
    key: `L${380 + index}`,
    project,
    type: stock.typeNamed(plan.type),
    count: plan.count,
    receivedMs: isAnnounced
      ? context.nowMs + 9 * dayMs
      : context.nowMs - (plan.daysAgo + 3 + (index % 5)) * dayMs,
    leavesMs: context.nowMs + 900 * dayMs,
    stateOfChargePct: plan.chargePct ?? 50,
    restedSinceMs: context.nowMs - (plan.restDays ?? 34 + index) * dayMs,
    isAnnounced,
  });
  if (plan.cells === 'quarantined') {
    quarantine(context, batch);
  }
  return batch;
}

function quarantine(context: DemoContext, batch: Batch): void {
  const { cells } = context.rows;
  const ids = new Set(batch.cellIds);
  cells.forEach((cell, index) => {
    if (cell.id !== undefined && ids.has(cell.id)) {
      cells[index] = {
        ...cell,
        status: 'quarantined',
        condition: index % 2 === 0 ? 'damaged' : 'suspicious',
        conditionNote: 'Dent at the positive end, found at receipt. Kept in the fire cabinet.',
        place: 'Fire cabinet 2',
      };
    }
  });
}

function layDeviation(
  tools: Tools,
  state: 'asked' | 'granted' | 'refused',
  request: Written,
): void {
  const { context, people } = tools;
  const askedMs = request.submittedMs + 2 * hourMs;
  const decidedMs = Math.min(askedMs + dayMs, context.nowMs - hourMs);
  const isDecided = state !== 'asked';
  context.rows.deviations.push({
    id: context.number('deviations'),
    requestId: request.requestId,
    checkCode: 'stability-logged',
    state,
    reason:
      state === 'asked'
        ? 'No log at 50 °C; the logs at 45 °C and 60 °C are both quiet. May C03 be used between them?'
        : 'The logger is away for calibration and the chamber was quiet in the last three logs.',
    decisionReason: isDecided
      ? 'Three quiet logs in a row; the run’s own log will be judged.'
      : null,
    customerAcceptance: isDecided ? 'Agreed by the customer’s engineer by mail.' : null,
    requestedById: request.requesterId,
    requestedAt: new Date(askedMs),
    decidedById: isDecided ? people.manager : null,
    decidedAt: isDecided ? new Date(decidedMs) : null,
    expiresAt: isDecided ? new Date(context.nowMs + 40 * dayMs) : null,
    ...stamped(askedMs, isDecided ? decidedMs : askedMs),
  });
}
