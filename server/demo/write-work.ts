import { previousWorkingMoment } from '#shared/domain/calendar/previous-working-moment.ts';
import { estimateModelVersion, type SingleEstimate } from '#shared/domain/hold-estimate/types.ts';
import type { BookingState, LoadState, RequestState } from '#shared/domain/states.ts';
import { stamped, type DemoContext } from './demo-context.ts';
import { dayMs, hourMs, minuteMs } from './demo-days.ts';
import type { Dice } from './dice.ts';
import { findRisk } from './find-risk.ts';
import type { DueDays } from './metrology.ts';
import type { People } from './people.ts';
import type { PlannedBooking, PlannedLoad } from './planned-work.ts';
import type { Sites } from './sites.ts';
import { writeRun } from './write-run.ts';

export type WorkTools = {
  readonly context: DemoContext;
  readonly sites: Sites;
  readonly people: People;
  readonly dueDays: DueDays;
  readonly dice: Dice;
};
type Dated = {
  readonly load: PlannedLoad;
  readonly submittedMs: readonly number[];
};

/**
 * Gives planned loads their numbers, oldest request first, and writes everything that hangs on them.
 * Returns the estimates by booking.
 */
export function writeWork(
  tools: WorkTools,
  loads: readonly PlannedLoad[],
): ReadonlyMap<number, SingleEstimate> {
  const estimates = new Map<number, SingleEstimate>();
  const dated = loads
    .map((load): Dated => ({ load, submittedMs: load.bookings.map(() => submitted(tools, load)) }))
    .sort((a, b) => Math.min(...a.submittedMs) - Math.min(...b.submittedMs));
  for (const { load, submittedMs } of dated) {
    const loadId = writeLoad(tools, load);
    load.bookings.forEach((booking, index) => {
      const at = { load, loadId, booking, submittedMs: submittedMs[index] ?? 0 };
      estimates.set(writeBooking(tools, at), booking.estimate.result);
    });
  }
  return estimates;
}

function submitted(tools: WorkTools, load: PlannedLoad): number {
  const { dice, context, sites } = tools;
  const latestMs = Math.min(
    load.span.startMs - dice.between(3, 18) * dayMs,
    context.nowMs - dice.between(1.2, 9) * dayMs,
  );
  return previousWorkingMoment(sites[load.chamber.plan.site].calendar, latestMs) ?? latestMs;
}

function writeLoad(tools: WorkTools, load: PlannedLoad): number {
  const { context } = tools;
  const id = context.number('loads');
  const isLive = load.cancelReason === null;
  const chamberId = load.chamber.instrument.id;
  const { strict } = load.chamber.plan;
  const madeMs = Math.min(load.span.startMs, context.nowMs) - 2 * dayMs;
  const closesMs = load.span.startMs - 2 * hourMs;
  context.rows.loads.push({
    id,
    chamberId,
    strict,
    state: loadState(load, closesMs, tools),
    closesAt: new Date(closesMs),
    setTempMdegc: load.setC * 1000,
    live: isLive,
    ...stamped(madeMs),
  });
  load.phases.forEach((phase, seq) => {
    context.rows.loadPhases.push({
      id: context.number('loadPhases'),
      loadId: id,
      chamberId,
      strict,
      seq,
      plateau: 0,
      phase: phase.phase,
      setTempMdegc: phase.setTemperatureC * 1000,
      during: { startMs: phase.startMs, endMs: phase.endMs },
      live: isLive,
    });
  });
  return id;
}

function loadState(load: PlannedLoad, closesMs: number, tools: WorkTools): LoadState {
  const { nowMs } = tools.context;
  if (load.cancelReason !== null) {
    return 'cancelled';
  }
  if (load.span.endMs <= nowMs) {
    return 'done';
  }
  if (load.span.startMs <= nowMs) {
    return 'running';
  }
  return closesMs <= nowMs || tools.dice.chance(0.25) ? 'closed' : 'open';
}

function bookingState(load: PlannedLoad, booking: PlannedBooking, nowMs: number): BookingState {
  if (load.cancelReason !== null) {
    return 'cancelled';
  }
  if (load.span.endMs <= nowMs) {
    return 'done';
  }
  if (load.span.startMs <= nowMs) {
    return 'running';
  }
  return booking.batch.isAnnounced ? 'tentative' : 'confirmed';
}

const requestStateOf: Readonly<Record<BookingState, RequestState>> = {
  tentative: 'booked',
  confirmed: 'booked',
  running: 'booked',
  done: 'done',
  cancelled: 'withdrawn',
};

