import type { PlacementFacts } from './types.ts';
import { formatTemperature } from './words/format-temperature.ts';

/**
 * Which limit of its type a cell would exceed in a chamber at a set temperature, as a sentence; null
 * where it exceeds none.
 *
 * @example findCellFault(facts) // 'LF-35 is not released for tests.'
 */
export function findCellFault(
  facts: Pick<PlacementFacts, 'request' | 'chamber' | 'setTemperatureC'>,
): string | null {
  const { limits, cellTypeName, cell } = facts.request;
  if (!limits.released) {
    return `${cellTypeName} is not released for tests.`;
  }
  const temperatures = [facts.setTemperatureC, facts.chamber.idleTemperatureC];
  const outside = temperatures.find(
    (value) => value < limits.minTemperatureC || value > limits.maxTemperatureC,
  );
  if (outside !== undefined) {
    return `${cellTypeName} may be at ${limits.minTemperatureC} to ${limits.maxTemperatureC} °C, not at ${formatTemperature(outside)}.`;
  }
  const voltageV = limits.openCircuitVoltageV;
  if (voltageV !== null && (voltageV < limits.minVoltageV || voltageV > limits.maxVoltageV)) {
    return `${cellTypeName} may be held at ${limits.minVoltageV} to ${limits.maxVoltageV} V, not at ${voltageV} V.`;
  }
  const charge = cell.stateOfChargePct;
  return charge !== null && charge > limits.maxHoldStateOfCharge
    ? `${cellTypeName} may be held up to ${limits.maxHoldStateOfCharge} % charged, not at ${charge} %.`
    : null;
}
