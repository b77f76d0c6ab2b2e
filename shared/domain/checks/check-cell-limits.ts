import { makeResult } from './make-result.ts';
import type { CheckResult, PlacementFacts } from './types.ts';
import { formatTemperature } from './words/format-temperature.ts';

/**
 * Do set and idle temperature, voltage and state of charge stay within the limits of a released cell
 * type? The limits are the maker's and the safety officer's; nothing here widens them.
 *
 * @example checkCellLimits(facts).outcome // 'stop' at 85 °C for a cell that ends at 60 °C
 */
export function checkCellLimits(facts: PlacementFacts): CheckResult {
  const fault = findFault(facts);
  const { limits } = facts.request;
  if (fault === null) {
    return makeResult(
      'cell-limits',
      'pass',
      `Temperature, voltage and state of charge are within the limits of ${facts.request.cellTypeName}.`,
      {
        evidence: [
          {
            label: 'Temperature',
            value: `${limits.minTemperatureC} to ${limits.maxTemperatureC} °C`,
            source: facts.request.cellTypeName,
          },
        ],
      },
    );
  }
  return makeResult('cell-limits', 'stop', fault, {
    waysOut: [
      {
        kind: 'ask-safety',
        sentence: 'Ask the safety officer about this cell type.',
        subject: facts.request.cellTypeName,
      },
    ],
  });
}

function findFault(facts: PlacementFacts): string | null {
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
