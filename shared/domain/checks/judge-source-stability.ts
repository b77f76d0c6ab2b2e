import type { SourceChannel } from '#shared/domain/facility/types.ts';
import type { MeasuringNeeds } from './judge-meter-range.ts';
import type { CheckOutcome } from './types.ts';

export type StabilityJudgement = {
  readonly outcome: CheckOutcome;
  /** Current that the drift pushes, A; null where the drift was never stated. */
  readonly driftA: number | null;
  readonly used: number | null;
};

/**
 * How much of the allowance a source's drift takes: i = C·(dV/dt). Never stated or more than the
 * allowance: stop; above half of it: caution.
 *
 * @example judgeSourceStability({ stabilityVPerH: 1e-7 }, needs).driftA // 3.9e-7 at 14000 F
 */
export function judgeSourceStability(
  source: Pick<SourceChannel, 'stabilityVPerH'>,
  needs: Pick<MeasuringNeeds, 'capacitanceF' | 'allowanceA'>,
): StabilityJudgement {
  if (source.stabilityVPerH === null) {
    return { outcome: 'stop', driftA: null, used: null };
  }
  const driftA = (needs.capacitanceF * Math.abs(source.stabilityVPerH)) / 3600;
  const used = driftA / needs.allowanceA;
  return { outcome: used > 1 ? 'stop' : used > 0.5 ? 'caution' : 'pass', driftA, used };
}
