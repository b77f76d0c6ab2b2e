import { checkRules } from './check-rules.ts';
import { stopEffect } from './stop-effect.ts';
import type { CheckResult, PlacementFacts } from './types.ts';

/**
 * Turns a stop into a caution where the work is indicative or a deviation lifts it, and offers a
 * deviation where one could be granted.
 *
 * @example applyRules(passed, facts) // the same result
 */
export function applyRules(
  result: CheckResult,
  facts: Pick<PlacementFacts, 'request' | 'span'>,
): CheckResult {
  if (result.outcome !== 'stop') {
    return result;
  }
  const effect = stopEffect(result.code, facts.request, facts.span.endMs);
  if (effect.kind === 'softened') {
    return {
      ...result,
      outcome: 'caution',
      sentence: `${result.sentence} The work is indicative, so this is a caution.`,
    };
  }
  if (effect.kind === 'lifted') {
    return {
      ...result,
      outcome: 'caution',
      sentence: `${result.sentence} Deviation ${effect.deviationId} allows it.`,
      liftedByDeviationId: effect.deviationId,
    };
  }
  if (checkRules[result.code].isNeverLifted) {
    return result;
  }
  const ask = {
    kind: 'deviation',
    sentence: 'Ask a metrologist or manager for a deviation.',
    subject: result.code,
  } as const;
  return { ...result, waysOut: [...result.waysOut, ask] };
}
