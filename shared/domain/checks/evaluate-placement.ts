import { applyRules } from './apply-rules.ts';
import { checkTable } from './check-table.ts';
import { checkCodes } from './types.ts';
import type { CheckResult, PlacementFacts } from './types.ts';

/**
 * Every check on a placement, in the order of `checkCodes`, with grade and deviations applied.
 *
 * @example evaluatePlacement(facts).length // 25
 */
export function evaluatePlacement(facts: PlacementFacts): readonly CheckResult[] {
  return checkCodes.map((code) => applyRules(checkTable[code](facts), facts));
}
