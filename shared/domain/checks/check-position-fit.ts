import { findPositionMisfit } from './find-position-misfit.ts';
import { makeResult } from './make-result.ts';
import type { CheckResult, PlacementFacts } from './types.ts';

/**
 * Does every position take the cell by its record: format, capacity, hazard level?
 *
 * @example checkPositionFit(facts).outcome // 'stop' for a pouch in an 18650 holder
 */
export function checkPositionFit(facts: PlacementFacts): CheckResult {
  for (const { position } of facts.paths) {
    const misfit = findPositionMisfit(position, facts.request);
    if (misfit !== null) {
      return makeResult('position-fit', 'stop', `${misfit}.`, {
        waysOut: [
          { kind: 'other-path', sentence: 'Choose another position.', subject: position.tag },
        ],
      });
    }
  }
  const { format, capacityAh } = facts.request.cell;
  return makeResult(
    'position-fit',
    'pass',
    `The positions take ${format} cells of ${capacityAh} Ah at hazard level ${facts.request.limits.hazardLevel}.`,
  );
}
