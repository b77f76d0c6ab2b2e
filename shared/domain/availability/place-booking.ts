import { estimatePath } from './estimate-path.ts';
import { layOutJoinedLoad } from './lay-out-joined-load.ts';
import { layOutLoad } from './lay-out-load.ts';
import { longestNeeds } from './longest-needs.ts';
import { needsOfEstimate } from './needs-of-estimate.ts';
import type { PhaseNeeds } from './needs-of-estimate.ts';
import { pathWiring } from './path-wiring.ts';
import { referenceEstimate } from './reference-estimate.ts';
import type { SlotRequest } from './types.ts';
import { evaluatePlacement } from '#shared/domain/checks/evaluate-placement.ts';
import { findUnknownWiring } from '#shared/domain/checks/find-unknown-wiring.ts';
import { otherLoads } from '#shared/domain/checks/other-loads.ts';
import type { CheckResult, PathChoice, PlacementFacts } from '#shared/domain/checks/types.ts';
import type { Chamber, FacilityIndex, Load, PhaseSpan } from '#shared/domain/facility/types.ts';
import type {
  SingleEstimate,
  SlotEstimate,
  TooLongEstimate,
} from '#shared/domain/hold-estimate/types.ts';

const dayMs = 86_400_000;

/** A path by its numbers, as it is stored and sent. */
export type PathNumbers = {
  readonly panelId: number;
  readonly sourceUnitId: number;
  readonly meterUnitId: number;
  readonly rangeId: number;
  readonly positionUnitId: number;
};

/** Where and when somebody wants a booking to be. */
export type Placement = {
  readonly chamberId: number;
  /** Ignored where a load is joined: it starts when the load starts. */
  readonly startMs: number;
  readonly joinsLoadId: number | null;
  readonly setTemperatureC: number;
  readonly paths: readonly PathNumbers[];
  /** A hold chosen by a person, s; null = the safe length. */
  readonly holdS: number | null;
  /** Phases as booked, for a re-check that must not lay them out anew; null = lay them out. */
  readonly bookedPhases: readonly PhaseSpan[] | null;
  readonly nowMs: number;
  /** The booking that is moved or re-checked: its allocations and its own load do not count. */
  readonly ignoreBookingId: number | null;
};

export type PlacedBooking =
  | {
      readonly outcome: 'placed';
      readonly facts: PlacementFacts;
      readonly checks: readonly CheckResult[];
      /** What the booking itself needs of each phase, s: its `needsS` as a load member. */
      readonly needsS: PhaseNeeds;
    }
  | {
      readonly outcome: 'refused';
      readonly reason: 'unknown' | 'not-estimable' | 'no-time' | 'load-too-short';
      readonly sentence: string;
    };

type Refused = Extract<PlacedBooking, { outcome: 'refused' }>;
type WithLength = SingleEstimate | TooLongEstimate;

/**
 * The phases, facts and checks of a booking in a given chamber, start and choice of paths: for a
 * confirmation, a move, a swap, a resize, and the re-check of what is booked. It decides nothing: a
 * stop is among the checks. It refuses only what has no phases at all.
 *
 * @throws RangeError when the request's figures make no sense
 * @example placeBooking(index, request, placement).outcome // 'placed'
 */
export function placeBooking(
  index: FacilityIndex,
  request: SlotRequest,
  placement: Placement,
): PlacedBooking {
  const chamber = index.chambers.get(placement.chamberId);
  if (chamber === undefined) {
    return refuse('unknown', `The site has no chamber number ${placement.chamberId}.`);
  }
  const { joinsLoadId } = placement;
  const joins = chamber.loads.find((load) => load.id === joinsLoadId) ?? null;
  if (joinsLoadId !== null && joins === null) {
    return refuse('unknown', `${chamber.tag} has no load ${joinsLoadId}.`);
  }
  const paths = resolvePaths(index, placement.paths);
  if (!Array.isArray(paths)) {
    return paths;
  }
  const setTemperatureC = joins?.setTemperatureC ?? placement.setTemperatureC;
  const estimates = estimateAll({ index, request, chamber, setTemperatureC, paths });
  const slowest = findSlowest(estimates);
  if (slowest.outcome !== 'ok' && slowest.outcome !== 'too-long') {
    return refuse('not-estimable', slowest.reason);
  }
  const ownNeedsS = ownNeeds(estimates, placement);
  const laidOut =
    placement.bookedPhases ?? layOut({ index, request, placement, chamber, joins, ownNeedsS });
  if (laidOut === null) {
    return refuseLayout(chamber, joins);
  }
  const facts: PlacementFacts = {
    facility: index.facility,
    index,
    request,
    chamber,
    joins,
    paths,
    phases: laidOut,
    span: spanOf(laidOut, placement.startMs),
    setTemperatureC,
    estimate: slowest,
    nowMs: placement.nowMs,
    ignoreBookingId: placement.ignoreBookingId,
  };
  return { outcome: 'placed', facts, checks: evaluatePlacement(facts), needsS: ownNeedsS };
}

