import { isInWorkingHours } from './is-in-working-hours.ts';
import { nextWorkingMoment } from './next-working-moment.ts';
import { gridMs, roundUpToGrid } from './round-up-to-grid.ts';
import type { CalendarIndex } from './types.ts';

/**
 * The first quarter hour from an instant on at which work of a length lies wholly in working hours.
 * Null when there is none before the bound.
 *
 * @param input.fromMs epoch ms
 * @param input.lengthMs ms
 * @param input.untilMs bound: the work must end by it, epoch ms
 * @example findWorkingStart(index, { fromMs: fridayEvening, lengthMs: 1_800_000, untilMs: nextMonth })
 * // Monday 08:00
 */
export function findWorkingStart(
  index: CalendarIndex,
  input: { readonly fromMs: number; readonly lengthMs: number; readonly untilMs: number },
): number | null {
  let startMs = roundUpToGrid(input.fromMs);
  while (startMs + input.lengthMs <= input.untilMs) {
    if (isInWorkingHours(index, { startMs, endMs: startMs + input.lengthMs })) {
      return startMs;
    }
    const nextMs = nextWorkingMoment(index, startMs + gridMs);
    if (nextMs === null) {
      return null;
    }
    startMs = roundUpToGrid(nextMs);
  }
  return null;
}
