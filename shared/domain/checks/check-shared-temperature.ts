import { formatSiteTime } from '#shared/domain/calendar/format-site-time.ts';
import { findTemperatureClash } from './find-temperature-clash.ts';
import { makeResult } from './make-result.ts';
import { otherLoads } from './other-loads.ts';
import type { CheckResult, PlacementFacts } from './types.ts';
import { formatTemperature } from './words/format-temperature.ts';

/**
 * Does the chamber have one set temperature at a time, over the phases of all its loads?
 *
 * @example checkSharedTemperature(facts).outcome // 'stop' beside a load at another temperature
 */
export function checkSharedTemperature(facts: PlacementFacts): CheckResult {
  const clash = findTemperatureClash(facts.phases, otherLoads(facts));
  if (clash === null) {
    return makeResult(
      'shared-temperature',
      'pass',
      `${facts.chamber.tag} is at no other temperature during the slot.`,
    );
  }
  const until = formatSiteTime(facts.index.calendar, clash.other.endMs);
  return makeResult(
    'shared-temperature',
    'stop',
    `Load ${clash.load.id} keeps ${facts.chamber.tag} at ${formatTemperature(clash.other.setTemperatureC)} until ${until}; this slot wants ${formatTemperature(clash.own.setTemperatureC)} in its ${clash.own.phase}.`,
    {
      evidence: [{ label: 'Temperature until', value: until, source: `load ${clash.load.id}` }],
      waysOut: [
        { kind: 'later-start', sentence: 'Start later.', subject: null },
        { kind: 'other-path', sentence: 'Choose another chamber.', subject: facts.chamber.tag },
      ],
    },
  );
}
