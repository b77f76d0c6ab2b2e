import { formatSiteTime } from '#shared/domain/calendar/format-site-time.ts';
import { findStillClash } from './find-still-clash.ts';
import { isStill } from './is-still.ts';
import { makeResult } from './make-result.ts';
import { otherLoads } from './other-loads.ts';
import type { CheckResult, PlacementFacts } from './types.ts';

/**
 * Does no ramp, return or (strict door rule) door of one load fall into the still phases of another,
 * in either direction?
 *
 * @example checkStillPhase(facts).outcome // 'stop' where the door would open during a hold
 */
export function checkStillPhase(facts: PlacementFacts): CheckResult {
  const { chamber } = facts;
  const clash = findStillClash(facts.phases, otherLoads(facts), chamber.strictDoor);
  if (clash === null) {
    return makeResult('still-phase', 'pass', `Nothing disturbs a still phase in ${chamber.tag}.`);
  }
  const isOwnStill = isStill(clash.own.phase, chamber.strictDoor) === true;
  const when = formatSiteTime(
    facts.index.calendar,
    Math.max(clash.own.startMs, clash.other.startMs),
  );
  const sentence = isOwnStill
    ? `The ${clash.other.phase} of load ${clash.load.id} would disturb the ${clash.own.phase} at ${when}.`
    : `The ${clash.own.phase} would disturb the ${clash.other.phase} of load ${clash.load.id} at ${when}.`;
  return makeResult('still-phase', 'stop', sentence, {
    evidence: [{ label: 'Disturbance', value: when, source: `load ${clash.load.id}` }],
    waysOut: [
      { kind: 'later-start', sentence: 'Start later.', subject: null },
      { kind: 'other-path', sentence: 'Choose another chamber.', subject: chamber.tag },
    ],
  });
}
