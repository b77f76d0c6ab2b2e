import { formatSiteTime } from '#shared/domain/calendar/format-site-time.ts';
import { isInWorkingHours } from '#shared/domain/calendar/is-in-working-hours.ts';
import { nextWorkingMoment } from '#shared/domain/calendar/next-working-moment.ts';
import { makeResult } from './make-result.ts';
import type { CheckResult, PlacementFacts } from './types.ts';

/**
 * Do the attended phases lie in the site's working hours: connect and unload, and the match where
 * the site wants somebody there?
 *
 * @example checkWorkingHours(facts).outcome // 'stop' where the unload would be at 03:15
 */
export function checkWorkingHours(facts: PlacementFacts): CheckResult {
  const { calendar } = facts.index;
  const attended = facts.phases.filter(
    ({ phase }) =>
      phase === 'connect' ||
      phase === 'unload' ||
      (phase === 'match' && facts.facility.policy.matchAttended),
  );
  const outside = attended.find((phase) => !isInWorkingHours(calendar, phase));
  if (outside === undefined) {
    return makeResult('working-hours', 'pass', 'Every attended phase lies in working hours.');
  }
  const from = formatSiteTime(calendar, outside.startMs);
  const to = formatSiteTime(calendar, outside.endMs);
  const nextMs = nextWorkingMoment(calendar, outside.startMs);
  return makeResult(
    'working-hours',
    'stop',
    `The ${outside.phase} from ${from} to ${to} is outside working hours.`,
    {
      waysOut: [
        {
          kind: 'later-start',
          sentence:
            nextMs === null
              ? 'Enter working hours for the site.'
              : `The next working hours are from ${formatSiteTime(calendar, nextMs)}.`,
          subject: null,
        },
      ],
    },
  );
}
