import { formatSiteTime } from '#shared/domain/calendar/format-site-time.ts';
import { makeResult } from './make-result.ts';
import type { CheckResult, PlacementFacts } from './types.ts';

/**
 * Does the slot end by the date it is needed? Never more than a caution.
 *
 * @example checkNeededBy(facts).outcome // 'caution' for a slot that ends a day late
 */
export function checkNeededBy(facts: PlacementFacts): CheckResult {
  const { neededByMs } = facts.request;
  if (neededByMs === null) {
    return makeResult('needed-by', 'pass', 'No date was asked for.');
  }
  const needed = formatSiteTime(facts.index.calendar, neededByMs);
  const end = formatSiteTime(facts.index.calendar, facts.span.endMs);
  const evidence = [{ label: 'Needed by', value: needed, source: 'request' }];
  return facts.span.endMs > neededByMs
    ? makeResult('needed-by', 'caution', `It ends ${end}; needed by ${needed}.`, { evidence })
    : makeResult('needed-by', 'pass', `It ends ${end}, before ${needed}.`, { evidence });
}
