import type { Dice } from './dice.ts';
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
  const personId = dice.pick([...booking.batch.project.requesterIds, people.scheduler]);
  const ending = load.span.endMs <= nowMs ? endOf(load, booking, dice) : undefined;
  rows.runs.push({
    id: runId,
    bookingId: work.bookingId,
    startedAt: new Date(startedMs),
    ...ending?.columns,
    startedById: personId,
    ...stamped(startedMs, ending?.endedMs ?? startedMs),
  });

  function note(
    kind: RunEventKind,
    atMs: number,
    detail: Readonly<Record<string, unknown>>,
    phase: LoadPhase,
  ): void {
    if (atMs <= nowMs) {
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
  }

  note('check-in', startedMs, { cells: booking.cellIds.length, othersInside: false }, 'connect');
  for (const { phase, startMs, endMs } of load.phases) {
    if (phase === 'match' || phase === 'measure') {
      note('phase-started', startMs, {}, phase);
    }
    if (phase === 'measure' && ending?.columns.endReason !== 'aborted') {
      readings(tools, booking).forEach((detail) => {
        note('reading', endMs - minuteMs, detail, 'measure');
      });
    }
  }
  if (ending === undefined) {
    markInTest(tools, booking);
  } else {
    note('ended', ending.endedMs, { reason: ending.columns.endReason }, 'unload');
  }
}

/** How a run ended: nearly always as planned, with a settling time spread around the likely one. */
function endOf(load: PlannedLoad, booking: PlannedBooking, dice: Dice) {
  const endedMs = load.span.endMs - dice.whole(1, 12) * minuteMs;
  const endedAt = new Date(endedMs);
  if (dice.chance(0.03)) {
    const note = 'Power dip during the hold; the cells were at rest and unharmed.';
    return { endedMs, columns: { endedAt, endReason: 'aborted', note } as const };
  }
  const { likelyS } = booking.estimate.result.hold;
  const observedSettleS = Math.round((likelyS * Math.exp(0.04 + 0.27 * dice.normal())) / 60) * 60;
  return { endedMs, columns: { endedAt, endReason: 'completed', observedSettleS } as const };
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
