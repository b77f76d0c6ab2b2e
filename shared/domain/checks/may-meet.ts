import type { Load, PhaseSpan } from '#shared/domain/facility/types.ts';

/**
 * Can a load share an instant with phases at all? Asked first, because most loads of a chamber lie
 * far away.
 *
 * @example mayMeet([], load) // false
 */
export function mayMeet(phases: readonly PhaseSpan[], load: Load): boolean {
  const startMs = phases[0]?.startMs ?? Infinity;
  const endMs = phases.at(-1)?.endMs ?? -Infinity;
  return (
    (load.phases[0]?.startMs ?? Infinity) < endMs &&
    (load.phases.at(-1)?.endMs ?? -Infinity) > startMs
  );
}
