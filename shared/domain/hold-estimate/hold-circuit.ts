import { requirePositive } from '#shared/domain/quantities/require-positive.ts';

/**
 * Steady current and exact time constant of the hold circuit: a cell of capacitance C with leakage
 * path R_sd in parallel, behind a series resistance R_s, on a source of voltage V:
 *
 *     I = V/(R_sd + R_s)      τ = C·R_s·R_sd/(R_s + R_sd)  ≈ R_s·C
 *
 * @returns steadyCurrentA in A, timeConstantS in s
 * @throws RangeError when an input is not above zero
 * @example
 * holdCircuit({ capacitanceF: 14000, seriesResistanceOhm: 0.1, leakageResistanceOhm: 370_000,
 *   voltageV: 3.7 }) // { steadyCurrentA: 9.9999973e-6, timeConstantS: 1399.99962 }
 */
export function holdCircuit(input: {
  readonly capacitanceF: number;
  readonly seriesResistanceOhm: number;
  readonly leakageResistanceOhm: number;
  readonly voltageV: number;
}): { readonly steadyCurrentA: number; readonly timeConstantS: number } {
  const capacitanceF = requirePositive(input.capacitanceF, 'capacitanceF');
  const seriesOhm = requirePositive(input.seriesResistanceOhm, 'seriesResistanceOhm');
  const leakageOhm = requirePositive(input.leakageResistanceOhm, 'leakageResistanceOhm');
  const totalOhm = seriesOhm + leakageOhm;
  return {
    steadyCurrentA: requirePositive(input.voltageV, 'voltageV') / totalOhm,
    timeConstantS: (capacitanceF * seriesOhm * leakageOhm) / totalOhm,
  };
}
