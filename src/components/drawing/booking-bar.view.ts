import type { BarPhase } from './phase-bar.view.ts';
import type { LoadPhase } from '#shared/domain/hold-estimate/types.ts';

type Span = { readonly phase: LoadPhase; readonly startAt: string; readonly endAt: string };

/**
 * A booking's phases as drawn: what the safe hold has over the likely one is no second hold but a
 * margin after the measurement, kept until the run proves it is not needed.
 */
export function barPhases(
  phases: readonly Span[],
  holdLikelyEndAt: string | null,
): readonly BarPhase[] {
  const drawn = phases.map((span) => ({
    phase: span.phase,
    seconds: (Date.parse(span.endAt) - Date.parse(span.startAt)) / 1000,
  }));
  const hold = phases.find((span) => span.phase === 'hold');
  if (hold === undefined || holdLikelyEndAt === null) {
    return drawn;
  }
  const margin = (Date.parse(hold.endAt) - Date.parse(holdLikelyEndAt)) / 1000;
  if (margin <= 0) {
    return drawn;
  }
  const last = drawn.some((phase) => phase.phase === 'measure') ? 'measure' : 'hold';
  return drawn.flatMap((phase): BarPhase[] => {
    const kept =
      phase.phase === 'hold' ? { ...phase, seconds: Math.max(0, phase.seconds - margin) } : phase;
    return phase.phase === last ? [kept, { phase: 'hold', seconds: margin, margin: true }] : [kept];
  });
}
