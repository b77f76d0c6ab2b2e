import type { Candidate, SearchContext } from './candidate.ts';
import { layOutCandidate } from './lay-out-candidate.ts';
import { placeStops } from './place-stops.ts';
import { takePaths } from './take-paths.ts';
import { firstStop } from '#shared/domain/checks/first-stop.ts';
import type { PlacementFacts } from '#shared/domain/checks/types.ts';

/**
 * The placement a candidate gives when nothing stops it, with the fastest wiring that does; null
 * where something stops every one.
 *
 * @example judgeCandidate(context, candidate)?.paths.length // 6
 */
export function judgeCandidate(
  context: SearchContext,
  candidate: Candidate,
): PlacementFacts | null {
  const { prepared } = candidate;
  if (!prepared.hasEnoughPaths) {
    return null;
  }
  for (let wiring = 0; wiring < prepared.wirings.length; wiring += 1) {
    const laid = layOutCandidate(context, candidate, wiring);
    if (laid.kind !== 'laid-out') {
      continue;
    }
    const { facts } = laid;
    if ((placeStops(prepared, facts) & context.stopping(facts.span.endMs)) !== 0) {
      continue;
    }
    const placed = takePaths(context, candidate, { facts, wiring, lifted: 0 });
    if (placed !== null && firstStop(placed) === null) {
      return placed;
    }
  }
  return null;
}
