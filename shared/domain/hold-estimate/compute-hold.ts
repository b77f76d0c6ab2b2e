import type { CellModel } from './build-cell-model.ts';
import { matchDeviationV, soakToleranceK } from './estimate-assumptions.ts';
import { holdLength } from './hold-length.ts';
import { screeningTime, type ScreeningTime } from './screening-time.ts';
import { timeToTolerance } from './time-to-tolerance.ts';
import type { EstimateInput } from './types.ts';
import { worstStartResidual } from './worst-start-residual.ts';

export type HoldComputation =
  | {
      readonly outcome: 'ok';
      readonly holdS: number;
      /** What the voltage mismatch (or the screening condition) alone asks for, s. */
      readonly electricalS: number;
      /** What the thermal lag alone asks for, s. */
      readonly thermalS: number;
    }
  | Extract<ScreeningTime, { outcome: 'impossible' }>;

/**
 * Length of the hold by the physics alone. Settled: mismatch and thermal lag together inside the
 * tolerance. Screening: the longer of the screening time and the time until the thermal lag stays
 * inside a quarter of the difference.
 *
 * @param options.entropicVPerK dU/dT to use, V/K
 * @param options.mismatchV start mismatch to use (settled), V
 * @param options.readingSdA deviation of the window mean (screening), A
 * @returns s, or `impossible` when the reading could never tell the difference
 * @throws RangeError on figures out of their range
 * @example computeHold(input, model, { entropicVPerK: 0, mismatchV: 0, readingSdA: 1e-9 })
 */
export function computeHold(
  input: EstimateInput,
  model: CellModel,
  options: {
    readonly entropicVPerK: number;
    readonly mismatchV: number;
    readonly readingSdA: number;
  },
): HoldComputation {
  const thermalInput = {
    startResidualA: 0,
    capacitanceF: model.capacitanceF,
    entropicCoefficientVPerK: options.entropicVPerK,
    lagK: soakToleranceK,
    thermalTimeConstantS: model.thermalTimeConstantS,
    timeConstantS: model.timeConstantS,
    toleranceA: model.allowanceA,
  };
  const thermalS = holdLength(thermalInput);
  if (input.kind === 'screening') {
    const screening = screeningTime({
      differenceA: model.toleranceA,
      startSdA: matchDeviationV / model.seriesResistanceOhm,
      readingSdA: options.readingSdA,
      falseAlarm: input.screening.falseAlarm,
      miss: input.screening.miss,
      timeConstantS: model.timeConstantS,
    });
    return screening.outcome === 'impossible'
      ? screening
      : {
          outcome: 'ok',
          holdS: Math.max(screening.timeS, thermalS),
          electricalS: screening.timeS,
          thermalS,
        };
  }
  const startResidualA = worstStartResidual({
    startMismatchV: options.mismatchV,
    seriesResistanceOhm: model.seriesResistanceOhm,
    steadyCurrentA: model.expectedCurrentA,
  });
  return {
    outcome: 'ok',
    holdS: holdLength({ ...thermalInput, startResidualA }),
    electricalS: timeToTolerance({
      startResidual: startResidualA,
      tolerance: model.toleranceA,
      timeConstantS: model.timeConstantS,
    }),
    thermalS,
  };
}
