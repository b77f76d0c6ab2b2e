import { formatSiteTime } from '#shared/domain/calendar/format-site-time.ts';
import { findTaken } from './find-taken.ts';
import { makeResult } from './make-result.ts';
import type { CheckResult, PlacementFacts } from './types.ts';

/**
 * Is every source channel, meter channel and position free over the whole slot, and used once only?
 *
 * @example checkDoubleUse(facts).outcome // 'stop' where booking 2418 has the channel
 */
export function checkDoubleUse(facts: PlacementFacts): CheckResult {
  const code = 'double-use';
  const units = facts.paths.flatMap(({ source, meter, position }) => [source, meter, position]);
  const seen = new Set<number>();
  for (const unit of units) {
    if (seen.has(unit.unitId)) {
      return makeResult(code, 'stop', `${unit.tag} is chosen twice.`, {
        waysOut: [{ kind: 'other-path', sentence: 'Choose another path.', subject: unit.tag }],
      });
    }
    seen.add(unit.unitId);
    const clash = findTaken(facts.index.taken.get(unit.unitId), facts.span, facts.ignoreBookingId);
    if (clash !== null) {
      const until = formatSiteTime(facts.index.calendar, clash.endMs);
      return makeResult(code, 'stop', `${unit.tag} is taken by ${clash.label} until ${until}.`, {
        evidence: [{ label: 'Taken until', value: until, source: clash.label }],
        waysOut: [
          { kind: 'later-start', sentence: `Start at ${until} or later.`, subject: null },
          { kind: 'other-path', sentence: 'Choose another path.', subject: unit.tag },
        ],
      });
    }
  }
  return makeResult(code, 'pass', `All ${units.length} channels and positions are free.`);
}
