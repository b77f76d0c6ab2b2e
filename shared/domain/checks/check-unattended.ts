import { isInWorkingHours } from '#shared/domain/calendar/is-in-working-hours.ts';
import { findPermission } from './find-permission.ts';
import { makeResult } from './make-result.ts';
import type { CheckResult, PlacementFacts } from './types.ts';
import { formatTemperature } from './words/format-temperature.ts';

/**
 * Where a slot runs on outside working hours: did the safety officer permit it in this chamber for
 * this temperature, hazard level, state of charge and cell type, to the end? A state of charge that
 * is not stated counts as the highest the cell type may be held at.
 *
 * @example checkUnattended(facts).outcome // 'stop' for a night without a permission
 */
export function checkUnattended(facts: PlacementFacts): CheckResult {
  const { chamber, request } = facts;
  const code = 'unattended';
  if (isInWorkingHours(facts.index.calendar, facts.span)) {
    return makeResult(code, 'pass', 'The whole slot lies in working hours.');
  }
  const charge = request.cell.stateOfChargePct ?? request.limits.maxHoldStateOfCharge;
  const permission = findPermission(facts);
  if (permission === undefined) {
    return makeResult(
      code,
      'stop',
      `The slot runs on outside working hours and ${chamber.tag} has no permission for hazard level ${request.limits.hazardLevel} at ${formatTemperature(facts.setTemperatureC)} and ${charge} % charge.`,
      {
        waysOut: [
          {
            kind: 'ask-safety',
            sentence: 'Ask the safety officer for an unattended permission.',
            subject: chamber.tag,
          },
          { kind: 'other-path', sentence: 'Choose another chamber.', subject: chamber.tag },
        ],
      },
    );
  }
  return makeResult(
    code,
    'pass',
    `${chamber.tag} may run unattended; call ${permission.contact}.`,
    {
      evidence: [
        {
          label: 'Permitted up to',
          value: `hazard level ${permission.maxHazard}, ${permission.maxTemperatureC} °C, ${permission.maxStateOfCharge} % charge`,
          source: chamber.tag,
        },
      ],
    },
  );
}
