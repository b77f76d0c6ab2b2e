import { makeResult } from './make-result.ts';
import type { CheckResult, PlacementFacts } from './types.ts';

/**
 * Is the chamber's protection meant for the hazard level of the cell type?
 *
 * @example checkHazardProtection(facts).outcome // 'stop' for level 5 in a chamber for level 4
 */
export function checkHazardProtection(facts: PlacementFacts): CheckResult {
  const { chamber, request } = facts;
  const { hazardLevel } = request.limits;
  const evidence = [
    { label: 'Protection level', value: String(chamber.protectionLevel), source: chamber.tag },
  ];
  if (hazardLevel > chamber.protectionLevel) {
    return makeResult(
      'hazard-protection',
      'stop',
      `${chamber.tag} protects up to hazard level ${chamber.protectionLevel}; ${request.cellTypeName} has ${hazardLevel}.`,
      {
        evidence,
        waysOut: [
          { kind: 'other-path', sentence: 'Choose another chamber.', subject: chamber.tag },
          { kind: 'ask-safety', sentence: 'Ask the safety officer.', subject: chamber.tag },
        ],
      },
    );
  }
  return makeResult(
    'hazard-protection',
    'pass',
    `${chamber.tag} protects up to hazard level ${chamber.protectionLevel}; the cell has ${hazardLevel}.`,
    { evidence },
  );
}
