import type { Chamber } from '#shared/domain/facility/types.ts';
import type { SlotRequest } from './types.ts';

/**
 * The set temperature a new load in a chamber would take: the logged temperature nearest to the
 * asked one within its tolerance, otherwise the asked one.
 *
 * @example chooseSetTemperature({ assessments: [] }, { setTemperatureC: 45, setToleranceK: 1 }) // 45
 */
export function chooseSetTemperature(
  chamber: Pick<Chamber, 'assessments'>,
  request: Pick<SlotRequest, 'setTemperatureC' | 'setToleranceK'>,
): number {
  const asked = request.setTemperatureC;
  const near = chamber.assessments
    .map((fact) => fact.setTemperatureC)
    .filter((logged) => Math.abs(logged - asked) <= request.setToleranceK + 1e-9)
    .toSorted(
      (first, second) => Math.abs(first - asked) - Math.abs(second - asked) || first - second,
    );
  return near[0] ?? asked;
}
