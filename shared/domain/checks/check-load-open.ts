import { formatSiteTime } from '#shared/domain/calendar/format-site-time.ts';
import type { Load } from '#shared/domain/facility/types.ts';
import { makeResult } from './make-result.ts';
import type { CheckResult, PlacementFacts } from './types.ts';

/**
 * May a booking still join the load: is it open, not past its closing time, and not yet begun? A
 * booking that is re-checked in its own load has joined already.
 *
 * @example checkLoadOpen({ ...facts, joins: null }).outcome // 'pass', a new load
 */
export function checkLoadOpen(facts: PlacementFacts): CheckResult {
  const { joins } = facts;
  const code = 'load-open';
  if (joins === null) {
    return makeResult(code, 'pass', 'The slot is a load of its own.');
  }
  const isMember = joins.members.some((member) => member.bookingId === facts.ignoreBookingId);
  if (isMember) {
    return makeResult(code, 'pass', `The booking belongs to load ${joins.id}.`);
  }
  const why = findWhyShut(joins, facts);
  if (why === null) {
    const closes =
      joins.closesAtMs === null
        ? 'has no closing time'
        : `closes ${formatSiteTime(facts.index.calendar, joins.closesAtMs)}`;
    return makeResult(code, 'pass', `Load ${joins.id} is open and ${closes}.`);
  }
  return makeResult(code, 'stop', why, {
    waysOut: [
      {
        kind: 'change-request',
        sentence: 'Ask a scheduler to open the load.',
        subject: String(joins.id),
      },
      { kind: 'later-start', sentence: 'Take a later load.', subject: null },
    ],
  });
}

function findWhyShut(load: Load, facts: PlacementFacts): string | null {
  if (load.state !== 'open') {
    return `Load ${load.id} is ${load.state}.`;
  }
  if (load.closesAtMs !== null && load.closesAtMs <= facts.nowMs) {
    return `Load ${load.id} closed ${formatSiteTime(facts.index.calendar, load.closesAtMs)}.`;
  }
  const startMs = load.phases[0]?.startMs ?? Infinity;
  return startMs <= facts.nowMs ? `Load ${load.id} is being connected already.` : null;
}
