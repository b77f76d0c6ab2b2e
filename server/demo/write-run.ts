import type { LoadPhase } from '#shared/domain/hold-estimate/types.ts';
import type { RunEventKind } from '#shared/domain/states.ts';
import { stamped } from './demo-context.ts';
import { minuteMs } from './demo-days.ts';
import type { PlannedBooking, PlannedLoad } from './planned-work.ts';
import type { WorkTools } from './write-work.ts';

/** What happened in a run, as far as it has got. */
export function writeRun(
  tools: WorkTools,
  work: {
    readonly load: PlannedLoad;
    readonly booking: PlannedBooking;
    readonly bookingId: number;
  },
): void {
  const { context, people, dice } = tools;
  const { load, booking } = work;
  const { nowMs, rows } = context;
  const runId = context.number('runs');
  const startedMs = load.span.startMs + dice.whole(0, 9) * minuteMs;
  const isOver = load.span.endMs <= nowMs;
  const isAborted = isOver && dice.chance(0.03);
  const endedMs = load.span.endMs - dice.whole(1, 12) * minuteMs;
  const { hold } = booking.estimate.result;
  const settleS = Math.round((hold.likelyS * Math.exp(0.04 + 0.27 * dice.normal())) / 60) * 60;
  const personId = dice.pick([...booking.batch.project.requesterIds, people.scheduler]);
  const endReason = isAborted ? 'aborted' : 'completed';
  rows.runs.push({
    id: runId,
    bookingId: work.bookingId,
    startedAt: new Date(startedMs),
    ...(isOver ? { endedAt: new Date(endedMs), endReason } : {}),
    observedSettleS: isOver && !isAborted ? settleS : null,
    note: isAborted ? 'Power dip during the hold; the cells were at rest and unharmed.' : null,
    startedById: personId,
    ...stamped(startedMs, isOver ? endedMs : startedMs),
  });

  function note(
    kind: RunEventKind,
    atMs: number,
    detail: Readonly<Record<string, unknown>>,
    phase: LoadPhase | null = null,
  ): void {
    if (atMs > nowMs) {
      return;
    }
    rows.runEvents.push({
      id: context.number('runEvents'),
      runId,
      at: new Date(atMs),
      kind,
      phase,
      detail,
      recordedById: personId,
      createdAt: new Date(atMs + minuteMs),
    });
  }

  note('check-in', startedMs, { cells: booking.cellIds.length, othersInside: false }, 'connect');
  for (const phase of load.phases) {
    if (phase.phase === 'match' || phase.phase === 'measure') {
      note('phase-started', phase.startMs, {}, phase.phase);
    }
  }
  const measure = load.phases.find((phase) => phase.phase === 'measure');
  if (measure !== undefined && !isAborted) {
    for (const detail of readings(tools, booking)) {
      note('reading', measure.endMs - minuteMs, detail, 'measure');
    }
  }
  if (isOver) {
    note('ended', endedMs, { reason: endReason }, 'unload');
  } else {
    markInTest(tools, booking);
  }
}

/** One settled current a cell; a few cells leak several times more than they should. */
function readings(
  tools: WorkTools,
  booking: PlannedBooking,
): { readonly cellId: number; readonly currentA: number }[] {
  const { dice } = tools;
  const expectedA = booking.estimate.result.numbers.expectedCurrentA;
  return booking.cellIds.map((cellId) => {
    const leak = dice.chance(0.03) ? dice.between(3, 6) : 1;
    const currentA = expectedA * leak * Math.exp(0.22 * dice.normal());
    return { cellId, currentA: Number(currentA.toPrecision(4)) };
  });
}

function markInTest(tools: WorkTools, booking: PlannedBooking): void {
  const places = new Map(
    booking.cellIds.map((cellId, index) => [cellId, booking.paths[index]?.positionLabel ?? null]),
  );
  const { cells } = tools.context.rows;
  cells.forEach((cell, index) => {
    if (cell.id !== undefined && places.has(cell.id)) {
      cells[index] = { ...cell, status: 'in-test', place: places.get(cell.id) ?? null };
    }
  });
}
