import type { Offer } from './types.ts';
import { evaluatePlacement } from '#shared/domain/checks/evaluate-placement.ts';
import { phaseLengthS } from '#shared/domain/checks/phase-length-s.ts';
import type { PlacementFacts } from '#shared/domain/checks/types.ts';

/**
 * A placement as an offer, with every check evaluated.
 *
 * @example makeOffer(facts).checks.length // 25
 */
export function makeOffer(facts: PlacementFacts): Offer {
  return {
    startMs: facts.span.startMs,
    endMs: facts.span.endMs,
    chamberId: facts.chamber.id,
    chamberTag: facts.chamber.tag,
    joinsLoadId: facts.joins?.id ?? null,
    setTemperatureC: facts.setTemperatureC,
    paths: facts.paths,
    phases: facts.phases,
    waitS: phaseLengthS(facts.phases, 'wait'),
    estimate: facts.estimate,
    checks: evaluatePlacement(facts),
  };
}
