import { ceilToStep } from '#shared/domain/quantities/ceil-to-step.ts';
import { handlingOffsetK, roomTemperatureC, soakToleranceK } from './estimate-assumptions.ts';
import { soakAfterRamp, type SoakAfterRamp } from './soak-after-ramp.ts';
import { soakAfterStep } from './soak-after-step.ts';
import type { EstimateInput, LoadPhase, PhaseEstimate } from './types.ts';

export type SoakPlan = Omit<SoakAfterRamp, 'totalS'> & {
  /** How far the cells are from the idle temperature when the door closes, K. */
  readonly startOffsetK: number;
};

/**
 * Ramp and soak of a load: the cells come in a little off the idle temperature (the distance of the
 * room, at least the handling offset, on the worse side), the chamber ramps, and the soak lasts until
 * they are within 0.1 K. At the idle temperature there is no ramp and the soak is that of a step.
 *
 * @throws RangeError on figures out of their range
 * @example planSoak(input, 645).soakS // s
 */
export function planSoak(input: EstimateInput, thermalTimeConstantS: number): SoakPlan {
  const { idleTemperatureC, rampKPerMin } = input.chamber;
  const startOffsetK = Math.max(handlingOffsetK, Math.abs(roomTemperatureC - idleTemperatureC));
  const changeK = input.setTemperatureC - idleTemperatureC;
  if (changeK === 0) {
    const soakS = soakAfterStep({
      stepK: startOffsetK,
      toleranceK: soakToleranceK,
      thermalTimeConstantS,
    });
    return { rampS: 0, lagK: startOffsetK, soakS, startOffsetK };
  }
  const { rampS, lagK, soakS } = soakAfterRamp({
    fromC: idleTemperatureC,
    toC: input.setTemperatureC,
    rateKPerS: rampKPerMin / 60,
    cellStartC: idleTemperatureC - Math.sign(changeK) * startOffsetK,
    toleranceK: soakToleranceK,
    thermalTimeConstantS,
  });
  return { rampS, lagK, soakS, startOffsetK };
}

/**
 * The phases of one load in order, each in whole minutes (rounded up); those of zero length are left
 * out. Connect and unload carry the idle temperature, all between them the set temperature.
 *
 * @param input the estimate's input
 * @param lengths.likelyHoldS, lengths.safeHoldS the hold before rounding, s
 * @param lengths.measureS the measuring window, s
 * @throws RangeError on figures out of their range
 * @example buildPhases(input, { soak, likelyHoldS: 3040, safeHoldS: 5905, measureS: 3600 })
 */
export function buildPhases(
  input: EstimateInput,
  lengths: {
    readonly soak: SoakPlan;
    readonly likelyHoldS: number;
    readonly safeHoldS: number;
    readonly measureS: number;
  },
): readonly PhaseEstimate[] {
  const { process, cellCount, chamber, setTemperatureC } = input;
  const { soak } = lengths;
  const connectMin =
    process.connectFixedMin +
    process.connectPerCellMin * cellCount +
    process.recabledPaths * process.recableMinPerPath;
  const unloadMin = process.unloadFixedMin + process.unloadPerCellMin * cellCount;
  const build = (
    phase: LoadPhase,
    length: { readonly likelyS: number; readonly safeS?: number },
    isAttended = false,
  ): PhaseEstimate => ({
    phase,
    likelyS: ceilToStep(length.likelyS, 60),
    safeS: ceilToStep(length.safeS ?? length.likelyS, 60),
    isAttended,
    setTemperatureC:
      phase === 'connect' || phase === 'unload' ? chamber.idleTemperatureC : setTemperatureC,
  });
  return [
    build('connect', { likelyS: connectMin * 60 }, true),
    build('ramp', { likelyS: soak.rampS }),
    build('soak', { likelyS: soak.soakS }),
    build('match', { likelyS: process.matchMin * 60 }, process.matchAttended),
    build('hold', { likelyS: lengths.likelyHoldS, safeS: lengths.safeHoldS }),
    build('measure', { likelyS: lengths.measureS }),
    build('return', { likelyS: soak.rampS }),
    build('unload', { likelyS: unloadMin * 60 }, true),
  ].filter((phase) => phase.safeS > 0);
}
