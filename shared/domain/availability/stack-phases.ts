import { roundUpToGrid } from '#shared/domain/calendar/round-up-to-grid.ts';
import type { PhaseSpan } from '#shared/domain/facility/types.ts';
import type { PhaseNeeds } from './needs-of-estimate.ts';

const innerPhases = ['ramp', 'soak', 'match', 'hold', 'measure', 'return'] as const;

/**
 * The phases from connect to the last before the wait, end to end from a start. Connect is rounded up
 * to quarter hours, the inner phases to whole minutes; a phase of no length has no span. Connect
 * carries the idle temperature, all others the set temperature.
 *
 * @example stackPhases({ startMs: 0, needsS: { connect: 780 }, idleTemperatureC: 25, setTemperatureC: 45 })
 * // one connect of 15 minutes at 25 °C
 */
export function stackPhases(input: {
  readonly startMs: number;
  readonly needsS: PhaseNeeds;
  readonly idleTemperatureC: number;
  readonly setTemperatureC: number;
}): readonly PhaseSpan[] {
  const { startMs, needsS, idleTemperatureC, setTemperatureC } = input;
  let cursorMs = startMs + roundUpToGrid((needsS.connect ?? 0) * 1000);
  const phases: PhaseSpan[] = [];
  if (cursorMs > startMs) {
    phases.push({ phase: 'connect', startMs, endMs: cursorMs, setTemperatureC: idleTemperatureC });
  }
  for (const phase of innerPhases) {
    const lengthMs = Math.ceil((needsS[phase] ?? 0) / 60) * 60_000;
    if (lengthMs > 0) {
      phases.push({ phase, startMs: cursorMs, endMs: cursorMs + lengthMs, setTemperatureC });
      cursorMs += lengthMs;
    }
  }
  return phases;
}
