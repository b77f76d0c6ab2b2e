import type { Chamber, FacilityPolicy, StabilityFact } from '#shared/domain/facility/types.ts';

const dayMs = 86_400_000;

export type FoundStability = {
  readonly fact: StabilityFact;
  readonly ageDays: number;
  readonly isInDate: boolean;
};

/**
 * The newest judged log of a chamber near a set temperature, and whether it is young enough at the
 * start of the slot; null where there is none within the site's temperature window.
 *
 * @param atMs start of the slot, epoch ms; a log counts its age to then
 * @example findStability({ chamber, policy, setTemperatureC: 45, atMs }) // null without a log
 */
export function findStability(input: {
  readonly chamber: Pick<Chamber, 'assessments'>;
  readonly policy: Pick<FacilityPolicy, 'stabilityMaxAgeDays' | 'stabilityTemperatureWindowK'>;
  readonly setTemperatureC: number;
  readonly atMs: number;
}): FoundStability | null {
  let newest: StabilityFact | null = null;
  for (const fact of input.chamber.assessments) {
    const distanceK = Math.abs(fact.setTemperatureC - input.setTemperatureC);
    const isNear = distanceK <= input.policy.stabilityTemperatureWindowK + 1e-9;
    if (isNear && fact.assessedAtMs <= input.atMs && isNewer(fact, newest)) {
      newest = fact;
    }
  }
  if (newest === null) {
    return null;
  }
  const ageDays = (input.atMs - newest.assessedAtMs) / dayMs;
  return { fact: newest, ageDays, isInDate: ageDays <= input.policy.stabilityMaxAgeDays };
}

function isNewer(fact: StabilityFact, than: StabilityFact | null): boolean {
  return (
    than === null ||
    fact.assessedAtMs > than.assessedAtMs ||
    (fact.assessedAtMs === than.assessedAtMs && fact.id > than.id)
  );
}