function writeBooking(
  tools: WorkTools,
  work: {
    readonly load: PlannedLoad;
    readonly loadId: number;
    readonly booking: PlannedBooking;
    readonly submittedMs: number;
  },
): number {
  const { context, people, dice, sites } = tools;
  const { load, booking } = work;
  const { nowMs } = context;
  const siteKey = load.chamber.plan.site;
  const state = bookingState(load, booking, nowMs);
  const { requestId, lotId } = writeRequest(tools, { ...work, state });
  const id = context.number('bookings');
  const confirmedMs = Math.min(
    work.submittedMs + dice.between(2, 26) * hourMs,
    nowMs - dice.between(0.5, 20) * hourMs,
    load.span.startMs - hourMs,
  );
  const { result, input } = booking.estimate;
  const isAhead = load.span.endMs > nowMs && state !== 'cancelled';
  const risk = isAhead ? findRisk(tools, load, booking) : null;
  context.rows.bookings.push({
    id,
    requestId,
    lotId,
    loadId: work.loadId,
    siteId: sites[siteKey].id,
    projectId: booking.batch.project.id,
    state,
    atRisk: risk !== null,
    atRiskReason: risk,
    grade: booking.grade,
    during: load.span,
    likelyS: result.likelyTotalS,
    safeS: result.safeTotalS,
    estimateInputs: input,
    estimateResult: result,
    modelVersion: estimateModelVersion,
    ownPhases: booking.needs,
    noShowAt: state === 'tentative' ? new Date(load.span.startMs + 2 * hourMs) : null,
    confirmedById: people.scheduler,
    confirmedAt: new Date(confirmedMs),
    cancelReason: load.cancelReason,
    ...stamped(confirmedMs, state === 'done' ? load.span.endMs : confirmedMs),
  });
  writePaths(tools, { ...work, bookingId: id, confirmedMs });
  if (state === 'done' || state === 'running') {
    writeRun(tools, { load, booking, bookingId: id });
  }
  return id;
}

function writeRequest(
  tools: WorkTools,
  work: {
    readonly load: PlannedLoad;
    readonly booking: PlannedBooking;
    readonly submittedMs: number;
    readonly state: BookingState;
  },
): { requestId: number; lotId: number } {
  const { context, dice, sites } = tools;
  const { load, booking } = work;
  const requestId = context.number('requests');
  const { aim, batch } = booking;
  const isSettled = aim.kind === 'settled';
  context.rows.requests.push({
    id: requestId,
    siteId: sites[load.chamber.plan.site].id,
    projectId: batch.project.id,
    requesterId: dice.pick(batch.project.requesterIds),
    state: requestStateOf[work.state],
    kind: aim.kind,
    grade: booking.grade,
    setTempMdegc: load.setC * 1000,
    setToleranceMk: dice.pick([0, 500, 1000]),
    toleranceKind: isSettled ? 'relative' : null,
    toleranceFraction:
      isSettled && aim.tolerance.kind === 'relative' ? aim.tolerance.fraction : null,
    badToGoodRatio: isSettled ? null : aim.badToGoodRatio,
    neededByAt: new Date(load.span.endMs + dice.whole(4, 30) * dayMs),
    priority: dice.chance(0.12) ? 'high' : 'normal',
    submittedAt: new Date(work.submittedMs),
    withdrawReason: load.cancelReason,
    ...stamped(work.submittedMs - 30 * minuteMs, work.submittedMs),
  });
  const lotId = context.number('lots');
  context.rows.lots.push({
    id: lotId,
    requestId,
    seq: 1,
    cellTypeId: batch.type.id,
    cellCount: booking.cellIds.length,
    stateOfChargePct: batch.stateOfChargePct,
    restedSinceAt: new Date(batch.restedSinceMs),
    storageTemperatureC: 22,
  });
  for (const cellId of booking.cellIds) {
    context.rows.lotCells.push({ lotId, cellId });
  }
  return { requestId, lotId };
}

function writePaths(
  tools: WorkTools,
  work: {
    readonly load: PlannedLoad;
    readonly booking: PlannedBooking;
    readonly bookingId: number;
    readonly confirmedMs: number;
  },
): void {
  const { context } = tools;
  const { booking, bookingId, load } = work;
  booking.paths.forEach((path, index) => {
    const cellId = booking.cellIds[index];
    const range = booking.ranges[index];
    if (cellId === undefined || range === undefined) {
      throw new RangeError(`Booking ${bookingId} of the demo has more paths than cells.`);
    }
    context.rows.bookingCells.push({
      id: context.number('bookingCells'),
      bookingId,
      cellId,
      sourceUnitId: path.source.unitId,
      meterUnitId: path.meter.unitId,
      positionUnitId: path.positionUnitId,
      meterRangeId: range.id,
      panelId: path.panelId,
    });
    for (const unitId of [path.source.unitId, path.meter.unitId, path.positionUnitId]) {
      context.rows.allocations.push({
        id: context.number('allocations'),
        unitId,
        during: load.span,
        live: load.cancelReason === null,
        bookingId,
        createdAt: new Date(work.confirmedMs),
      });
    }
  });
}
