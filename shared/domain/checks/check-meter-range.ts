import { judgeMeterRange } from './judge-meter-range.ts';
import { makeResult } from './make-result.ts';
import { measuringNeeds } from './measuring-needs.ts';
import type { CheckResult, PlacementFacts } from './types.ts';
import { formatCurrent } from './words/format-current.ts';

/**
 * Does every meter range take the current and tell it within the allowance? The worst path decides.
 *
 * @example checkMeterRange(facts).outcome // 'stop' where 15 µA must fit a 10 µA range
 */
export function checkMeterRange(facts: PlacementFacts): CheckResult {
  const code = 'meter-range';
  const needs = measuringNeeds(facts.request, facts.estimate);
  if (needs === null) {
    return makeResult(code, 'caution', 'No current can be estimated, so no range can be judged.');
  }
  const otherPath = {
    kind: 'other-path',
    sentence: 'Choose another meter.',
    subject: null,
  } as const;
  const judged = facts.paths
    .map(({ meter, range }) => ({ meter, range, ...judgeMeterRange(range, needs) }))
    .toSorted(
      (first, second) =>
        Number(first.isOnScale) - Number(second.isOnScale) || second.used - first.used,
    );
  const [worst] = judged;
  if (worst === undefined) {
    return makeResult(code, 'pass', 'No meter is chosen.');
  }
  const name = `${worst.meter.tag} ${worst.range.label}`;
  if (!worst.isOnScale) {
    return makeResult(
      code,
      'stop',
      `${name} ends at ${formatCurrent(worst.range.fullScaleA)}; ${formatCurrent(needs.largestCurrentA)} must fit.`,
      { waysOut: [otherPath] },
    );
  }
  const takes = Math.max(worst.errorA, 2 * worst.range.resolutionA);
  return makeResult(
    code,
    worst.outcome,
    `${name} may be wrong by ${formatCurrent(takes)} of ${formatCurrent(needs.allowanceA)}.`,
    {
      used: worst.used,
      evidence: [
        {
          label: 'Expected current',
          value: formatCurrent(needs.expectedCurrentA),
          source: 'estimate',
        },
        {
          label: 'Accuracy',
          value: formatCurrent(worst.errorA),
          source: worst.meter.instrumentTag,
        },
        {
          label: 'Resolution',
          value: formatCurrent(worst.range.resolutionA),
          source: worst.meter.instrumentTag,
        },
      ],
      waysOut: [otherPath],
    },
  );
}
