import { requireNotNegative } from '#shared/domain/quantities/require-not-negative.ts';
import type { Wiring } from './types.ts';

export type ExternalResistance =
  | { readonly outcome: 'ok'; readonly resistanceOhm: number; readonly burdenOhm: number }
  | { readonly outcome: 'unknown'; readonly reason: string };

/**
 * Resistance outside the cell that the settling current sees:
 *
 *     R_ext = leads + source output + burden (only where the burden lies outside the sense loop)
 *
 * A ten-ohm burden outside the loop makes a 3.5 Ah cell settle with a time constant of 39 h, so
 * nothing is estimated while burden or its place is unknown.
 *
 * @throws RangeError on a negative or non-finite resistance
 * @example
 * externalResistance({ leadResistanceOhm: 0.06, sourceOutputOhm: 0, burdenOhm: 10,
 *   burdenInsideLoop: true, ... }) // { outcome: 'ok', resistanceOhm: 0.06, burdenOhm: 0 }
 */
export function externalResistance(wiring: Wiring): ExternalResistance {
  const leadOhm = requireNotNegative(wiring.leadResistanceOhm, 'leadResistanceOhm');
  const sourceOhm = requireNotNegative(wiring.sourceOutputOhm, 'sourceOutputOhm');
  if (wiring.burdenOhm === null) {
    return {
      outcome: 'unknown',
      reason: `The burden of the meter range is not on record for ${wiring.label}; ask a metrologist to enter it.`,
    };
  }
  if (wiring.burdenInsideLoop === null) {
    return {
      outcome: 'unknown',
      reason: `It is not on record whether the meter's burden lies inside the sense loop of ${wiring.label}; ask a metrologist to enter it.`,
    };
  }
  const recordedOhm = requireNotNegative(wiring.burdenOhm, 'burdenOhm');
  const burdenOhm = wiring.burdenInsideLoop ? 0 : recordedOhm;
  return { outcome: 'ok', resistanceOhm: leadOhm + sourceOhm + burdenOhm, burdenOhm };
}
