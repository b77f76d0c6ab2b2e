import { makeResult } from './make-result.ts';
import type { CheckResult, PlacementFacts } from './types.ts';
import { formatTemperature } from './words/format-temperature.ts';

/**
 * Does the chamber reach the set temperature, and does it lie within the request's tolerance?
 *
 * @example checkChamberSpan(facts).outcome // 'stop' for 85 °C in a chamber that ends at 70 °C
 */
export function checkChamberSpan(facts: PlacementFacts): CheckResult {
  const { chamber, request, setTemperatureC } = facts;
  const code = 'chamber-span';
  const otherTemperature = {
    kind: 'other-temperature',
    sentence: 'Choose another chamber or set temperature.',
    subject: chamber.tag,
  } as const;
  if (setTemperatureC < chamber.minTemperatureC || setTemperatureC > chamber.maxTemperatureC) {
    return makeResult(
      code,
      'stop',
      `${chamber.tag} spans ${chamber.minTemperatureC} to ${chamber.maxTemperatureC} °C, not ${formatTemperature(setTemperatureC)}.`,
      { waysOut: [otherTemperature] },
    );
  }
  const offK = Math.abs(setTemperatureC - request.setTemperatureC);
  if (offK > request.setToleranceK + 1e-9) {
    return makeResult(
      code,
      'stop',
      `${chamber.tag} would be at ${formatTemperature(setTemperatureC)}; asked is ${formatTemperature(request.setTemperatureC)} ± ${request.setToleranceK} K.`,
      { waysOut: [otherTemperature] },
    );
  }
  return makeResult(code, 'pass', `${chamber.tag} reaches ${formatTemperature(setTemperatureC)}.`);
}
