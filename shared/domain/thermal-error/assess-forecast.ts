import { requireFinite } from '#shared/domain/quantities/require-finite.ts';
import { requireNotNegative } from '#shared/domain/quantities/require-not-negative.ts';
import { requirePositive } from '#shared/domain/quantities/require-positive.ts';
import { attenuateSwing } from './attenuate-swing.ts';
import { logResolutionFloor } from './log-resolution-floor.ts';
import { sourceDriftCurrent } from './source-drift-current.ts';
import type {
  ForecastAssessment,
  ForecastTerm,
  ForecastVerdict,
  StabilityAssessment,
} from './types.ts';

export type ForecastInput = {
  readonly stability: StabilityAssessment;
  /** Drift of the source, µV/h; the sign does not matter. */
  readonly sourceDriftUvPerH: number;
  readonly capacitanceF: number;
  /** Default or measured dU/dT, V/K. */
  readonly entropicCoefficientVPerK: number;
  /** Bound on |dU/dT|, V/K, at least the default's magnitude. */
  readonly entropicBoundVPerK: number;
  readonly thermalTimeConstantS: number;
  readonly timeConstantS: number;
  /** Length of the measuring window, s. */
  readonly windowS: number;
  readonly allowanceA: number;
};

/** Parts of a forecast for one dU/dT: constant in the window length, and falling as 1/w (A·s). */
type Parts = {
  readonly steadyA: number;
  readonly swingAs: number;
  readonly whiskerAs: number;
};

function computeParts(input: ForecastInput, entropicVPerK: number): Parts {
  const { stability } = input;
  const chargePerKelvin = input.capacitanceF * Math.abs(entropicVPerK);
  const swingK = attenuateSwing({
    halfBandK: stability.halfBandK,
    periodS: stability.periodS,
    thermalTimeConstantS: stability.sensorPlace === 'cell' ? 0 : input.thermalTimeConstantS,
    timeConstantS: input.timeConstantS,
  });
  const floorOverOneSecondA = logResolutionFloor({
    capacitanceF: input.capacitanceF,
    entropicCoefficientVPerK: entropicVPerK,
    resolutionK: stability.resolutionK,
    windowS: 1,
  });
  return {
    steadyA: (chargePerKelvin * Math.abs(stability.driftKPerH)) / 3600,
    swingAs: chargePerKelvin * 2 * swingK,
    whiskerAs: 2 * floorOverOneSecondA,
  };
}

/** Shortest window from which steady + rising/w stays at or below (above) the allowance. */
function lengthFrom(numeratorAs: number, marginA: number): number {
  return marginA > 0 ? Math.max(0, numeratorAs) / marginA : Infinity;
}

function findDecidingLength(
  input: ForecastInput,
  driftA: number,
  parts: { readonly byDefault: Parts; readonly byBound: Parts },
): number | null {
  const { byDefault, byBound } = parts;
  const okFromS = lengthFrom(
    byBound.swingAs + byBound.whiskerAs,
    input.allowanceA - byBound.steadyA - driftA,
  );
  const disturbedFromS = lengthFrom(
    byDefault.whiskerAs - byDefault.swingAs,
    byDefault.steadyA + driftA - input.allowanceA,
  );
  const lengthS = Math.min(okFromS, disturbedFromS);
  return Number.isFinite(lengthS) ? lengthS : null;
}

function listTerms(
  windowS: number,
  driftA: number,
  parts: { readonly byDefault: Parts; readonly byBound: Parts },
): readonly ForecastTerm[] {
  const { byDefault, byBound } = parts;
  return [
    {
      key: 'chamber-drift',
      label: 'Drift of the chamber',
      formula: 'C·|α|·d',
      defaultA: byDefault.steadyA,
      boundA: byBound.steadyA,
    },
    {
      key: 'chamber-swing',
      label: 'Swing of the chamber over the measuring window',
      formula: "2·C·|α|·A'/w",
      defaultA: byDefault.swingAs / windowS,
      boundA: byBound.swingAs / windowS,
    },
    {
      key: 'source-drift',
      label: 'Drift of the source',
      formula: 'C·|µV/h|/3.6e9',
      defaultA: driftA,
      boundA: driftA,
    },
    {
      key: 'log-resolution',
      label: "What the log's resolution leaves open (±)",
      formula: '2·C·|α|·√2·u_T/w, u_T = resolution/√12',
      defaultA: byDefault.whiskerAs / windowS,
      boundA: byBound.whiskerAs / windowS,
    },
  ];
}

