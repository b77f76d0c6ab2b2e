import { containsSpan } from '#shared/domain/intervals/contains-span.ts';
import type { UnattendedPermission } from '#shared/domain/facility/types.ts';
import type { PlacementFacts } from './types.ts';

/**
 * The permission under which a slot may run unattended in its chamber: for its temperature, hazard
 * level, state of charge (the highest allowed where none is stated), cell type and whole time.
 *
 * @example findPermission(facts)?.contact // undefined where the safety officer permitted nothing
 */
export function findPermission(
  facts: Pick<PlacementFacts, 'chamber' | 'request' | 'setTemperatureC' | 'span'>,
): UnattendedPermission | undefined {
  const { request } = facts;
  const charge = request.cell.stateOfChargePct ?? request.limits.maxHoldStateOfCharge;
  return facts.chamber.unattended.find(
    (candidate) =>
      facts.setTemperatureC <= candidate.maxTemperatureC &&
      request.limits.hazardLevel <= candidate.maxHazard &&
      charge <= candidate.maxStateOfCharge &&
      (candidate.during === undefined || containsSpan(candidate.during, facts.span)) &&
      (candidate.cellTypeName === undefined || candidate.cellTypeName === request.cellTypeName),
  );
}
