import { applyRules } from './apply-rules.ts';
import { checkTable } from './check-table.ts';
import { checkCodes } from './types.ts';
import type { CheckCode, CheckResult, PlacementFacts } from './types.ts';

/**
 * The first check that stops a placement, in the order of `checkCodes`; null when nothing stops it.
 * Nothing after it is evaluated.
 *
 * @param codes the checks to look at; all by default
 * @example firstStop(facts)?.code // 'double-use'
 */
export function firstStop(
  facts: PlacementFacts,
  codes: readonly CheckCode[] = checkCodes,
): CheckResult | null {
  for (const code of codes) {
    const result = applyRules(checkTable[code](facts), facts);
    if (result.outcome === 'stop') {
      return result;
    }
  }
  return null;
}
