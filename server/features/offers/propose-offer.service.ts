import type { z } from 'zod';
import type { SignedIn, SiteScope } from '#server/actor.ts';
import type { Deps } from '#server/deps.ts';
import { recordAudit } from '#server/features/audit/audit.service.ts';
import { loadFacility } from '#server/features/availability/facility.service.ts';
import { windowAround } from '#server/features/availability/place-extent.ts';
import {
  getLotFacts,
  requireSlotRequest,
} from '#server/features/availability/slot-request.service.ts';
import { refuseStops, unplaceable } from '#server/features/bookings/booking-order.ts';
import { listChamberIds } from '#server/features/bookings/chambers.service.ts';
import { judgeOrder, requireFresh } from '#server/features/bookings/confirm-booking.service.ts';
import {
  describeRequest,
  lockRequest,
  writeRequest,
} from '#server/features/requests/requests.service.ts';
import { submitDraft } from '#server/features/requests/submit-draft.service.ts';
import { notFound, problem, refused, staleVersion } from '#server/problem.ts';
import type { proposeOffer as contract } from '#shared/contracts/offers.contract.ts';
import type { RequestDto } from '#shared/contracts/requests.contract.ts';
import { may } from '#shared/domain/policies/may.ts';
import { requireOpenLot } from './offers.service.ts';
import type { LotNumbers } from './offers.service.ts';

type Changing = Pick<Deps, 'clock' | 'db' | 'requestId' | 'transact'>;

/** Notes the slot the engineer would like. It reserves nothing; a draft is submitted with it. */
export async function proposeOffer(
  deps: Changing,
  actor: SignedIn,
  site: SiteScope,
  input: LotNumbers & z.output<typeof contract.body>,
): Promise<RequestDto> {
  const now = deps.clock.now();
  const { requestId, lotId, placement } = input;
  const lot = await getLotFacts(deps.db, actor, site, { requestId, lotId });
  const { requesterId: ownerId } = lot.row.request;
  if (!may(actor, 'request.propose', site.code, { ownerId })) {
    throw refused('Only the person who asked can propose a slot. Ask them, or book it.');
  }
  await requireOpenLot(deps, lot);
  requireFresh(input.offeredAt, now);
  const slotRequest = requireSlotRequest(lot, now.getTime());
  const chamberIds = await listChamberIds(deps.db, site, placement.chamberTag);
  if (chamberIds.length === 0) {
    throw unplaceable(`There is no chamber ${placement.chamberTag} at this site.`);
  }
  const window = windowAround(Date.parse(placement.startAt));
  const loaded = await loadFacility(deps.db, site, { window, chamberIds });
  const { offer } = judgeOrder({ slotRequest, placement }, loaded, now);
  refuseStops(offer.checks);
  return deps.transact(async (tx) => {
    const request = await lockRequest(tx, site.id, requestId);
    if (request === undefined) {
      throw notFound('such request');
    }
    if (request.version !== input.version) {
      throw staleVersion(`request ${requestId}`, await describeRequest(tx, site, requestId));
    }
    if (request.state === 'booked' || request.state === 'done' || request.state === 'withdrawn') {
      throw problem('request.state', {
        detail: `Request ${requestId} is ${request.state}. There is nothing left to propose.`,
      });
    }
    const proposal = {
      lotId,
      startAt: new Date(offer.startMs).toISOString(),
      endAt: new Date(offer.endMs).toISOString(),
      chamberTag: offer.chamberTag,
      placement,
    };
    const submitted = request.state === 'draft' ? await submitDraft(tx, request, now) : {};
    await writeRequest(
      tx,
      request,
      { ...submitted, proposedOffer: proposal, proposedAt: now },
      now,
    );
    await recordAudit(deps, tx, {
      actor,
      site,
      action: 'request.propose',
      subjectKind: 'request',
      subjectId: requestId,
      before: { state: request.state, proposedOffer: request.proposedOffer },
      after: { ...submitted, proposedOffer: proposal },
    });
    return describeRequest(tx, site, requestId);
  });
}
