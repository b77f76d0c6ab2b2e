import { forecastDisturbance } from '#shared/domain/checks/forecast-disturbance.ts';
import { startOfDayMs } from '#shared/domain/calendar/start-of-day-ms.ts';
import { isInWorkingHours } from '#shared/domain/calendar/is-in-working-hours.ts';
import type { PhaseSpan, StabilityFact } from '#shared/domain/facility/types.ts';
import type { Span } from '#shared/domain/intervals/types.ts';
import type { Batch } from './cells.ts';
import type { Dice } from './dice.ts';
import {
  estimateBooking,
  findFittingPaths,
  type Aim,
  type BookingEstimate,
  type BookingOrder,
} from './estimate-booking.ts';
import { joinNeeds, layPhases } from './lay-phases.ts';
import { dayMs, hourMs } from './demo-days.ts';
import type { DueDays } from './metrology.ts';
import type { Occupancy } from './occupancy.ts';
import { brokenSinceMs } from './outages.ts';
import type { PlannedBooking, PlannedLoad } from './planned-work.ts';
import type { DemoSite, Sites } from './sites.ts';
import type { DemoChamber, DemoPath } from './wiring.ts';

export type PlacingTools = {
  readonly nowMs: number;
  readonly sites: Sites;
  readonly dice: Dice;
  readonly batches: readonly Batch[];
  readonly occupancy: Occupancy;
  readonly dueDays: DueDays;
  /** The newest judged log of a chamber at a set temperature. */
  readonly stabilityOf: (chamber: DemoChamber, setC: number) => StabilityFact | undefined;
  /** How many more bookings may lie over something that fails or runs out. */
  readonly risksLeft: Map<string, number>;
};
export type LoadPlace = {
  readonly chamber: DemoChamber;
  readonly site: DemoSite;
  /** The paths of this lane of the chamber. */
  readonly paths: readonly DemoPath[];
  readonly startMs: number;
};

/** Fills one load at a start with up to three bookings; undefined where nothing suits. */
export function placeLoad(tools: PlacingTools, place: LoadPlace): PlannedLoad | undefined {
  const { dice } = tools;
  const setC = pickTemperature(place.chamber, dice);
  const reach: Span = { startMs: place.startMs, endMs: place.startMs + 4 * dayMs };
  const members: PlannedBooking[] = [];
  const wanted = dice.pick([1, 1, 2, 2, 2, 3]);
  const candidates = dice.shuffle(tools.batches.filter((batch) => suits(batch, place, setC)));
  for (const batch of candidates) {
    if (members.length >= wanted) {
      break;
    }
    const member = placeBooking(tools, { place, setC, reach, batch, members });
    if (member !== undefined) {
      members.push(member);
    }
  }
  const phases = layMembers(place, setC, members);
  const [first, last] = [phases?.at(0), phases?.at(-1)];
  if (phases === undefined || first === undefined || last === undefined) {
    return undefined;
  }
  const span = { startMs: first.startMs, endMs: last.endMs };
  if (span.endMs > reach.endMs || !mayRunOn(place, setC, phases)) {
    return undefined;
  }
  return {
    chamber: place.chamber,
    setC,
    span,
    phases,
    bookings: members,
    cancelReason: null,
  };
}

function layMembers(
  place: LoadPlace,
  setC: number,
  members: readonly PlannedBooking[],
): readonly PhaseSpan[] | undefined {
  if (members.length === 0) {
    return undefined;
  }
  const needs = joinNeeds(
    members.map((member) => ({ needs: member.needs, cells: member.cellIds.length })),
  );
  return layPhases(place.site.calendar, {
    startMs: place.startMs,
    needs,
    setC,
    idleC: 25,
    isDoorStrict: place.chamber.plan.strict,
  });
}

/** Without the safety officer's leave nothing goes on after the last person has left. */
function mayRunOn(place: LoadPlace, setC: number, phases: readonly PhaseSpan[]): boolean {
  const { unattendedC } = place.chamber.plan;
  if (unattendedC !== null && setC <= unattendedC) {
    return true;
  }
  return phases.every((phase) => isInWorkingHours(place.site.calendar, phase));
}

function pickTemperature(chamber: DemoChamber, dice: Dice): number {
  const { plan } = chamber;
  if (!plan.strict) {
    return 25;
  }
  const temperatures = plan.loggedC.filter((setC) => !(plan.tag === 'C02' && setC === 45));
  return dice.chance(0.4) ? 25 : dice.pick(temperatures);
}

function suits(batch: Batch, place: LoadPlace, setC: number): boolean {
  const { plan } = place.chamber;
  const { type } = batch;
  return (
    batch.site === plan.site &&
    batch.fromMs <= place.startMs &&
    place.startMs + 3 * dayMs < batch.untilMs &&
    type.isReleased &&
    plan.formats.includes(type.format) &&
    type.capacityAh <= plan.maxAh &&
    (type.format === 'coin' || type.capacityAh >= plan.maxAh / 40) &&
    type.hazard <= plan.protection &&
    setC <= type.maxTestC - 5 &&
    place.startMs - batch.restedSinceMs > 8 * dayMs
  );
}

