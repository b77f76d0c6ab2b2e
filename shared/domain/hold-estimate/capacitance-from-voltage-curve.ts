import { requireFinite } from '#shared/domain/quantities/require-finite.ts';

/**
 * Differential capacitance by capacity from the open-circuit voltage on both sides of a state of
 * charge: k = 3600·ΔSoC/ΔU.
 *
 * @param input.lowSoc, input.highSoc states of charge, 0-1
 * @param input.lowV, input.highV open-circuit voltage there, V
 * @returns F/Ah, or `null` where the curve is flat or falls (no capacitance can be read from it)
 * @throws RangeError on a non-finite input or states of charge out of order
 * @example
 * capacitanceFromVoltageCurve({ lowSoc: 0.45, highSoc: 0.55, lowV: 3.6, highV: 3.69 }) // 4000
 */
export function capacitanceFromVoltageCurve(input: {
  readonly lowSoc: number;
  readonly highSoc: number;
  readonly lowV: number;
  readonly highV: number;
}): number | null {
  const width = requireFinite(input.highSoc, 'highSoc') - requireFinite(input.lowSoc, 'lowSoc');
  if (width <= 0) {
    throw new RangeError('The higher state of charge must be above the lower one.');
  }
  const riseV = requireFinite(input.highV, 'highV') - requireFinite(input.lowV, 'lowV');
  return riseV <= 0 ? null : (3600 * width) / riseV;
}
