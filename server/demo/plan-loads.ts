import { findWorkingStart } from '#shared/domain/calendar/find-working-start.ts';
import { isInWorkingHours } from '#shared/domain/calendar/is-in-working-hours.ts';
import { dayMs, hourMs } from './demo-days.ts';
import type { Dice } from './dice.ts';
import { failureOf, placeLoad, type LoadPlace, type PlacingTools } from './place-load.ts';
import type { PlannedLoad } from './planned-work.ts';
import type { DemoSite, Sites } from './sites.ts';
import type { DemoChamber, DemoPath } from './wiring.ts';

type Lane = {
  readonly chamber: DemoChamber;
  readonly site: DemoSite;
  readonly paths: readonly DemoPath[];
};
export const pastDays = 548;
export const futureDays = 42;

/** Work of eighteen months past and six weeks ahead, chamber by chamber. */
export function planLoads(
  tools: PlacingTools,
  input: { readonly chambers: readonly DemoChamber[]; readonly sites: Sites },
): PlannedLoad[] {
  const lanes = input.chambers.flatMap((chamber) => lanesOf(chamber, input.sites));
  return lanes.flatMap((lane) => fillLane(tools, lane));
}

/** In a chamber with a tolerant door two loads may stand side by side. */
function lanesOf(chamber: DemoChamber, sites: Sites): Lane[] {
  const site = sites[chamber.plan.site];
  if (chamber.plan.strict) {
    return [{ chamber, site, paths: chamber.paths }];
  }
  const half = Math.ceil(chamber.paths.length / 2);
  return [
    { chamber, site, paths: chamber.paths.slice(0, half) },
    { chamber, site, paths: chamber.paths.slice(half) },
  ];
}

function fillLane(tools: PlacingTools, lane: Lane): PlannedLoad[] {
  const loads: PlannedLoad[] = [];
  const endMs = tools.nowMs + futureDays * dayMs;
  let cursorMs = tools.nowMs - pastDays * dayMs;
  let hasCurrent = false;
  while (cursorMs < endMs) {
    const gapMs = gapFor(tools, cursorMs);
    const passesNow = cursorMs <= tools.nowMs && cursorMs + gapMs > tools.nowMs;
    const current = passesNow && !hasCurrent ? placeAroundNow(tools, lane, cursorMs) : undefined;
    if (passesNow) {
      hasCurrent = true;
    }
    const load = current ?? placeNext(tools, lane, cursorMs + gapMs);
    if (load === undefined) {
      cursorMs += gapMs + 6 * hourMs;
      continue;
    }
    const kept = settle(tools, load);
    loads.push(kept);
    cursorMs = kept.cancelReason === null ? kept.span.endMs : kept.span.startMs + hourMs;
  }
  return loads;
}

/** The desk fills up towards today and thins out ahead. */
function gapFor(tools: PlacingTools, atMs: number): number {
  const days = (atMs - tools.nowMs) / dayMs;
  const meanDays = days <= 0 ? 6.2 + (25 * -days) / pastDays : 2.1 + (12 * days) / futureDays;
  return -Math.log(1 - tools.dice.next()) * meanDays * dayMs;
}

function placeNext(tools: PlacingTools, lane: Lane, fromMs: number): PlannedLoad | undefined {
  const lengthMs = hourMs;
  let searchMs = fromMs;
  for (let attempt = 0; attempt < 4; attempt += 1) {
    const startMs = findWorkingStart(lane.site.calendar, {
      fromMs: searchMs,
      lengthMs,
      untilMs: searchMs + 12 * dayMs,
    });
    if (startMs === null || startMs > tools.nowMs + futureDays * dayMs) {
      return undefined;
    }
    const load = tryAt(tools, { ...lane, startMs: startMs + tools.dice.whole(0, 6) * hourMs });
    if (load !== undefined) {
      return load;
    }
    searchMs = startMs + tools.dice.whole(2, 9) * hourMs;
  }
  return undefined;
}

/** Most chambers are at work at the moment one looks. */
function placeAroundNow(tools: PlacingTools, lane: Lane, fromMs: number): PlannedLoad | undefined {
  if (!tools.dice.chance(0.8) || lane.chamber.plan.tag === 'C09') {
    return undefined;
  }
  const leadMs = tools.dice.whole(2, 10) * hourMs;
  for (let backMs = leadMs; backMs < 4 * dayMs; backMs += hourMs / 2) {
    const startMs = tools.nowMs - backMs;
    if (startMs < fromMs) {
      return undefined;
    }
    if (isInWorkingHours(lane.site.calendar, { startMs, endMs: startMs + hourMs })) {
      const load = tryAt(tools, { ...lane, startMs });
      if (load !== undefined && load.span.endMs > tools.nowMs) {
        return load;
      }
    }
  }
  return undefined;
}

function tryAt(tools: PlacingTools, place: LoadPlace): PlannedLoad | undefined {
  const load = placeLoad(tools, place);
  if (load === undefined) {
    return undefined;
  }
  const chamberId = load.chamber.instrument.id;
  return tools.occupancy.chamberClosedUntil(chamberId, load.span) === undefined ? load : undefined;
}

/** Takes units and cells, or calls the load off. */
function settle(tools: PlacingTools, load: PlannedLoad): PlannedLoad {
  const isPast = load.span.endMs < tools.nowMs;
  if (isPast && load.bookings.length === 1 && tools.dice.chance(0.07)) {
    return { ...load, cancelReason: cancelReason(tools.dice) };
  }
  const place = { chamber: load.chamber, site: tools.sites[load.chamber.plan.site] };
  const failing = new Set<string>();
  for (const booking of load.bookings) {
    for (const path of booking.paths) {
      for (const unitId of [path.source.unitId, path.meter.unitId, path.positionUnitId]) {
        tools.occupancy.take(unitId, load.span);
      }
      const failure = failureOf(tools, place, path);
      if (failure.atMs < load.span.endMs) {
        failing.add(failure.tag);
      }
    }
    for (const cellId of booking.cellIds) {
      tools.occupancy.takeCell(cellId, load.span);
    }
  }
  if (!isPast) {
    for (const tag of failing) {
      tools.risksLeft.set(tag, (tools.risksLeft.get(tag) ?? 0) - 1);
    }
  }
  return load;
}

function cancelReason(dice: Dice): string {
  return dice.pick([
    'No show: the cells had not come by the time they were due in the chamber.',
    'The customer took the cells back.',
    'Two cells failed the receipt inspection; the lot is asked again.',
    'Moved to another week by agreement with the project.',
  ]);
}
