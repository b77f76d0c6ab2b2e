import type { SignedIn, SiteScope } from '#server/actor.ts';
import type { Deps } from '#server/deps.ts';
import { findLiveBookingOfLot } from '#server/features/bookings/bookings.service.ts';
import { loadFacility } from '#server/features/availability/facility.service.ts';
import {
  getLotFacts,
  requireSlotRequest,
} from '#server/features/availability/slot-request.service.ts';
import type { LotFacts } from '#server/features/availability/to-slot-request.ts';
import { problem } from '#server/problem.ts';
import { offerLifetimeMinutes } from '#shared/contracts/offers.contract.ts';
import type { OffersDto } from '#shared/contracts/offers.contract.ts';
import { search } from '#shared/domain/availability/search.ts';
import { may } from '#shared/domain/policies/may.ts';
import type { SitePolicy } from '#shared/domain/policies/site-policy.ts';
import { presentCheck, presentOffer } from './offers.presenter.ts';

const minuteMs = 60_000;
const dayMs = 86_400_000;
/** As many as a person can weigh against each other. */
const offersWanted = 5;

export type LotNumbers = { readonly requestId: number; readonly lotId: number };

/** The earliest valid slots for a lot. An offer reserves nothing. */
export async function findOffers(
  deps: Pick<Deps, 'clock' | 'db'>,
  actor: SignedIn,
  site: SiteScope,
  input: LotNumbers & { readonly after?: string },
): Promise<OffersDto> {
  const now = deps.clock.now();
  const nowMs = now.getTime();
  const lot = await getLotFacts(deps.db, actor, site, input);
  await requireOpenLot(deps, lot);
  const asked = requireSlotRequest(lot, nowMs);
  const afterMs = input.after === undefined ? 0 : Date.parse(input.after);
  const request = { ...asked, earliestStartMs: Math.max(asked.earliestStartMs, afterMs) };
  const { index, policy } = await loadFacility(deps.db, site, {
    window: { startMs: nowMs - dayMs, endMs: nowMs + 400 * dayMs },
  });
  const horizonMs = nowMs + policy.horizonDays * dayMs;
  const found = search(index, request, { options: offersWanted, horizonMs, nowMs });
  const { blockedEarlier } = found;
  const { calendar } = index;
  return {
    lotId: input.lotId,
    offeredAt: now.toISOString(),
    expiresAt: new Date(nowMs + offerLifetimeMinutes * minuteMs).toISOString(),
    startsLookedAt: found.startsLookedAt,
    offers: found.offers.map((offer) => presentOffer(offer, calendar, request.neededByMs)),
    blockedEarlier:
      blockedEarlier === null
        ? null
        : {
            offer: presentOffer(blockedEarlier, calendar, request.neededByMs),
            blockedBy: presentCheck(blockedEarlier.blockedBy),
          },
    reasons: found.reasons.map((reason) => ({ ...reason, chambers: [...reason.chambers] })),
    mayConfirm: mayConfirm(actor, site, lot, policy),
  };
}

function mayConfirm(
  actor: SignedIn,
  site: SiteScope,
  lot: LotFacts,
  policy: Pick<SitePolicy, 'engineersMayConfirm'>,
): boolean {
  const { requesterId: ownerId } = lot.row.request;
  const { engineersMayConfirm } = policy;
  return may(actor, 'booking.confirm', site.code, { ownerId, engineersMayConfirm });
}

/** A lot that can still be booked: its request is not finished and it has no booking yet. */
export async function requireOpenLot(deps: Pick<Deps, 'db'>, lot: LotFacts): Promise<void> {
  const { request, lot: row } = lot.row;
  const { id, state } = request;
  if (state === 'booked' || state === 'done' || state === 'withdrawn') {
    throw problem('request.state', {
      detail: `Request ${id} is ${state}. There is nothing left to book in it.`,
    });
  }
  const booking = await findLiveBookingOfLot(deps.db, row.id);
  if (booking !== undefined) {
    throw problem('request.state', {
      detail: `This lot has booking ${booking.id} already. Move that one instead.`,
    });
  }
}
