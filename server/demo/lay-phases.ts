import { layOutLoad } from '#shared/domain/availability/lay-out-load.ts';
import { longestNeeds } from '#shared/domain/availability/longest-needs.ts';
import type { PhaseNeeds } from '#shared/domain/availability/needs-of-estimate.ts';
import { isInWorkingHours } from '#shared/domain/calendar/is-in-working-hours.ts';
import { roundUpToGrid } from '#shared/domain/calendar/round-up-to-grid.ts';
import type { CalendarIndex } from '#shared/domain/calendar/types.ts';
import type { PhaseSpan } from '#shared/domain/facility/types.ts';
import { policyDefinitions } from '#shared/domain/policies/site-policy.ts';
import { dayMs } from './demo-days.ts';

/** A load lasts in each phase as long as its longest booking; one door opening serves all cells. */
export function joinNeeds(
  members: readonly { readonly needs: PhaseNeeds; readonly cells: number }[],
): PhaseNeeds {
  const cells = members.reduce((sum, member) => sum + member.cells, 0);
  const { connectFixedMin, connectPerCellMin, unloadFixedMin, unloadPerCellMin } =
    policyDefinitions;
  const door = {
    connect: 60 * (connectFixedMin.fallback + connectPerCellMin.fallback * cells),
    unload: 60 * (unloadFixedMin.fallback + unloadPerCellMin.fallback * cells),
  };
  return longestNeeds([door, ...members.map(({ needs }) => needs)]);
}

/** Lays the phases from a start; undefined where connect would fall outside working hours. */
export function layPhases(
  calendar: CalendarIndex,
  load: {
    readonly startMs: number;
    readonly needs: PhaseNeeds;
    readonly setC: number;
    readonly idleC: number;
    readonly isDoorStrict: boolean;
  },
): readonly PhaseSpan[] | undefined {
  const { startMs, needs } = load;
  const connectEndMs = startMs + roundUpToGrid((needs.connect ?? 0) * 1000);
  if (!isInWorkingHours(calendar, { startMs, endMs: connectEndMs })) {
    return undefined;
  }
  const phases = layOutLoad({
    calendar,
    chamber: { idleTemperatureC: load.idleC, strictDoor: load.isDoorStrict },
    others: [],
    startMs,
    needsS: needs,
    setTemperatureC: load.setC,
    untilMs: startMs + 14 * dayMs,
  });
  return phases ?? undefined;
}
