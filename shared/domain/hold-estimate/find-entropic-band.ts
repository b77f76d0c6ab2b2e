import { requireWithin } from '#shared/domain/quantities/require-within.ts';
import { chemistryFigures, type EntropicBand } from './chemistry-figures.ts';
import type { Chemistry } from './types.ts';

/**
 * Default and bound of dU/dT for a chemistry at a state of charge; with the state of charge missing,
 * the band with the widest bound.
 *
 * @throws RangeError when the state of charge lies outside 0-100 %
 * @example findEntropicBand('nmc811', 50).boundVPerK // 1.5e-4
 */
export function findEntropicBand(
  chemistry: Chemistry,
  stateOfChargePct: number | null,
): EntropicBand {
  const bands = chemistryFigures[chemistry].entropic;
  const found =
    stateOfChargePct === null
      ? bands.toSorted((first, second) => second.boundVPerK - first.boundVPerK)[0]
      : bands.find(
          (band) =>
            requireWithin(stateOfChargePct, 'stateOfChargePct', { low: 0, high: 100 }) <
            band.belowPct,
        );
  if (found === undefined) {
    throw new RangeError(`No dU/dT is on record for ${chemistry}; add a band that covers it.`);
  }
  return found;
}
