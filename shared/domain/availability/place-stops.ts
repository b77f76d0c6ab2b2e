import { checkBits } from './check-bits.ts';
import type { PreparedChamber } from './prepared.ts';
import { isInWorkingHours } from '#shared/domain/calendar/is-in-working-hours.ts';
import { checkLoadOpen } from '#shared/domain/checks/check-load-open.ts';
import { covers } from '#shared/domain/checks/covers.ts';
import { findPermission } from '#shared/domain/checks/find-permission.ts';
import { findStability } from '#shared/domain/checks/find-stability.ts';
import { judgeRest } from '#shared/domain/checks/judge-rest.ts';
import { listContentLimits } from '#shared/domain/checks/list-content-limits.ts';
import { phaseLengthS } from '#shared/domain/checks/phase-length-s.ts';
import type { PlacementFacts } from '#shared/domain/checks/types.ts';

const calibration = checkBits(['calibration-valid']);
const stability = checkBits(['stability-logged']);
const mapping = checkBits(['mapping']);
const contents = checkBits(['energy-and-count']);
const unattended = checkBits(['unattended']);
const rest = checkBits(['rest-time']);
const hours = checkBits(['working-hours']);
const length = checkBits(['slot-length']);
const loadOpen = checkBits(['load-open']);

/**
 * The rules about chamber, time and request (not about paths) that a laid-out candidate fails, as
 * bits, without grade or deviations. The same questions as the checks ask, without their sentences.
 *
 * @example placeStops(prepared, facts) // 0 where none
 */
export function placeStops(prepared: PreparedChamber, facts: PlacementFacts): number {
  return prepared.placeStops | chamberStops(prepared, facts) | slotStops(facts);
}

function chamberStops(prepared: PreparedChamber, facts: PlacementFacts): number {
  const { chamber, setTemperatureC, span } = facts;
  const { policy } = facts.facility;
  const found = findStability({ chamber, policy, setTemperatureC, atMs: span.startMs });
  const limits = listContentLimits(facts);
  return (
    (covers(chamber.validity, span) ? 0 : calibration) |
    (found?.isInDate === true ? 0 : stability) |
    (prepared.mappedUntilMs < span.endMs ? mapping : 0) |
    (limits.some(({ value, limit }) => value > limit || limit <= 0) ? contents : 0) |
    (facts.joins !== null && checkLoadOpen(facts).outcome === 'stop' ? loadOpen : 0)
  );
}

function slotStops(facts: PlacementFacts): number {
  const { request, span, phases } = facts;
  const { calendar } = facts.index;
  const { policy } = facts.facility;
  const restMs = request.restedSinceMs === null ? null : span.startMs - request.restedSinceMs;
  const isAttended = phases.every(
    (phase) =>
      !(
        phase.phase === 'connect' ||
        phase.phase === 'unload' ||
        (phase.phase === 'match' && policy.matchAttended)
      ) || isInWorkingHours(calendar, phase),
  );
  const isPermitted = findPermission(facts) !== undefined || isInWorkingHours(calendar, span);
  return (
    (judgeRest(request.kind, restMs) === 'stop' ? rest : 0) |
    (isAttended ? 0 : hours) |
    (isPermitted ? 0 : unattended) |
    (phaseLengthS(phases, 'hold') > policy.maxHoldS ? length : 0)
  );
}
