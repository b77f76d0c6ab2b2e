import { makeResult } from './make-result.ts';
import type { CheckResult, PlacementFacts } from './types.ts';

/**
 * Are the cells here and undamaged? Damaged cells stop and nobody lifts that; cells still on their
 * way are a caution, and the booking is tentative.
 *
 * @example checkCellsReceived(facts).outcome // 'caution' while a cell is announced only
 */
export function checkCellsReceived(facts: PlacementFacts): CheckResult {
  const { request } = facts;
  const code = 'cells-received';
  if (request.cellsDamaged) {
    return makeResult(code, 'stop', 'A cell is damaged or suspicious and must not be connected.', {
      waysOut: [
        { kind: 'ask-safety', sentence: 'Ask the safety officer to decide.', subject: null },
      ],
    });
  }
  if (!request.cellsReceived) {
    return makeResult(
      code,
      'caution',
      'Not all cells are here yet; the booking is tentative and is released if they do not come.',
      { waysOut: [{ kind: 'receive-cells', sentence: 'Record their receipt.', subject: null }] },
    );
  }
  return makeResult(code, 'pass', 'All cells are here and undamaged.');
}
