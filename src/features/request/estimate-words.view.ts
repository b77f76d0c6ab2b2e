import { formatDuration } from '#src/lib/format-duration.ts';
import { t } from '#src/texts/t.ts';
import type { LotEstimate } from './estimate-input.view.ts';

const words = t.request;

/** One estimate in one sentence, as it is read out. */
export function estimateSentence(result: LotEstimate): string {
  if (result.kind === 'needs') {
    return words.estimateAsks(result.needs.map((need) => words.needs[need]).join(', '));
  }
  const { estimate } = result;
  switch (estimate.outcome) {
    case 'ok':
      return words.slotSummary(
        formatDuration(estimate.likelyTotalS),
        formatDuration(estimate.safeTotalS),
      );
    case 'range':
      return `${words.rangeTitle} ${estimate.question.text}`;
    case 'too-long':
    case 'unknown':
    case 'impossible':
      return estimate.reason;
  }
}

/** All lots, each with its number where there are several. */
export function estimatesSentence(results: readonly LotEstimate[]): string {
  return results
    .map((result, place) =>
      results.length === 1
        ? estimateSentence(result)
        : `${words.estimateOfLot(place + 1)}: ${estimateSentence(result)}`,
    )
    .join(' ');
}
