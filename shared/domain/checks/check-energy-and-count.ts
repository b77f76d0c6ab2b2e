import { listContentLimits } from './list-content-limits.ts';
import type { ContentLimit } from './list-content-limits.ts';
import { makeResult } from './make-result.ts';
import type { CheckResult, PlacementFacts } from './types.ts';
import { formatFigure } from './words/format-figure.ts';

/**
 * Do all cells together stay within the energy and count limit of the chamber, and within the energy
 * limit of its room where one is set, at every moment of the slot?
 *
 * @example checkEnergyAndCount(facts).sentence // 'C03 would hold 420 Wh of 400 Wh.'
 */
export function checkEnergyAndCount(facts: PlacementFacts): CheckResult {
  const limits = listContentLimits(facts);
  const worst = limits.toSorted((first, second) => use(second) - use(first))[0];
  if (worst === undefined) {
    return makeResult('energy-and-count', 'pass', 'No limit is set.');
  }
  const figures = `${formatFigure(worst.value)} of ${formatFigure(worst.limit)} ${worst.unit}`;
  return makeResult(
    'energy-and-count',
    use(worst) > 1 ? 'stop' : 'pass',
    `${worst.place} would hold ${figures}.`,
    {
      used: use(worst),
      evidence: limits.map((limit) => ({
        label: limit.unit === 'Wh' ? 'Energy' : 'Cells',
        value: `${formatFigure(limit.value)} of ${formatFigure(limit.limit)} ${limit.unit}`,
        source: limit.place,
      })),
      waysOut: [
        { kind: 'later-start', sentence: 'Start when fewer cells are inside.', subject: null },
        { kind: 'other-path', sentence: 'Choose another chamber.', subject: facts.chamber.tag },
        { kind: 'ask-safety', sentence: 'Ask the safety officer.', subject: worst.place },
      ],
    },
  );
}

function use(limit: ContentLimit): number {
  return limit.limit > 0 ? limit.value / limit.limit : Infinity;
}