const reasons: Record<ForecastVerdict, string> = {
  ok: 'Even with the largest likely dU/dT the chamber and the source stay within the allowance.',
  disturbed:
    'With the usual dU/dT the chamber and the source already take more than the allowance; choose a steadier chamber or source, or a wider tolerance.',
  'cannot-tell':
    'The log neither clears the chamber nor condemns it; measure longer, log with a finer resolution, or measure dU/dT of this cell type.',
};

/**
 * Forecast of the false current over the measuring window from a chamber's logged stability and the
 * source's drift, judged against the allowance:
 *
 *     forecast = C·|α|·(d + 2A'/w),   U = 2·C·|α|·√2·u_T/w,   drift = C·|µV/h|/3.6e9
 *     ok:         with the bound on α,   forecast + drift + U ≤ allowance
 *     disturbed:  with the default α,    forecast + drift − U > allowance
 *     otherwise the log cannot tell
 *
 * A log of the past is only a forecast for a future booking; a run is judged by its own log. Where
 * the sensor sits on the cell, the thermal low-pass is left out. Derived here.
 *
 * @throws RangeError on a non-finite input, a length, capacitance or allowance not above zero, or a
 *   bound below the default
 * @example
 * assessForecast({ stability: { driftKPerH: 0.001, halfBandK: 0, periodS: null, resolutionK: 0.001,
 *   hoursLogged: 72, sensorPlace: 'air' }, sourceDriftUvPerH: 0.1, capacitanceF: 14000,
 *   entropicCoefficientVPerK: -5e-5, entropicBoundVPerK: 1.5e-4, thermalTimeConstantS: 645,
 *   timeConstantS: 1320, windowS: 14400, allowanceA: 1.05e-6 }).verdict // 'ok'
 */
export function assessForecast(input: ForecastInput): ForecastAssessment {
  const windowS = requirePositive(input.windowS, 'windowS');
  const allowanceA = requirePositive(input.allowanceA, 'allowanceA');
  requirePositive(input.stability.hoursLogged, 'hoursLogged');
  requireNotNegative(input.entropicBoundVPerK, 'entropicBoundVPerK');
  const magnitudeVPerK = Math.abs(
    requireFinite(input.entropicCoefficientVPerK, 'entropicCoefficientVPerK'),
  );
  requireFinite(input.stability.driftKPerH, 'driftKPerH');
  if (input.entropicBoundVPerK < magnitudeVPerK) {
    throw new RangeError('The bound on dU/dT must not be smaller than the default dU/dT.');
  }
  const driftA = Math.abs(
    sourceDriftCurrent({ capacitanceF: input.capacitanceF, driftUvPerH: input.sourceDriftUvPerH }),
  );
  const byDefault = computeParts(input, magnitudeVPerK);
  const byBound = computeParts(input, input.entropicBoundVPerK);
  const forecastA = byDefault.steadyA + byDefault.swingAs / windowS;
  const boundForecastA = byBound.steadyA + byBound.swingAs / windowS;
  const whiskerA = byDefault.whiskerAs / windowS;
  const boundWhiskerA = byBound.whiskerAs / windowS;
  const isOk = boundForecastA + driftA + boundWhiskerA <= allowanceA;
  const isDisturbed = forecastA + driftA - whiskerA > allowanceA;
  const verdict = isOk ? 'ok' : isDisturbed ? 'disturbed' : 'cannot-tell';
  return {
    verdict,
    forecastA,
    boundForecastA,
    driftA,
    whiskerA,
    boundWhiskerA,
    allowanceA,
    terms: listTerms(windowS, driftA, { byDefault, byBound }),
    lengthAtWhichLogCouldTellS:
      verdict === 'cannot-tell' ? findDecidingLength(input, driftA, { byDefault, byBound }) : null,
    reason: reasons[verdict],
  };
}
