import { siteDay } from '#shared/domain/calendar/site-day.ts';
import { roundUpToGrid } from '#shared/domain/calendar/round-up-to-grid.ts';
import type { Chamber, FacilityIndex, Load } from '#shared/domain/facility/types.ts';
import type { Candidate, SearchContext } from './candidate.ts';
import { candidateStarts } from './candidate-starts.ts';
import { stoppingBits } from './check-bits.ts';
import { chooseSetTemperature } from './choose-set-temperature.ts';
import { explainNoOffer } from './explain-no-offer.ts';
import { findBlocked } from './find-blocked.ts';
import { judgeCandidate } from './judge-candidate.ts';
import { makeOffer } from './make-offer.ts';
import { prepareChamber } from './prepare-chamber.ts';
import type { PreparedChamber } from './prepared.ts';
import { referenceEstimate } from './reference-estimate.ts';
import type { BlockedOffer, Offer, SearchOptions, SearchResult, SlotRequest } from './types.ts';

type Prepared = {
  readonly chambers: readonly PreparedChamber[];
  readonly joins: readonly { readonly load: Load; readonly prepared: PreparedChamber }[];
};
type Run = { readonly context: SearchContext; readonly prepared: Prepared };

/**
 * The earliest valid slots for a request, exact and without shortcuts that could change the answer.
 *
 * - A candidate is a quarter hour of UTC, not before now and the earliest start, at which a connect
 *   lies in working hours, in one chamber: as a load of its own at the temperature
 *   `chooseSetTemperature` gives; or the start of a load within the request's temperature tolerance
 *   that it can join without moving the load's end. It must end by the horizon.
 * - It is valid when, with some wiring from the fastest up, `choosePaths` finds a path for every cell
 *   and no check stops.
 * - One offer for each chamber and site day of loading: its earliest valid start; joining before a
 *   load of its own. Offers are ordered by start, end, chamber tag.
 * - `blockedEarlier` is the earliest candidate before the first offer (or at all) that has free and
 *   wired paths and an undisturbed chamber, and that exactly one check stops.
 * - Later slots: ask again with a later `earliestStartMs`.
 *
 * @throws RangeError when the request's figures make no sense
 * @example search(index, request, { options: 3, horizonMs, nowMs }).offers[0]?.chamberTag // 'C07'
 */
export function search(
  index: FacilityIndex,
  request: SlotRequest,
  options: SearchOptions,
): SearchResult {
  const { nowMs, horizonMs } = options;
  const context: SearchContext = {
    index,
    request,
    nowMs,
    horizonMs,
    ignoreBookingId: null,
    stopping: makeStopping(request),
    forecasts: new Map(),
  };
  const unestimable = findUnestimable(context);
  if (unestimable !== null) {
    const reason = { code: 'not-estimable', sentence: unestimable, chambers: [] } as const;
    return { offers: [], blockedEarlier: null, reasons: [reason], startsLookedAt: 0 };
  }
  const run = { context, prepared: prepareAll(context) };
  const { offers, startsLookedAt } = findOffers(run, options.options);
  const reasons =
    offers.length > 0 ? [] : explainNoOffer(context, dailyCandidates(run), run.prepared.chambers);
  return { offers, blockedEarlier: findBlockedEarlier(run, offers), reasons, startsLookedAt };
}

function makeStopping(request: SlotRequest): SearchContext['stopping'] {
  const always = stoppingBits(request, Infinity);
  return request.deviations.length === 0 ? () => always : (endMs) => stoppingBits(request, endMs);
}

function findUnestimable(context: SearchContext): string | null {
  const [chamber] = context.index.facility.chambers;
  if (chamber === undefined) {
    return 'The site has no chamber; enter its equipment first.';
  }
  const { request } = context;
  const { setTemperatureC } = request;
  const { facility } = context.index;
  const estimate = referenceEstimate({ facility, request, chamber, setTemperatureC });
  return estimate.outcome === 'range' || estimate.outcome === 'unknown' ? estimate.reason : null;
}

