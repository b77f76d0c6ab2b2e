import type { z } from 'zod';
import type { SignedIn, SiteScope } from '#server/actor.ts';
import type { Deps } from '#server/deps.ts';
import { loadFacility } from '#server/features/availability/facility.service.ts';
import { judgePlacement } from '#server/features/availability/judge-placement.ts';
import { windowAround } from '#server/features/availability/place-extent.ts';
import {
  getLotFacts,
  requireSlotRequest,
} from '#server/features/availability/slot-request.service.ts';
import {
  findBookedPlacement,
  findBookingRecord,
} from '#server/features/bookings/bookings.service.ts';
import { listChamberIds } from '#server/features/bookings/chambers.service.ts';
import { notFound } from '#server/problem.ts';
import type { Placement } from '#shared/contracts/check.schemas.ts';
import type { OfferDto, checkPlacement as contract } from '#shared/contracts/offers.contract.ts';
import { buildIndex } from '#shared/domain/availability/build-index.ts';
import { search } from '#shared/domain/availability/search.ts';
import type { SlotRequest } from '#shared/domain/availability/types.ts';
import type { FacilityIndex } from '#shared/domain/facility/types.ts';
import { requireOpenLot } from './offers.service.ts';
import type { LotNumbers } from './offers.service.ts';
import { placementOf, presentOffer } from './offers.presenter.ts';

type Checked = { offer: OfferDto | null; reason: string | null; offeredAt: string };

/** Every check for one chamber and start, with the paths named or the first free ones. */
export async function checkPlacement(
  deps: Pick<Deps, 'clock' | 'db'>,
  actor: SignedIn,
  site: SiteScope,
  input: LotNumbers & z.output<typeof contract.body>,
): Promise<Checked> {
  const now = deps.clock.now();
  const { movesBookingId } = input;
  const lot = await getLotFacts(deps.db, actor, site, {
    requestId: input.requestId,
    lotId: input.lotId,
    ...(movesBookingId === undefined ? {} : { bookingId: movesBookingId }),
  });
  await (movesBookingId === undefined
    ? requireOpenLot(deps, lot)
    : requireBookingOfLot(deps, site, movesBookingId, input.lotId));
  const request = requireSlotRequest(lot, now.getTime());
  const offeredAt = now.toISOString();
  const chamberIds = await listChamberIds(deps.db, site, input.chamberTag);
  if (chamberIds.length === 0) {
    return { offer: null, reason: `There is no chamber ${input.chamberTag} here.`, offeredAt };
  }
  const window = windowAround(Date.parse(input.startAt));
  const { index } = await loadFacility(deps.db, site, { window, chamberIds });
  const context = {
    nowMs: now.getTime(),
    untilMs: window.endMs,
    ignoreBookingId: movesBookingId ?? null,
  };
  const placement =
    input.placement ??
    (await keepPaths(deps, site, input)) ??
    choosePlacement(index, request, input, context.nowMs);
  if ('reason' in placement) {
    return { offer: null, reason: placement.reason, offeredAt };
  }
  const judged = judgePlacement(index, request, placement, context);
  return judged.kind === 'placed'
    ? {
        offer: presentOffer(judged.offer, index.calendar, request.neededByMs),
        reason: null,
        offeredAt,
      }
    : { offer: null, reason: judged.sentence, offeredAt };
}

async function requireBookingOfLot(
  deps: Pick<Deps, 'db'>,
  site: SiteScope,
  bookingId: number,
  lotId: number,
): Promise<void> {
  const record = await findBookingRecord(deps.db, site, bookingId);
  if (record?.booking.lotId !== lotId) {
    throw notFound('such booking of this lot');
  }
}

/** A booking moved within its chamber keeps its paths. */
async function keepPaths(
  deps: Pick<Deps, 'db'>,
  site: SiteScope,
  wanted: z.output<typeof contract.body>,
): Promise<Placement | null> {
  if (wanted.movesBookingId === undefined) {
    return null;
  }
  const booked = await findBookedPlacement(deps.db, site, wanted.movesBookingId);
  return booked?.chamberTag === wanted.chamberTag
    ? { ...booked, startAt: wanted.startAt, joinsLoadId: null }
    : null;
}

/**
 * The paths the search would take in this chamber from this start on, put at exactly this start: where
 * it is not possible then, the checks say why.
 */
function choosePlacement(
  index: FacilityIndex,
  request: SlotRequest,
  wanted: { readonly chamberTag: string; readonly startAt: string },
  nowMs: number,
): Placement | { readonly reason: string } {
  const startMs = Date.parse(wanted.startAt);
  const { facility } = index;
  const chambers = facility.chambers.filter(({ tag }) => tag === wanted.chamberTag);
  const found = search(
    buildIndex({ ...facility, chambers }),
    { ...request, earliestStartMs: startMs },
    { options: 1, horizonMs: windowAround(startMs).endMs, nowMs },
  );
  const nearest = found.offers[0] ?? found.blockedEarlier;
  if (nearest === null) {
    const reason = found.reasons[0]?.sentence ?? 'Nothing in this chamber can take these cells.';
    return { reason };
  }
  const joinsLoadId = nearest.startMs === startMs ? nearest.joinsLoadId : null;
  return {
    ...placementOf(nearest),
    startAt: new Date(startMs).toISOString(),
    joinsLoadId,
  };
}
