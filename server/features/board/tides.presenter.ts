import { groupBy } from '#server/features/availability/group-by.ts';
import type { Tide } from '#shared/contracts/board.contract.ts';
import type { Span } from '#shared/domain/intervals/types.ts';
import type { TakenRow, TemperatureRow } from './board.repository.ts';

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

/** The set temperature of a chamber over the window: its loads' phases, idle between them. */
export function temperatureSteps(
  phases: readonly Pick<TemperatureRow, 'during' | 'setTempMdegc'>[],
  idleTempMdegc: number,
  window: Span,
): Tide['temperature'] {
  const steps: Tide['temperature'] = [];
  const add = (atMs: number, mdegc: number) => {
    const setTemperatureC = mdegc / 1000;
    const at = new Date(Math.max(window.startMs, atMs)).toISOString();
    if (steps.at(-1)?.at === at) {
      steps.pop();
    }
    if (steps.at(-1)?.setTemperatureC !== setTemperatureC) {
      steps.push({ at, setTemperatureC });
    }
  };
  add(window.startMs, idleTempMdegc);
  let untilMs = window.startMs;
  for (const { during, setTempMdegc } of phases) {
    if (during.startMs > untilMs) {
      add(untilMs, idleTempMdegc);
    }
    add(during.startMs, setTempMdegc);
    untilMs = Math.max(untilMs, during.endMs);
  }
  if (untilMs < window.endMs) {
    add(untilMs, idleTempMdegc);
  }
  return steps;
}