function prepareAll(context: SearchContext): Prepared {
  const { index, request } = context;
  const { facility } = index;
  const prepare = (chamber: Chamber, setTemperatureC: number): PreparedChamber => {
    const reference = referenceEstimate({ facility, request, chamber, setTemperatureC });
    return prepareChamber({ index, request, chamber, setTemperatureC, reference });
  };
  const chambers = facility.chambers
    .toSorted((first, second) => first.tag.localeCompare(second.tag) || first.id - second.id)
    .map((chamber) => prepare(chamber, chooseSetTemperature(chamber, request)));
  const joins = chambers.flatMap((own) =>
    joinableLoads(own.chamber, request).map((load) => ({
      load,
      prepared:
        load.setTemperatureC === own.setTemperatureC
          ? own
          : prepare(own.chamber, load.setTemperatureC),
    })),
  );
  return { chambers, joins };
}

function joinableLoads(chamber: Chamber, request: SlotRequest): readonly Load[] {
  return chamber.loads
    .filter(
      (load) =>
        (load.state === 'open' || load.state === 'closed') &&
        load.phases.length > 0 &&
        Math.abs(load.setTemperatureC - request.setTemperatureC) <= request.setToleranceK + 1e-9,
    )
    .toSorted((first, second) => first.id - second.id);
}

/** Every candidate in order of start, chamber by chamber, joining first. */
function* candidates(run: Run): Generator<Candidate, void> {
  const { context, prepared } = run;
  const { policy } = context.index.facility;
  const { cellCount, earliestStartMs } = context.request;
  const starts = candidateStarts({
    calendar: context.index.calendar,
    fromMs: roundUpToGrid(Math.max(context.nowMs, earliestStartMs)),
    untilMs: context.horizonMs,
    connectMs: roundUpToGrid(
      60_000 * (policy.connectFixedMin + policy.connectPerCellMin * cellCount),
    ),
    joinStartsMs: prepared.joins.map(({ load }) => load.phases[0]?.startMs ?? Infinity),
  });
  for (const { startMs, isWorking } of starts) {
    for (const own of prepared.chambers) {
      for (const join of prepared.joins) {
        const isHere = join.prepared.chamber.id === own.chamber.id;
        if (isHere && join.load.phases[0]?.startMs === startMs) {
          yield { prepared: join.prepared, startMs, joins: join.load };
        }
      }
      if (isWorking) {
        yield { prepared: own, startMs, joins: null };
      }
    }
  }
}

/** The first candidate of each chamber and site day. */
function* dailyCandidates(run: Run): Generator<Candidate, void> {
  const seen = new Set<string>();
  for (const candidate of candidates(run)) {
    const key = dayKey(run.context, candidate);
    if (!seen.has(key)) {
      seen.add(key);
      yield candidate;
    }
  }
}

function dayKey(context: SearchContext, candidate: Candidate): string {
  return `${candidate.prepared.chamber.id} ${siteDay(context.index.calendar, candidate.startMs)}`;
}

function findOffers(
  run: Run,
  wanted: number,
): { readonly offers: readonly Offer[]; readonly startsLookedAt: number } {
  const offers: Offer[] = [];
  const served = new Set<string>();
  let startsLookedAt = 0;
  for (const candidate of candidates(run)) {
    const last = offers.at(-1);
    if (offers.length >= wanted && last !== undefined && last.startMs < candidate.startMs) {
      break;
    }
    const key = dayKey(run.context, candidate);
    if (served.has(key)) {
      continue;
    }
    startsLookedAt += 1;
    const facts = judgeCandidate(run.context, candidate);
    if (facts !== null) {
      served.add(key);
      offers.push(makeOffer(facts));
    }
  }
  const ordered = offers.toSorted(
    (first, second) =>
      first.startMs - second.startMs ||
      first.endMs - second.endMs ||
      first.chamberTag.localeCompare(second.chamberTag),
  );
  return { offers: ordered.slice(0, wanted), startsLookedAt };
}

function findBlockedEarlier(run: Run, offers: readonly Offer[]): BlockedOffer | null {
  const beforeMs = offers[0]?.startMs ?? Infinity;
  for (const candidate of candidates(run)) {
    if (candidate.startMs >= beforeMs) {
      return null;
    }
    const blocked = findBlocked(run.context, candidate);
    if (blocked !== null) {
      return blocked;
    }
  }
  return null;
}
