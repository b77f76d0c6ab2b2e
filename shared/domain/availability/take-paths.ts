import type { Candidate, SearchContext } from './candidate.ts';
import { choosePaths } from './choose-paths.ts';
import { disturbanceTest } from './disturbance-test.ts';
import type { PlacementFacts } from '#shared/domain/checks/types.ts';

/**
 * A laid-out candidate with a path for every cell and the estimate of the slowest of them; null where
 * too few are free and able.
 *
 * @param input.wiring slowest wiring allowed, a place in the chamber's list
 * @param input.lifted codes that paths may fail, as bits; 0 = none
 * @example takePaths(context, candidate, { facts, wiring: 0, lifted: 0 })?.paths.length // 6
 */
export function takePaths(
  context: SearchContext,
  candidate: Candidate,
  input: { readonly facts: PlacementFacts; readonly wiring: number; readonly lifted: number },
): PlacementFacts | null {
  const { facts } = input;
  const { prepared } = candidate;
  const { cellCount } = context.request;
  const { paths, slowest } = choosePaths({
    index: context.index,
    prepared,
    cellCount,
    span: facts.span,
    ignoreBookingId: context.ignoreBookingId,
    wiring: input.wiring,
    stopping: context.stopping(facts.span.endMs) & ~input.lifted,
    isDisturbing: disturbanceTest(context, facts),
    ignoreTaken: false,
  });
  if (paths.length < cellCount) {
    return null;
  }
  const estimate = prepared.wirings[slowest]?.estimate ?? facts.estimate;
  return { ...facts, paths, estimate };
}
