import type { SignedIn } from '#server/actor.ts';
import type { LotFacts } from '#server/features/availability/to-slot-request.ts';
import { problem } from '#server/problem.ts';
import type { ProblemError } from '#server/problem.ts';
import type { Placement } from '#shared/contracts/check.schemas.ts';
import type { Offer, SlotRequest } from '#shared/domain/availability/types.ts';
import type { CalendarIndex } from '#shared/domain/calendar/types.ts';
import type { CheckCode, CheckResult } from '#shared/domain/checks/types.ts';
import type { SitePolicy } from '#shared/domain/policies/site-policy.ts';

/** Everything about a wish to book that was read before the places are locked. */
export type BookingOrder = {
  readonly actor: SignedIn;
  readonly lot: LotFacts;
  readonly slotRequest: SlotRequest;
  readonly placement: Placement;
  readonly chamberId: number;
  /** Whether the chamber's door disturbs; only for the quick look after the locks. */
  readonly isStrictDoor: boolean;
  /** For naming times as the site says them. */
  readonly calendar: CalendarIndex;
  /** How it looked when it was read; it is placed and checked again after the locks. */
  readonly preview: Offer;
  readonly requestVersion: number;
};

const dayMs = 86_400_000;

/** A slot starts in the future and ends within the site's horizon. */
export function requireWithinHorizon(
  span: { readonly startMs: number; readonly endMs: number },
  policy: Pick<SitePolicy, 'horizonDays'>,
  now: Date,
): void {
  if (span.startMs < now.getTime()) {
    throw problem('booking.horizon', {
      detail: 'The slot would start in the past. Choose a later start.',
    });
  }
  if (span.endMs > now.getTime() + policy.horizonDays * dayMs) {
    throw problem('booking.horizon', {
      detail: `The slot ends later than the ${policy.horizonDays} days ahead that can be booked here. Choose an earlier one.`,
    });
  }
}

const clashCodes: readonly CheckCode[] = ['double-use', 'shared-temperature', 'still-phase'];

/** Refuses a placement that a check stops: what is taken names who has it, the rest lists the checks. */
export function refuseStops(checks: readonly CheckResult[]): void {
  const stops = checks.filter(({ outcome }) => outcome === 'stop');
  const [first] = stops;
  if (first === undefined) {
    return;
  }
  const clash = stops.find(({ code }) => clashCodes.includes(code));
  throw clash === undefined
    ? problem('booking.checks', { detail: first.sentence, checks: stops })
    : problem('booking.clash', { detail: clash.sentence, checks: stops });
}

/** A placement that names something the site does not have, or that has no length. */
export function unplaceable(sentence: string): ProblemError {
  return problem('booking.checks', { detail: sentence, checks: [] });
}