function placeBooking(
  tools: PlacingTools,
  order: {
    readonly place: LoadPlace;
    readonly setC: number;
    readonly reach: Span;
    readonly batch: Batch;
    readonly members: readonly PlannedBooking[];
  },
): PlannedBooking | undefined {
  const { dice } = tools;
  const { place, batch, reach, setC, members } = order;
  const taken = new Set(members.flatMap((member) => member.paths));
  const paths = place.paths.filter(
    (path) => !taken.has(path) && isUsable(tools, place, path, reach),
  );
  const cellIds = batch.cellIds.filter((id) => tools.occupancy.isCellFree(id, reach));
  const room = energyRoom(order);
  const count = Math.min(paths.length, cellIds.length, room, dice.whole(2, 6));
  if (count < 1 || members.some((member) => member.batch === batch)) {
    return undefined;
  }
  const aim = pickAim(dice);
  const booking: BookingOrder = {
    plan: place.chamber.plan,
    type: batch.type,
    stateOfChargePct: batch.stateOfChargePct,
    cellCount: count,
    setC,
    aim,
  };
  const chosen = findFittingPaths(booking, paths).slice(0, count);
  const estimate = chosen.length < count ? undefined : estimateBooking(booking, chosen);
  if (estimate === undefined) {
    return undefined;
  }
  const drifts = chosen.map(({ path }) => path.source.stabilityVPerH);
  const isPoor =
    place.chamber.plan.manner !== 'quiet' ||
    isDisturbed(tools, order, { estimate, driftVPerH: Math.max(...drifts) });
  return {
    batch,
    cellIds: dice.shuffle(cellIds).slice(0, count),
    paths: chosen.map(({ path }) => path),
    ranges: chosen.map(({ range }) => range),
    aim,
    grade: isPoor || dice.chance(0.2) ? 'indicative' : 'reported',
    estimate,
    needs: estimate.needs,
  };
}

/** Would the check on temperature-induced current stop reported work here? */
function isDisturbed(
  tools: PlacingTools,
  order: { readonly place: LoadPlace; readonly setC: number },
  work: { readonly estimate: BookingEstimate; readonly driftVPerH: number },
): boolean {
  const fact = tools.stabilityOf(order.place.chamber, order.setC);
  const { numbers, phases } = work.estimate.result;
  const windowS = phases.find(({ phase }) => phase === 'measure')?.safeS ?? 0;
  return (
    fact === undefined ||
    forecastDisturbance({ fact, numbers, sourceDriftVPerH: work.driftVPerH, windowS }).verdict ===
      'disturbed'
  );
}

function energyRoom(order: {
  readonly place: LoadPlace;
  readonly batch: Batch;
  readonly members: readonly PlannedBooking[];
}): number {
  const energyOf = (batch: Batch): number => batch.type.capacityAh * batch.type.nominalV;
  const usedWh = order.members.reduce(
    (sum, member) => sum + member.cellIds.length * energyOf(member.batch),
    0,
  );
  return Math.floor((order.place.chamber.plan.maxEnergyWh - usedWh) / energyOf(order.batch));
}

function pickAim(dice: Dice): Aim {
  if (dice.chance(0.3)) {
    return {
      kind: 'screening',
      tolerance: { kind: 'relative', fraction: 0.1 },
      badToGoodRatio: dice.pick([3, 3, 5]),
    };
  }
  return {
    kind: 'settled',
    tolerance: { kind: 'relative', fraction: dice.pick([0.1, 0.1, 0.1, 0.15, 0.2]) },
    badToGoodRatio: 3,
  };
}

function isUsable(tools: PlacingTools, place: LoadPlace, path: DemoPath, reach: Span): boolean {
  const units = [path.source.unitId, path.meter.unitId, path.positionUnitId];
  if (!units.every((unitId) => tools.occupancy.isFree(unitId, reach))) {
    return false;
  }
  const failure = failureOf(tools, place, path);
  if (failure.atMs >= reach.endMs) {
    return true;
  }
  const isSoon =
    reach.startMs > tools.nowMs + 4 * hourMs && reach.startMs < tools.nowMs + 14 * dayMs;
  return isSoon && (tools.risksLeft.get(failure.tag) ?? 0) > 0;
}

/** What on the path breaks or runs out of calibration first, and when. */
export function failureOf(
  tools: Pick<PlacingTools, 'nowMs' | 'dueDays'>,
  place: Pick<LoadPlace, 'chamber' | 'site'>,
  path: DemoPath,
): { readonly tag: string; readonly atMs: number } {
  const broken = brokenSinceMs(tools.nowMs);
  const tags = [path.source.instrument.tag, path.meter.instrument.tag, place.chamber.plan.tag];
  const failures = tags.map((tag) => {
    const dueOn = tools.dueDays.get(tag);
    const dueMs = dueOn === undefined ? Infinity : startOfDayMs(place.site.calendar, dueOn, 1);
    return { tag, atMs: Math.min(dueMs, broken[tag] ?? Infinity) };
  });
  return failures.reduce((first, next) => (next.atMs < first.atMs ? next : first));
}
