import { requireFinite } from '#shared/domain/quantities/require-finite.ts';
import { requireNotNegative } from '#shared/domain/quantities/require-not-negative.ts';
import { requirePositive } from '#shared/domain/quantities/require-positive.ts';
import { cascadeStep, type CascadeState } from './cascade-step.ts';
import type { TemperatureSample } from './types.ts';

export type InducedCurrentInput = {
  readonly samples: readonly TemperatureSample[];
  readonly windowStartS: number;
  readonly windowEndS: number;
  /** Instant of the voltage match: the filtered temperature is set to the cell's there. */
  readonly matchAtS: number | null;
  readonly capacitanceF: number;
  readonly entropicCoefficientVPerK: number;
  /** 0 when the sensor sits on the cell. */
  readonly thermalTimeConstantS: number;
  readonly timeConstantS: number;
  readonly hold: 'first-order' | 'zero-order';
};

export type InducedCurrentFromLog =
  | { readonly outcome: 'not-covered'; readonly reason: string }
  | {
      readonly outcome: 'ok';
      /** Window mean of the induced current, A, positive into the cell. */
      readonly meanA: number;
      /** Induced current at the end of the window, A. */
      readonly currentAtEndA: number;
      readonly atStart: CascadeState;
      readonly atEnd: CascadeState;
      /** The log begins less than 5·(τ_th + τ_e) before the window and no match resets it. */
      readonly startsLate: boolean;
      /** Longest step between samples used, s. */
      readonly longestStepS: number;
      /** A step exceeded τ_th/2: swings inside it are invisible. */
      readonly hasGap: boolean;
    };

function temperatureAt(
  from: TemperatureSample,
  to: TemperatureSample,
  input: { readonly timeS: number; readonly hold: 'first-order' | 'zero-order' },
): number {
  if (input.hold === 'zero-order') {
    return input.timeS >= to.timeS ? to.temperatureC : from.temperatureC;
  }
  const share = (input.timeS - from.timeS) / (to.timeS - from.timeS);
  return from.temperatureC + share * (to.temperatureC - from.temperatureC);
}

function requireOrdered(samples: readonly TemperatureSample[]): void {
  samples.forEach((sample, index) => {
    requireFinite(sample.timeS, 'sample.timeS');
    requireFinite(sample.temperatureC, 'sample.temperatureC');
    const before = samples[index - 1];
    if (before !== undefined && before.timeS >= sample.timeS) {
      throw new RangeError('The samples of a log must be in order of time, each instant once.');
    }
  });
}

type Walk = {
  state: CascadeState;
  atStart: CascadeState | null;
  atEnd: CascadeState | null;
  longestStepS: number;
};

/** Carries the state over one sampled stretch, stopping at the match and at both window ends. */
function walkStretch(
  walk: Walk,
  stretch: { readonly from: TemperatureSample; readonly to: TemperatureSample },
  input: InducedCurrentInput,
): void {
  const { from, to } = stretch;
  const stops = [input.windowStartS, input.windowEndS, input.matchAtS, to.timeS]
    .filter((stop): stop is number => stop !== null && stop > from.timeS && stop <= to.timeS)
    .toSorted((first, second) => first - second);
  let cursor = from;
  for (const stopS of new Set(stops)) {
    const endC = temperatureAt(from, to, { timeS: stopS, hold: input.hold });
    walk.state = cascadeStep({
      state: walk.state,
      stepS: stopS - cursor.timeS,
      startC: cursor.temperatureC,
      endC,
      thermalTimeConstantS: input.thermalTimeConstantS,
      timeConstantS: input.timeConstantS,
      hold: input.hold,
    });
    cursor = { timeS: stopS, temperatureC: endC };
    mark(walk, stopS, input);
  }
  if (from.timeS < input.windowEndS) {
    walk.longestStepS = Math.max(walk.longestStepS, to.timeS - from.timeS);
  }
}

function mark(walk: Walk, timeS: number, input: InducedCurrentInput): void {
  if (timeS === input.matchAtS) {
    walk.state = { cellC: walk.state.cellC, filteredC: walk.state.cellC };
  }
  if (timeS === input.windowStartS) {
    walk.atStart = walk.state;
  }
  if (timeS === input.windowEndS) {
    walk.atEnd = walk.state;
  }
}

