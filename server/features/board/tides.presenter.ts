import { groupBy } from '#server/features/availability/group-by.ts';
import type { Tide } from '#shared/contracts/board.contract.ts';
import type { Span } from '#shared/domain/intervals/types.ts';
import type { TakenRow, TemperatureRow } from './board.repository.ts';

/** Booked or in other work; a unit in an outage is closed, not in use. */
export function isInUse({ outageId }: Pick<TakenRow, 'outageId'>): boolean {
  return outageId === null;
}

/** How many of the units are taken over the window, as steps. */
export function takenSteps(
  taken: readonly Pick<TakenRow, 'during'>[],
  window: Span,
): { at: string; count: number }[] {
  const changes = taken.flatMap(({ during }) => [
    { atMs: Math.max(window.startMs, during.startMs), change: 1 },
    { atMs: Math.min(window.endMs, during.endMs), change: -1 },
  ]);
  const moments = [...new Set([window.startMs, ...changes.map(({ atMs }) => atMs)])].toSorted(
    (first, second) => first - second,
  );
  const byMoment = groupBy(changes, ({ atMs }) => atMs);
  const steps: { at: string; count: number }[] = [];
  let count = 0;
  for (const atMs of moments) {
    count += (byMoment.get(atMs) ?? []).reduce((sum, { change }) => sum + change, 0);
    if (steps.at(-1)?.count !== count && atMs < window.endMs) {
      steps.push({ at: new Date(atMs).toISOString(), count });
    }
  }
  return steps;
}

type Corner = { readonly atMs: number; readonly mdegc: number };

/**
 * The set temperature of a chamber over the window as the corners of a line: level while a load
 * stands still, slanting while the chamber ramps or returns, idle between loads. Loads that overlap
 * share their temperature, so the later one only goes on where the earlier ends.
 */
export function temperatureLine(
  phases: readonly Pick<TemperatureRow, 'phase' | 'during' | 'setTempMdegc'>[],
  idleMdegc: number,
  window: Span,
): Tide['temperature'] {
  const first = Math.min(window.startMs, phases[0]?.during.startMs ?? window.startMs);
  const corners: Corner[] = [{ atMs: first, mdegc: idleMdegc }];
  let last: Corner = { atMs: first, mdegc: idleMdegc };
  const add = (corner: Corner) => {
    corners.push(corner);
    last = corner;
  };
  for (const { phase, during, setTempMdegc } of phases) {
    if (during.endMs <= last.atMs) {
      continue;
    }
    if (during.startMs > last.atMs) {
      add({ atMs: last.atMs, mdegc: idleMdegc });
    }
    const atMs = Math.max(last.atMs, during.startMs);
    const afterMdegc = phase === 'return' ? idleMdegc : setTempMdegc;
    const isSlanting = phase === 'ramp' || phase === 'return';
    add({ atMs, mdegc: isSlanting ? last.mdegc : afterMdegc });
    add({ atMs: during.endMs, mdegc: afterMdegc });
  }
  if (last.atMs < window.endMs) {
    add({ atMs: last.atMs, mdegc: idleMdegc });
    add({ atMs: window.endMs, mdegc: idleMdegc });
  }
  return plainCorners(cutLine(corners, window)).map(({ atMs, mdegc }) => ({
    at: new Date(atMs).toISOString(),
    setTemperatureC: mdegc / 1000,
  }));
}

/** The part of a line inside the window, met where it crosses the edges. */
function cutLine(corners: readonly Corner[], window: Span): Corner[] {
  return corners.flatMap((corner, index): Corner[] => {
    const next = corners[index + 1];
    const crossings =
      next === undefined
        ? []
        : [window.startMs, window.endMs]
            .filter((atMs) => corner.atMs < atMs && atMs < next.atMs)
            .map((atMs) => ({ atMs, mdegc: between(corner, next, atMs) }));
    const isInside = corner.atMs >= window.startMs && corner.atMs <= window.endMs;
    return isInside ? [corner, ...crossings] : crossings;
  });
}

function between(from: Corner, to: Corner, atMs: number): number {
  const share = (atMs - from.atMs) / (to.atMs - from.atMs);
  return Math.round(from.mdegc + share * (to.mdegc - from.mdegc));
}

/** Without corners at which nothing turns. */
function plainCorners(corners: readonly Corner[]): Corner[] {
  const plain: Corner[] = [];
  for (const corner of corners) {
    const last = plain.at(-1);
    if (last?.atMs === corner.atMs && last.mdegc === corner.mdegc) {
      continue;
    }
    if (plain.at(-2)?.mdegc === corner.mdegc && last?.mdegc === corner.mdegc) {
      plain.pop();
    }
    plain.push(corner);
  }
  return plain;
}
