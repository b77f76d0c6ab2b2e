import { findWorkingStart } from '#shared/domain/calendar/find-working-start.ts';
import { gridMs } from '#shared/domain/calendar/round-up-to-grid.ts';
import type { CalendarIndex } from '#shared/domain/calendar/types.ts';

/**
 * The starts worth looking at, in order and each once: every quarter hour at which a connect lies in
 * working hours, and the given starts of loads that might be joined.
 *
 * @param input.joinStartsMs starts of loads, epoch ms, in any order
 * @example [...candidateStarts({ calendar, fromMs, untilMs, connectMs: 900_000, joinStartsMs: [] })]
 */
export function* candidateStarts(input: {
  readonly calendar: CalendarIndex;
  readonly fromMs: number;
  readonly untilMs: number;
  readonly connectMs: number;
  readonly joinStartsMs: readonly number[];
}): Generator<{ readonly startMs: number; readonly isWorking: boolean }, void> {
  const joins = [...new Set(input.joinStartsMs)]
    .filter((startMs) => startMs >= input.fromMs && startMs < input.untilMs)
    .toSorted((first, second) => first - second);
  const { untilMs, connectMs: lengthMs } = input;
  let next = 0;
  let workingMs = findWorkingStart(input.calendar, { fromMs: input.fromMs, lengthMs, untilMs });
  for (;;) {
    const joinMs = joins[next] ?? Infinity;
    const startMs = Math.min(workingMs ?? Infinity, joinMs);
    if (startMs === Infinity) {
      return;
    }
    const isWorking = startMs === workingMs;
    yield { startMs, isWorking };
    if (joinMs === startMs) {
      next += 1;
    }
    if (isWorking) {
      workingMs = findWorkingStart(input.calendar, { fromMs: startMs + gridMs, lengthMs, untilMs });
    }
  }
}
