import { findWorkingStart } from '#shared/domain/calendar/find-working-start.ts';
import { isInWorkingHours } from '#shared/domain/calendar/is-in-working-hours.ts';
import { roundUpToGrid } from '#shared/domain/calendar/round-up-to-grid.ts';
import type { CalendarIndex } from '#shared/domain/calendar/types.ts';
import type { PhaseSpan } from '#shared/domain/facility/types.ts';
import type { LoadPhase, SingleEstimate } from '#shared/domain/hold-estimate/types.ts';
import { dayMs } from './demo-days.ts';

export type Needs = Partial<Record<LoadPhase, number>>;

/** How long each phase must last for one booking alone, in seconds. */
export function needsOf(estimate: SingleEstimate): Needs {
  const needs: Needs = {};
  for (const { phase, safeS } of estimate.phases) {
    needs[phase] = safeS;
  }
  return needs;
}

/** A load lasts in each phase as long as its longest booking; one door opening serves all cells. */
export function joinNeeds(
  members: readonly { readonly needs: Needs; readonly cells: number }[],
): Needs {
  const joined: Needs = {};
  for (const { needs } of members) {
    for (const phase of ['ramp', 'soak', 'match', 'hold', 'measure', 'return'] as const) {
      const longest = Math.max(joined[phase] ?? 0, needs[phase] ?? 0);
      if (longest > 0) {
        joined[phase] = longest;
      }
    }
  }
  const cells = members.reduce((sum, member) => sum + member.cells, 0);
  const doorS = (10 + 3 * cells) * 60;
  return { ...joined, connect: doorS, unload: doorS };
}

const middle = ['ramp', 'soak', 'match', 'hold', 'measure', 'return'] as const;

/** Lays the phases from a start; undefined where connect would fall outside working hours. */
export function layPhases(
  calendar: CalendarIndex,
  load: {
    readonly startMs: number;
    readonly needs: Needs;
    readonly setC: number;
    readonly idleC: number;
  },
): PhaseSpan[] | undefined {
  const { startMs, needs, setC, idleC } = load;
  const connectMs = roundUpToGrid((needs.connect ?? 0) * 1000);
  const unloadMs = roundUpToGrid((needs.unload ?? 0) * 1000);
  if (!isInWorkingHours(calendar, { startMs, endMs: startMs + connectMs })) {
    return undefined;
  }
  const middleMs = middle.reduce((sum, phase) => sum + (needs[phase] ?? 0) * 1000, 0);
  const stretchMs = roundUpToGrid(middleMs) - middleMs;
  const phases: PhaseSpan[] = [];
  let atMs = startMs;
  function add(phase: LoadPhase, lengthMs: number, setTemperatureC: number): void {
    if (lengthMs > 0) {
      phases.push({ phase, startMs: atMs, endMs: atMs + lengthMs, setTemperatureC });
      atMs += lengthMs;
    }
  }
  add('connect', connectMs, idleC);
  for (const phase of middle) {
    add(phase, (needs[phase] ?? 0) * 1000 + (phase === 'hold' ? stretchMs : 0), setC);
  }
  const unloadStartMs = findWorkingStart(calendar, {
    fromMs: atMs,
    lengthMs: unloadMs,
    untilMs: atMs + 30 * dayMs,
  });
  if (unloadStartMs === null) {
    return undefined;
  }
  add('wait', unloadStartMs - atMs, idleC);
  add('unload', unloadMs, idleC);
  return phases;
}
