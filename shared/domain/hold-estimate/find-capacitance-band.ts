import { requireWithin } from '#shared/domain/quantities/require-within.ts';
import { chemistryFigures, type CapacitanceBand } from './chemistry-figures.ts';
import type { Chemistry } from './types.ts';

/**
 * Capacitance by capacity for a chemistry at a state of charge.
 *
 * @returns the band, or `null` when the state of charge is missing and the capacitance depends on it
 * @throws RangeError when the state of charge lies outside 0-100 %
 * @example findCapacitanceBand('lfp', 22)?.capacitanceFPerAh.typical // 8000
 */
export function findCapacitanceBand(
  chemistry: Chemistry,
  stateOfChargePct: number | null,
): CapacitanceBand | null {
  const { capacitance, needsStateOfCharge } = chemistryFigures[chemistry];
  if (stateOfChargePct === null) {
    return needsStateOfCharge ? null : (capacitance[0] ?? null);
  }
  requireWithin(stateOfChargePct, 'stateOfChargePct', { low: 0, high: 100 });
  return capacitance.find((band) => stateOfChargePct < band.belowPct) ?? null;
}
