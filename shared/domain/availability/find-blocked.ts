import type { Candidate, SearchContext } from './candidate.ts';
import { checkBits } from './check-bits.ts';
import { layOutCandidate } from './lay-out-candidate.ts';
import { makeOffer } from './make-offer.ts';
import { pathCodes } from './path-codes.ts';
import { placeStops } from './place-stops.ts';
import { takePaths } from './take-paths.ts';
import type { BlockedOffer } from './types.ts';
import type { PlacementFacts } from '#shared/domain/checks/types.ts';

const everyPathRule = checkBits(pathCodes);

/**
 * The candidate as an offer that exactly one check stops; null where nothing, or more than one check,
 * stops it. Free units, a wired path, one temperature and undisturbed still phases are what makes a
 * candidate, so the one check is always a rule that somebody could do something about.
 *
 * @example findBlocked(context, candidate)?.blockedBy.code // 'stability-logged'
 */
export function findBlocked(context: SearchContext, candidate: Candidate): BlockedOffer | null {
  const { prepared } = candidate;
  if (!prepared.hasEnoughPaths && prepared.helpfulCodes.length === 0) {
    return null;
  }
  for (let wiring = 0; wiring < prepared.wirings.length; wiring += 1) {
    const laid = layOutCandidate(context, candidate, wiring);
    const blocked =
      laid.kind === 'laid-out' ? tryRules(context, candidate, { facts: laid.facts, wiring }) : null;
    if (blocked !== null) {
      return blocked;
    }
  }
  return null;
}

/** Lifts one rule at a time: the one that the place fails, or each that paths may fail. */
function tryRules(
  context: SearchContext,
  candidate: Candidate,
  input: { readonly facts: PlacementFacts; readonly wiring: number },
): BlockedOffer | null {
  const { prepared } = candidate;
  const { facts } = input;
  const atPlace = placeStops(prepared, facts) & context.stopping(facts.span.endMs);
  const isOneAtMost = (atPlace & (atPlace - 1)) === 0;
  const canBeEnough =
    isOneAtMost &&
    takePaths(context, candidate, { ...input, lifted: everyPathRule | atPlace }) !== null;
  if (!canBeEnough) {
    return null;
  }
  const lifts =
    atPlace === 0 ? [0, ...prepared.helpfulCodes.map((code) => checkBits([code]))] : [atPlace];
  for (const lifted of lifts) {
    const placed = takePaths(context, candidate, { ...input, lifted });
    const blocked = placed === null ? null : asBlocked(placed);
    if (blocked !== null) {
      return blocked;
    }
  }
  return null;
}

function asBlocked(facts: PlacementFacts): BlockedOffer | null {
  const offer = makeOffer(facts);
  const stops = offer.checks.filter(({ outcome }) => outcome === 'stop');
  const [blockedBy] = stops;
  return blockedBy === undefined || stops.length > 1 ? null : { ...offer, blockedBy };
}