/**
 * Exact window mean of the temperature-induced current from a chamber log, with any spacing of the
 * samples:
 *
 *     ⟨i⟩ = −C·α·(T_f(t2) − T_f(t1))/(t2 − t1)
 *     i(t) = −(C·α/τ_e)·(T_cell − T_f)
 *
 * where T_cell is the chamber temperature through τ_th and T_f is T_cell through τ_e, both started at
 * the first sample. At the voltage match T_f is set to T_cell. Derived here.
 *
 * @returns `not-covered` when the log does not span the window
 * @throws RangeError on a non-finite input, samples out of order, a window of no length, or a match
 *   later than the start of the window
 * @example
 * inducedCurrentFromLog({ samples: [{ timeS: 0, temperatureC: 25 }, { timeS: 3600, temperatureC: 25 }],
 *   windowStartS: 900, windowEndS: 3600, matchAtS: null, capacitanceF: 14000,
 *   entropicCoefficientVPerK: 1e-4, thermalTimeConstantS: 600, timeConstantS: 1400,
 *   hold: 'first-order' }) // { outcome: 'ok', meanA: 0, ... }
 */
export function inducedCurrentFromLog(input: InducedCurrentInput): InducedCurrentFromLog {
  requirePositive(input.capacitanceF, 'capacitanceF');
  requireFinite(input.entropicCoefficientVPerK, 'entropicCoefficientVPerK');
  requireNotNegative(input.thermalTimeConstantS, 'thermalTimeConstantS');
  const lengthS = requirePositive(input.windowEndS - input.windowStartS, 'window length');
  if (input.matchAtS !== null && input.matchAtS > input.windowStartS) {
    throw new RangeError('The voltage match must come before the measuring window.');
  }
  requireOrdered(input.samples);
  const first = input.samples[0];
  const last = input.samples.at(-1);
  if (
    first === undefined ||
    last === undefined ||
    first.timeS > (input.matchAtS ?? input.windowStartS) ||
    last.timeS < input.windowEndS
  ) {
    return {
      outcome: 'not-covered',
      reason:
        'The log does not reach from the voltage match to the end of the measuring window; attach one that does.',
    };
  }
  const walk: Walk = {
    state: { cellC: first.temperatureC, filteredC: first.temperatureC },
    atStart: null,
    atEnd: null,
    longestStepS: 0,
  };
  mark(walk, first.timeS, input);
  for (let index = 1; index < input.samples.length; index += 1) {
    const from = input.samples[index - 1];
    const to = input.samples[index];
    if (from !== undefined && to !== undefined) {
      walkStretch(walk, { from, to }, input);
    }
  }
  return describeWalk(walk, input, { lengthS, firstS: first.timeS });
}

function describeWalk(
  walk: Walk,
  input: InducedCurrentInput,
  log: { readonly lengthS: number; readonly firstS: number },
): InducedCurrentFromLog {
  const { atStart, atEnd } = walk;
  if (atStart === null || atEnd === null) {
    throw new RangeError('The measuring window was not met while walking the log.');
  }
  const charge = input.capacitanceF * input.entropicCoefficientVPerK;
  // The match clears T_f but not the memory of T_cell, which needs only the thermal pole.
  const memoryS =
    input.matchAtS === null
      ? 5 * (input.thermalTimeConstantS + input.timeConstantS)
      : 5 * input.thermalTimeConstantS;
  return {
    outcome: 'ok',
    meanA: (-charge * (atEnd.filteredC - atStart.filteredC)) / log.lengthS,
    currentAtEndA: (-charge * (atEnd.cellC - atEnd.filteredC)) / input.timeConstantS,
    atStart,
    atEnd,
    startsLate: (input.matchAtS ?? input.windowStartS) - log.firstS < memoryS,
    longestStepS: walk.longestStepS,
    hasGap: input.thermalTimeConstantS > 0 && walk.longestStepS > input.thermalTimeConstantS / 2,
  };
}
