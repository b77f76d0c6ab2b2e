import type { PhaseSpan } from '#shared/domain/facility/types.ts';
import type { LoadPhase } from '#shared/domain/hold-estimate/types.ts';

/**
 * How long a phase lasts in a load, s; 0 where the load has no such phase.
 *
 * @example phaseLengthS([], 'hold') // 0
 */
export function phaseLengthS(phases: readonly PhaseSpan[], phase: LoadPhase): number {
  return phases
    .filter((span) => span.phase === phase)
    .reduce((sum, span) => sum + (span.endMs - span.startMs) / 1000, 0);
}