function refuse(reason: Refused['reason'], sentence: string): Refused {
  return { outcome: 'refused', reason, sentence };
}

function refuseLayout(chamber: Chamber, joins: Load | null): Refused {
  return joins === null
    ? refuse('no-time', `No unload in ${chamber.tag} finds working hours and a door that may open.`)
    : refuse(
        'load-too-short',
        `Joining load ${joins.id} would move its end; choose a later load or lengthen it first.`,
      );
}

function spanOf(phases: readonly PhaseSpan[], startMs: number): PlacementFacts['span'] {
  return { startMs: phases[0]?.startMs ?? startMs, endMs: phases.at(-1)?.endMs ?? startMs };
}

function resolvePaths(
  index: FacilityIndex,
  numbers: readonly PathNumbers[],
): PathChoice[] | Refused {
  const paths: PathChoice[] = [];
  for (const path of numbers) {
    const panel = index.facility.panels.find((candidate) => candidate.id === path.panelId);
    const source = index.sources.get(path.sourceUnitId);
    const meter = index.meters.get(path.meterUnitId);
    const position = index.positions.get(path.positionUnitId);
    const range = meter?.ranges.find((candidate) => candidate.id === path.rangeId);
    if (!panel || !source || !meter || !position || !range) {
      return refuse(
        'unknown',
        `A chosen path names something that is not at ${index.facility.siteName}; choose the path again.`,
      );
    }
    paths.push({ panel, source, meter, range, position });
  }
  return paths;
}

function estimateAll(input: {
  readonly index: FacilityIndex;
  readonly request: SlotRequest;
  readonly chamber: Chamber;
  readonly setTemperatureC: number;
  readonly paths: readonly PathChoice[];
}): readonly SlotEstimate[] {
  const { request, chamber, setTemperatureC } = input;
  const { facility } = input.index;
  const memo = new Map<string, SlotEstimate>();
  for (const path of input.paths) {
    const wiring = pathWiring(path);
    const isKnown = findUnknownWiring(path.panel, path.range, path.meter.tag) === null;
    if (wiring === null || !isKnown) {
      continue;
    }
    const { holderFactor } = path.position;
    const key = JSON.stringify([{ ...wiring, label: '' }, holderFactor]);
    if (!memo.has(key)) {
      const { policy } = facility;
      memo.set(
        key,
        estimatePath({ request, policy, chamber, setTemperatureC, wiring, holderFactor }),
      );
    }
  }
  return memo.size > 0
    ? [...memo.values()]
    : [referenceEstimate({ facility, request, chamber, setTemperatureC })];
}

function hasLength(estimate: SlotEstimate): estimate is WithLength {
  return estimate.outcome === 'ok' || estimate.outcome === 'too-long';
}

/** The longest estimate; one without a length comes before all others, because it refuses. */
function findSlowest(estimates: readonly SlotEstimate[]): SlotEstimate {
  const [first] = estimates;
  if (first === undefined) {
    throw new RangeError('A booking needs at least one estimate.');
  }
  return estimates.reduce((slowest, estimate) => {
    if (!hasLength(slowest) || !hasLength(estimate)) {
      return hasLength(slowest) ? estimate : slowest;
    }
    return estimate.safeTotalS > slowest.safeTotalS ? estimate : slowest;
  }, first);
}

function ownNeeds(estimates: readonly SlotEstimate[], placement: Placement): PhaseNeeds {
  const longest = longestNeeds(estimates.flatMap((estimate) => needsOfEstimate(estimate) ?? []));
  return placement.holdS === null ? longest : { ...longest, hold: placement.holdS };
}

function layOut(input: {
  readonly index: FacilityIndex;
  readonly request: SlotRequest;
  readonly placement: Placement;
  readonly chamber: Chamber;
  readonly joins: Load | null;
  readonly ownNeedsS: PhaseNeeds;
}): readonly PhaseSpan[] | null {
  const { index, placement, chamber, joins, ownNeedsS: needsS } = input;
  const { calendar } = index;
  const { startMs, setTemperatureC, ignoreBookingId } = placement;
  const others = otherLoads({ chamber, joins, ignoreBookingId });
  if (joins === null) {
    const untilMs = startMs + 400 * dayMs;
    return layOutLoad({ calendar, chamber, others, startMs, needsS, setTemperatureC, untilMs });
  }
  return layOutJoinedLoad({
    calendar,
    policy: index.facility.policy,
    chamber,
    load: joins,
    others,
    needsS,
    cellCount: input.request.cellCount,
    ignoreBookingId,
  });
}
