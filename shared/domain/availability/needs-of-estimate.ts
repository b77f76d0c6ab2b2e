import type { LoadPhase, SlotEstimate } from '#shared/domain/hold-estimate/types.ts';

/** Whole seconds each phase must last. */
export type PhaseNeeds = Readonly<Partial<Record<LoadPhase, number>>>;

/**
 * The safe length of every phase of an estimate, s; null where the estimate names no lengths. This
 * is what a load member keeps as `needsS`.
 *
 * @example needsOfEstimate(rangeEstimate) // null
 */
export function needsOfEstimate(estimate: SlotEstimate): PhaseNeeds | null {
  if (estimate.outcome !== 'ok' && estimate.outcome !== 'too-long') {
    return null;
  }
  return Object.fromEntries(estimate.phases.map(({ phase, safeS }) => [phase, safeS]));
}
