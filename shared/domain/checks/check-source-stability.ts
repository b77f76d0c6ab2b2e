import { judgeSourceStability } from './judge-source-stability.ts';
import { makeResult } from './make-result.ts';
import { measuringNeeds } from './measuring-needs.ts';
import type { CheckResult, PlacementFacts } from './types.ts';
import { formatCurrent } from './words/format-current.ts';
import { formatFigure } from './words/format-figure.ts';

/**
 * Is the drift of every source, times the cell's capacitance, within the allowance? The source with
 * the largest drift decides; a drift that was never stated stops.
 *
 * @example checkSourceStability(facts).sentence // 'S05/1 drifts by 1.9 µA of 2.5 µA.'
 */
export function checkSourceStability(facts: PlacementFacts): CheckResult {
  const code = 'source-stability';
  const needs = measuringNeeds(facts.request, facts.estimate);
  if (needs === null) {
    return makeResult(code, 'caution', 'No current can be estimated, so no drift can be judged.');
  }
  const judged = facts.paths
    .map(({ source }) => ({ source, ...judgeSourceStability(source, needs) }))
    .toSorted((first, second) => (second.used ?? Infinity) - (first.used ?? Infinity));
  const [worst] = judged;
  if (worst === undefined) {
    return makeResult(code, 'pass', 'No source is chosen.');
  }
  const { source, driftA } = worst;
  const waysOut = [
    { kind: 'other-path', sentence: 'Choose a steadier source.', subject: source.tag } as const,
  ];
  if (driftA === null || source.stabilityVPerH === null) {
    return makeResult(code, 'stop', `The drift of ${source.tag} was never stated.`, { waysOut });
  }
  const coefficient = source.temperatureCoefficientVPerK;
  return makeResult(
    code,
    worst.outcome,
    `The drift of ${source.tag} takes ${formatCurrent(driftA)} of ${formatCurrent(needs.allowanceA)}.`,
    {
      used: worst.used,
      evidence: [
        {
          label: 'Drift',
          value: `${formatFigure(Math.abs(source.stabilityVPerH) * 1e6)} µV/h`,
          source: source.instrumentTag,
        },
        {
          label: 'Temperature coefficient',
          value: coefficient === null ? 'not stated' : `${formatFigure(coefficient * 1e6)} µV/K`,
          source: source.instrumentTag,
        },
      ],
      waysOut,
    },
  );
}
