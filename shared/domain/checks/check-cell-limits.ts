import { findCellFault } from './find-cell-fault.ts';
import { makeResult } from './make-result.ts';
import type { CheckResult, PlacementFacts } from './types.ts';

/**
 * Do set and idle temperature, voltage and state of charge stay within the limits of a released cell
 * type? The limits are the maker's and the safety officer's; nothing here widens them.
 *
 * @example checkCellLimits(facts).outcome // 'stop' at 85 °C for a cell that ends at 60 °C
 */
export function checkCellLimits(facts: PlacementFacts): CheckResult {
  const fault = findCellFault(facts);
  const { limits } = facts.request;
  if (fault === null) {
    return makeResult(
      'cell-limits',
      'pass',
      `Temperature, voltage and state of charge are within the limits of ${facts.request.cellTypeName}.`,
      {
        evidence: [
          {
            label: 'Temperature',
            value: `${limits.minTemperatureC} to ${limits.maxTemperatureC} °C`,
            source: facts.request.cellTypeName,
          },
        ],
      },
    );
  }
  return makeResult('cell-limits', 'stop', fault, {
    waysOut: [
      {
        kind: 'ask-safety',
        sentence: 'Ask the safety officer about this cell type.',
        subject: facts.request.cellTypeName,
      },
    ],
  });
}
