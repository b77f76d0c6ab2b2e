import { requireFinite } from '#shared/domain/quantities/require-finite.ts';
import { requireNotNegative } from '#shared/domain/quantities/require-not-negative.ts';
import { requirePositive } from '#shared/domain/quantities/require-positive.ts';

/** State of the two low-passes in series: the cell's temperature and its filtered copy. */
export type CascadeState = { readonly cellC: number; readonly filteredC: number };

/** (h/b)·(e^(−h/a) − e^(−h/b))/(h/b − h/a), smooth where the two time constants are nearly equal. */
function crossGain(stepS: number, thermalS: number, electricalS: number): number {
  const fast = stepS / thermalS;
  const slow = stepS / electricalS;
  const difference = slow - fast;
  if (Math.abs(difference) < 0.01) {
    const shape = difference === 0 ? 1 : -Math.expm1(-difference) / difference;
    return slow * Math.exp(-fast) * shape;
  }
  return (slow * (Math.exp(-fast) - Math.exp(-slow))) / difference;
}

/**
 * Exact update of cell temperature (low-pass τ_th of the chamber) and filtered temperature (low-pass
 * τ_e of the cell) over one step of any length, with the chamber temperature either running straight
 * from start to end (first-order hold) or standing at its start value (zero-order hold):
 *
 *     m = (u1 − u0)/h (first order) or 0;   p = u0 − m·a;   q = x1 − p
 *     x1' = p + m·h + q·e^(−h/a)
 *     x2' = p + m·(h − b) + q·g + (x2 − p + m·b)·e^(−h/b)
 *     a = 0 (sensor on the cell): x1' = u1,  x2' = u0 + m·(h − b) + (x2 − u0 + m·b)·e^(−h/b)
 *
 * Derived here; checked against Runge-Kutta on an irregular log.
 *
 * @param input.stepS length of the step h, s
 * @param input.thermalTimeConstantS a, s; 0 when the sensor sits on the cell
 * @param input.timeConstantS b, s
 * @throws RangeError on a non-finite input, a negative a, or h or b not above zero
 * @example
 * cascadeStep({ state: { cellC: 25, filteredC: 25 }, stepS: 60, startC: 25, endC: 25,
 *   thermalTimeConstantS: 600, timeConstantS: 1400, hold: 'first-order' }) // { cellC: 25, filteredC: 25 }
 */
export function cascadeStep(input: {
  readonly state: CascadeState;
  readonly stepS: number;
  readonly startC: number;
  readonly endC: number;
  readonly thermalTimeConstantS: number;
  readonly timeConstantS: number;
  readonly hold: 'first-order' | 'zero-order';
}): CascadeState {
  const stepS = requirePositive(input.stepS, 'stepS');
  const thermalS = requireNotNegative(input.thermalTimeConstantS, 'thermalTimeConstantS');
  const electricalS = requirePositive(input.timeConstantS, 'timeConstantS');
  const startC = requireFinite(input.startC, 'startC');
  const endC = requireFinite(input.endC, 'endC');
  const cellC = requireFinite(input.state.cellC, 'state.cellC');
  const filteredC = requireFinite(input.state.filteredC, 'state.filteredC');
  const slope = input.hold === 'first-order' ? (endC - startC) / stepS : 0;
  const base = startC - slope * thermalS;
  const offset = thermalS === 0 ? 0 : cellC - base;
  const gain = thermalS === 0 ? 0 : crossGain(stepS, thermalS, electricalS);
  const decay = Math.exp(-stepS / electricalS);
  return {
    cellC: thermalS === 0 ? endC : base + slope * stepS + offset * Math.exp(-stepS / thermalS),
    filteredC:
      base +
      slope * (stepS - electricalS) +
      offset * gain +
      (filteredC - base + slope * electricalS) * decay,
  };
}
