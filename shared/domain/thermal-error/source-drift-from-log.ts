import { requirePositive } from '#shared/domain/quantities/require-positive.ts';
import { inducedCurrentFromLog, type InducedCurrentFromLog } from './induced-current-from-log.ts';

/** One reading of the source's voltage; seconds from any origin. */
export type VoltageSample = { readonly timeS: number; readonly voltageV: number };

/**
 * Window mean of the current that the source's logged voltage pushes into the cell:
 *
 *     ⟨i⟩ = +C·(LP_τe(V)(t2) − LP_τe(V)(t1))/(t2 − t1)
 *
 * The same cascade as for temperature with dU/dT = −1 V/V and no thermal pole.
 *
 * @throws RangeError as `inducedCurrentFromLog`
 * @example
 * sourceDriftFromLog({ samples: [{ timeS: 0, voltageV: 3.7 }, { timeS: 3600, voltageV: 3.7 }],
 *   windowStartS: 0, windowEndS: 3600, capacitanceF: 14000, timeConstantS: 1400 }) // meanA 0
 */
export function sourceDriftFromLog(input: {
  readonly samples: readonly VoltageSample[];
  readonly windowStartS: number;
  readonly windowEndS: number;
  readonly capacitanceF: number;
  readonly timeConstantS: number;
}): InducedCurrentFromLog {
  requirePositive(input.timeConstantS, 'timeConstantS');
  return inducedCurrentFromLog({
    samples: input.samples.map((sample) => ({
      timeS: sample.timeS,
      temperatureC: sample.voltageV,
    })),
    windowStartS: input.windowStartS,
    windowEndS: input.windowEndS,
    matchAtS: null,
    capacitanceF: input.capacitanceF,
    entropicCoefficientVPerK: -1,
    thermalTimeConstantS: 0,
    timeConstantS: input.timeConstantS,
    hold: 'first-order',
  });
}
