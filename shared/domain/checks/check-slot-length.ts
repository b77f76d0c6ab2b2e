import { makeResult } from './make-result.ts';
import { phaseLengthS } from './phase-length-s.ts';
import type { CheckResult, PlacementFacts } from './types.ts';
import { formatLength } from './words/format-length.ts';

/**
 * Is the hold as long as it must be and not longer than the site offers? Below the likely length it
 * stops, more than a tenth below the safe length it is a caution.
 *
 * @example checkSlotLength(facts).outcome // 'stop' where 80 h would be needed and 72 h are offered
 */
export function checkSlotLength(facts: PlacementFacts): CheckResult {
  const code = 'slot-length';
  const { estimate } = facts;
  const change = {
    kind: 'change-request',
    sentence: 'Ask for a wider tolerance or for screening.',
    subject: null,
  } as const;
  if (estimate.outcome !== 'ok') {
    return makeResult(code, 'stop', estimate.reason, { waysOut: [change] });
  }
  const bookedS = phaseLengthS(facts.phases, 'hold');
  const safeS = estimate.phases.find(({ phase }) => phase === 'hold')?.safeS ?? 0;
  const likelyS = estimate.phases.find(({ phase }) => phase === 'hold')?.likelyS ?? 0;
  const details = {
    used: bookedS > 0 ? safeS / bookedS : null,
    evidence: [
      { label: 'Likely hold', value: formatLength(likelyS), source: 'estimate' },
      { label: 'Safe hold', value: formatLength(safeS), source: 'estimate' },
      { label: 'Booked hold', value: formatLength(bookedS), source: 'booking' },
    ],
    waysOut: [change],
  };
  const { maxHoldS } = facts.facility.policy;
  const booked = formatLength(bookedS);
  if (bookedS > maxHoldS) {
    const most = formatLength(maxHoldS);
    return makeResult(
      code,
      'stop',
      `A hold of ${booked} is over the longest offered, ${most}.`,
      details,
    );
  }
  if (bookedS < likelyS) {
    const likely = formatLength(likelyS);
    return makeResult(
      code,
      'stop',
      `A hold of ${booked} is too short; likely are ${likely}.`,
      details,
    );
  }
  if (bookedS * 1.1 < safeS) {
    const safe = formatLength(safeS);
    return makeResult(
      code,
      'caution',
      `A hold of ${booked} may be short; safe are ${safe}.`,
      details,
    );
  }
  return makeResult(code, 'pass', `The hold of ${booked} is long enough.`, details);
}
