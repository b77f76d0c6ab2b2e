import type { CellModel } from './build-cell-model.ts';
import type { MeasurePlan } from './plan-measure.ts';
import type { EstimateInput } from './types.ts';

/**
 * Sentences a reader of the estimate must see: where its figures are weak and what would help.
 *
 * @example writeNotes(input, model, { measure, burdenOhm: 0 }) // []
 */
export function writeNotes(
  input: EstimateInput,
  model: CellModel,
  path: { readonly measure: MeasurePlan; readonly burdenOhm: number },
): readonly string[] {
  const { cell } = input;
  const isOnPlateau = cell.chemistry === 'lfp' && model.capacitanceFPerAh > 10_000;
  const resolutionSdA = input.wiring.meterResolutionA / Math.sqrt(12);
  const checks: readonly (readonly [boolean, string])[] = [
    [
      isOnPlateau,
      'On the LFP plateau the capacitance is an order of magnitude only; measure at 20-25 % state of charge, or rely on learned times.',
    ],
    [
      cell.cellClass === 'large-prismatic',
      'No measured settle time is published above 100 Ah; the figures are extrapolated.',
    ],
    [
      cell.stateOfChargePct === null && (cell.measured?.entropicCoefficientVPerK ?? null) === null,
      'The state of charge is not stated, so the worst case takes the widest bound on dU/dT; state it to narrow the range.',
    ],
    [
      path.burdenOhm > 0,
      "The meter's burden lies outside the sense loop and slows the settling; a path with the burden inside the loop is faster.",
    ],
    [
      resolutionSdA > path.measure.targetA,
      'One step of the meter is coarse against the allowance, and averaging does not remove it; choose a more sensitive range.',
    ],
  ];
  return checks.filter(([applies]) => applies).map(([, sentence]) => sentence);
}
