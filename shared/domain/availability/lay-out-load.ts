import { findWorkingStart } from '#shared/domain/calendar/find-working-start.ts';
import { roundUpToGrid } from '#shared/domain/calendar/round-up-to-grid.ts';
import type { CalendarIndex } from '#shared/domain/calendar/types.ts';
import type { Chamber, Load, PhaseSpan } from '#shared/domain/facility/types.ts';
import { closePhases } from './close-phases.ts';
import { findDoorBar } from './find-door-bar.ts';
import type { PhaseNeeds } from './needs-of-estimate.ts';
import { stackPhases } from './stack-phases.ts';

/**
 * The phases of a load of its own from a start: connect to return end to end, then the wait until
 * the first quarter hour at which the unload lies in working hours and, under the strict door rule,
 * no other load is in a still phase. Null where there is no such moment before the bound.
 *
 * @param input.needsS whole seconds each phase must last
 * @param input.untilMs the unload must have ended by it, epoch ms
 * @example layOutLoad({ calendar, chamber, others: [], startMs, needsS, setTemperatureC: 45, untilMs })
 */
export function layOutLoad(input: {
  readonly calendar: CalendarIndex;
  readonly chamber: Pick<Chamber, 'idleTemperatureC' | 'strictDoor'>;
  readonly others: readonly Load[];
  readonly startMs: number;
  readonly needsS: PhaseNeeds;
  readonly setTemperatureC: number;
  readonly untilMs: number;
}): readonly PhaseSpan[] | null {
  const { calendar, chamber, needsS, untilMs } = input;
  const { idleTemperatureC } = chamber;
  const stacked = stackPhases({ ...input, idleTemperatureC });
  const lengthMs = roundUpToGrid((needsS.unload ?? 0) * 1000);
  let fromMs = stacked.at(-1)?.endMs ?? input.startMs;
  for (;;) {
    const startMs = findWorkingStart(calendar, { fromMs, lengthMs, untilMs });
    if (startMs === null) {
      return null;
    }
    const unload = { startMs, endMs: startMs + lengthMs };
    const bar = chamber.strictDoor ? findDoorBar(unload, input.others) : null;
    if (bar === null) {
      return closePhases(stacked, unload, idleTemperatureC);
    }
    fromMs = bar.endMs;
  }
}
