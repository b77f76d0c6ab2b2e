import { isInWorkingHours } from '#shared/domain/calendar/is-in-working-hours.ts';
import { roundUpToGrid } from '#shared/domain/calendar/round-up-to-grid.ts';
import type { CalendarIndex } from '#shared/domain/calendar/types.ts';
import type { Chamber, FacilityPolicy, Load, PhaseSpan } from '#shared/domain/facility/types.ts';
import type { Span } from '#shared/domain/intervals/types.ts';
import { closePhases } from './close-phases.ts';
import { findDoorBar } from './find-door-bar.ts';
import { longestNeeds } from './longest-needs.ts';
import type { PhaseNeeds } from './needs-of-estimate.ts';
import { stackPhases } from './stack-phases.ts';

export type JoinInput = {
  readonly calendar: CalendarIndex;
  readonly policy: FacilityPolicy;
  readonly chamber: Pick<Chamber, 'idleTemperatureC' | 'strictDoor'>;
  readonly load: Load;
  readonly others: readonly Load[];
  readonly needsS: PhaseNeeds;
  readonly cellCount: number;
  /** A member whose cells and needs are not counted: it is the one being placed again. */
  readonly ignoreBookingId: number | null;
};

/**
 * The phases of a load with one more booking in it. Start and end stay where they are; every phase is
 * the longest of its members', connect and unload are for all cells together, and the wait gives the
 * time. Null where the wait is not long enough, the unload would start outside working hours or when
 * the door may not open, or the load has more than one plateau.
 *
 * @example layOutJoinedLoad({ ...facts, needsS: { hold: 36000 } }) // null in a load of five hours
 */
export function layOutJoinedLoad(input: JoinInput): readonly PhaseSpan[] | null {
  const { load, chamber } = input;
  const startMs = load.phases[0]?.startMs;
  const endMs = load.phases.at(-1)?.endMs;
  if (startMs === undefined || endMs === undefined || hasSeveralPlateaus(load)) {
    return null;
  }
  const needsS = sharedNeeds(input);
  const { idleTemperatureC } = chamber;
  const { setTemperatureC } = load;
  const stacked = stackPhases({ startMs, needsS, idleTemperatureC, setTemperatureC });
  const unload = { startMs: endMs - roundUpToGrid((needsS.unload ?? 0) * 1000), endMs };
  const isLongEnough = stacked.every((phase) => phase.endMs <= unload.startMs);
  return isLongEnough && mayUnload(input, unload)
    ? closePhases(stacked, unload, idleTemperatureC)
    : null;
}

function mayUnload(input: JoinInput, unload: Span): boolean {
  const isBarred = input.chamber.strictDoor && findDoorBar(unload, input.others) !== null;
  return isInWorkingHours(input.calendar, unload) && !isBarred;
}

function hasSeveralPlateaus(load: Load): boolean {
  return load.phases.filter(({ phase }) => phase === 'measure').length > 1;
}

function sharedNeeds(input: JoinInput): PhaseNeeds {
  const { policy } = input;
  const members = input.load.members.filter((member) => member.bookingId !== input.ignoreBookingId);
  const cells = members.reduce((sum, member) => sum + member.cells, input.cellCount);
  const door = {
    connect: 60 * (policy.connectFixedMin + policy.connectPerCellMin * cells),
    unload: 60 * (policy.unloadFixedMin + policy.unloadPerCellMin * cells),
  };
  return longestNeeds([input.needsS, door, ...members.map((member) => member.needsS)]);
}
