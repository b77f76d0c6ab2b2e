import { formatSiteDay } from '#shared/domain/calendar/format-site-day.ts';
import { formatSiteTime } from '#shared/domain/calendar/format-site-time.ts';
import { startOfDayMs } from '#shared/domain/calendar/start-of-day-ms.ts';
import { makeResult } from './make-result.ts';
import type { CheckResult, PlacementFacts } from './types.ts';

/**
 * Is the chamber's mapping in date to the end of the slot? A chamber without a recorded mapping is
 * a caution.
 *
 * @example checkMapping(facts).outcome // 'stop' where the mapping falls due during the slot
 */
export function checkMapping(facts: PlacementFacts): CheckResult {
  const { chamber, index, span } = facts;
  const dueOn = chamber.mappingDueOn;
  if (dueOn === null) {
    return makeResult('mapping', 'caution', `No mapping of ${chamber.tag} is recorded.`);
  }
  const evidence = [{ label: 'Mapping due', value: formatSiteDay(dueOn), source: chamber.tag }];
  if (startOfDayMs(index.calendar, dueOn, 1) < span.endMs) {
    const end = formatSiteTime(index.calendar, span.endMs);
    return makeResult(
      'mapping',
      'stop',
      `The mapping of ${chamber.tag} is due ${formatSiteDay(dueOn)}; the slot ends ${end}.`,
      {
        evidence,
        waysOut: [
          { kind: 'other-path', sentence: 'Choose another chamber.', subject: chamber.tag },
        ],
      },
    );
  }
  return makeResult('mapping', 'pass', `The mapping of ${chamber.tag} is in date.`, { evidence });
}
