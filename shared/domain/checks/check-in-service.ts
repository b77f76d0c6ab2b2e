import { formatSiteTime } from '#shared/domain/calendar/format-site-time.ts';
import type { ServiceState } from '#shared/domain/facility/types.ts';
import { findTaken } from './find-taken.ts';
import { makeResult } from './make-result.ts';
import type { CheckResult, PlacementFacts } from './types.ts';

const stateWords: Readonly<Record<ServiceState, string>> = {
  'awaiting-release': 'is awaiting release',
  'in-service': 'is in service',
  'out-of-service': 'is out of service',
  retired: 'is retired',
};

/**
 * Is everything in service and released, and is nothing known to be unavailable during the slot?
 *
 * @example checkInService(facts).outcome // 'stop' while S05 is awaiting release
 */
export function checkInService(facts: PlacementFacts): CheckResult {
  const code = 'in-service';
  const units = facts.paths.flatMap(({ source, meter, position }) => [source, meter, position]);
  const otherPath = (tag: string) =>
    ({ kind: 'other-path', sentence: 'Choose another path.', subject: tag }) as const;
  for (const thing of [facts.chamber, ...units]) {
    if (thing.state !== 'in-service') {
      return makeResult(code, 'stop', `${thing.tag} ${stateWords[thing.state]}.`, {
        waysOut: [otherPath(thing.tag)],
      });
    }
  }
  for (const unit of units) {
    const gap = findTaken(facts.index.unavailable.get(unit.unitId), facts.span, null);
    if (gap !== null) {
      const until = formatSiteTime(facts.index.calendar, gap.endMs);
      return makeResult(code, 'stop', `${unit.tag} is unavailable: ${gap.label}.`, {
        evidence: [{ label: 'Unavailable until', value: until, source: unit.tag }],
        waysOut: [otherPath(unit.tag)],
      });
    }
  }
  return makeResult(code, 'pass', 'Everything is in service and released.');
}
