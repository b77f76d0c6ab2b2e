import type { z } from 'zod';
import type { SignedIn, SiteScope } from '#server/actor.ts';
import type { Reader, Tx } from '#server/db/client.ts';
import { lockPlaces } from '#server/db/lock-places.ts';
import type { Deps } from '#server/deps.ts';
import { recordAudit } from '#server/features/audit/audit.service.ts';
import { loadFacility } from '#server/features/availability/facility.service.ts';
import type { LoadedFacility } from '#server/features/availability/facility.service.ts';
import { judgePlacement } from '#server/features/availability/judge-placement.ts';
import { windowAround } from '#server/features/availability/place-extent.ts';
import { getLotFacts } from '#server/features/availability/slot-request.service.ts';
import { toSlotRequest } from '#server/features/availability/to-slot-request.ts';
import { getSitePolicy } from '#server/features/settings/settings.service.ts';
import { problem, refused, staleVersion } from '#server/problem.ts';
import type {
  BookingDto,
  confirmBooking as confirmBookingContract,
} from '#shared/contracts/bookings.contract.ts';
import { offerLifetimeMinutes } from '#shared/contracts/offers.contract.ts';
import type { PhaseNeeds } from '#shared/domain/availability/needs-of-estimate.ts';
import type { Offer } from '#shared/domain/availability/types.ts';
import { may } from '#shared/domain/policies/may.ts';
import type { SitePolicy } from '#shared/domain/policies/site-policy.ts';
import { refuseStops, requireWithinHorizon, unplaceable } from './booking-order.ts';
import type { BookingOrder } from './booking-order.ts';
import {
  insertBooking,
  insertCheckResults,
  insertLoad,
  lockCells,
  lockRequest,
  placeCells,
  refusingClashes,
  replacePhases,
  updateLoad,
} from './booking-writes.repository.ts';
import { findBooking, findLiveBookingOfLot } from './bookings.repository.ts';
import { describeBooking } from './bookings.service.ts';
import { cellsOnPaths, refuseCellInUse } from './cells-on-paths.ts';
import { freezeEstimate } from './frozen-estimate.ts';
import { findChamberByTag, listChambersSharingLimit } from './places.repository.ts';
import { refuseQuickClash } from './refuse-clash.ts';
import { settleRequestState } from './request-state.ts';
import { unitsOf } from './units-of.ts';

type Changing = Pick<Deps, 'clock' | 'db' | 'requestId' | 'transact'>;
type ConfirmInput = z.output<typeof confirmBookingContract.body>;

const minuteMs = 60_000;
const hourMs = 3_600_000;
const dayMs = 86_400_000;

/** Books a lot: everything is checked again inside the transaction, after its places are locked. */
export async function confirmBooking(
  deps: Changing,
  actor: SignedIn,
  site: SiteScope,
  input: ConfirmInput,
): Promise<BookingDto> {
  const order = await prepareOrder(deps, actor, site, input);
  return deps.transact(async (tx) => {
    const bookingId = await bookInside(deps, tx, site, order);
    const record = await findBooking(tx, site.id, bookingId);
    if (record === undefined) {
      throw new Error(`Booking ${bookingId} is gone before it was committed.`);
    }
    return describeBooking({ db: tx }, actor, site, record);
  });
}

/** Reads and judges an order without any lock; most refusals happen here and hold nobody up. */
export async function prepareOrder(
  deps: Pick<Deps, 'clock' | 'db'>,
  actor: SignedIn,
  site: SiteScope,
  input: ConfirmInput,
): Promise<BookingOrder> {
  const now = deps.clock.now();
  const { requestId, lotId, placement } = input;
  const lot = await getLotFacts(deps.db, actor, site, { requestId, lotId });
  const { request } = lot.row;
  const policy = await getSitePolicy(deps, site.id);
  requireMayConfirm(actor, site, request.requesterId, policy);
  requireFresh(input.offeredAt, now);
  requireBookable(request, input.requestVersion);
  const chamber = await findChamberByTag(deps.db, site.id, placement.chamberTag);
  if (chamber === undefined) {
    throw unplaceable(`There is no chamber ${placement.chamberTag} at this site.`);
  }
  const startMs = Date.parse(placement.startAt);
  requireWithinHorizon({ startMs, endMs: startMs }, policy, now);
  const loaded = await loadFacility(deps.db, site, {
    window: windowAround(startMs),
    chamberIds: [chamber.id],
  });
  const slotRequest = toSlotRequest(lot, now.getTime());
  if (slotRequest === null) {
    throw problem('request.state', {
      detail: `Request ${requestId} is not complete. Complete and submit it first.`,
    });
  }
  const order = { actor, lot, slotRequest, placement, chamberId: chamber.id };
  const { offer } = judgeOrder(order, loaded, now);
  refuseStops(offer.checks);
  return {
    ...order,
    isStrictDoor: loaded.index.chambers.get(chamber.id)?.strictDoor ?? true,
    calendar: loaded.index.calendar,
    preview: offer,
    requestVersion: input.requestVersion,
  };
}

/**
 * Books a prepared order in a transaction. It locks request, chambers, units and cells in the one
 * order everybody keeps, then reads and judges afresh.
 */
export async function bookInside(
  deps: Pick<Deps, 'clock' | 'requestId'>,
  tx: Tx,
  site: SiteScope,
  order: BookingOrder,
): Promise<number> {
  const now = deps.clock.now();
  const { lot } = order.lot.row;
  await lockOrder(tx, order);
  await refuseQuickClash(tx, {
    offer: order.preview,
    isStrictDoor: order.isStrictDoor,
    calendar: order.calendar,
    exceptBookingIds: [],
    exceptLoadIds: [],
  });
  await requireStillBookable(tx, order);
  const loaded = await loadFacility(tx, site, {
    window: windowAround(order.preview.startMs),
    chamberIds: [order.chamberId],
  });
  const { offer, needsS, policy } = judgeOrder(order, loaded, now);
  refuseStops(offer.checks);
  const cells = cellsOnPaths(order.lot, offer.paths);
  await refuseCellInUse(tx, cells, offer, 0, loaded.index.calendar);
  const bookingId = await refusingClashes(async () => {
    const loadId = await writeLoad(tx, offer, loaded, now);
    const booking = await insertBooking(
      tx,
      {
        ...ownerOf(order, site),
        loadId,
        during: { startMs: offer.startMs, endMs: offer.endMs },
        ...freezeEstimate({ offer, needsS, slotRequest: order.slotRequest, index: loaded.index }),
        ...readinessOf(order, offer, policy),
        confirmedById: order.actor.personId,
        confirmedAt: now,
      },
      now,
    );
    await placeCells(tx, booking, cells, offer, now);
    return booking;
  });
  await insertCheckResults(tx, bookingId, 'confirm', offer.checks, now);
  await settleRequestState(tx, lot.requestId, now);
  await recordAudit(deps, tx, {
    actor: order.actor,
    site,
    action: 'booking.confirm',
    subjectKind: 'booking',
    subjectId: bookingId,
    after: {
      ...readinessOf(order, offer, policy),
      requestId: lot.requestId,
      lotId: lot.id,
      chamberTag: offer.chamberTag,
      startAt: new Date(offer.startMs).toISOString(),
      endAt: new Date(offer.endMs).toISOString(),
      setTemperatureC: offer.setTemperatureC,
    },
  });
  return bookingId;
}

function ownerOf(order: BookingOrder, site: SiteScope) {
  const { request, lot } = order.lot.row;
  if (request.projectId === null) {
    throw problem('request.state', {
      detail: `Request ${request.id} belongs to no project yet. Complete and submit it first.`,
    });
  }
  return {
    requestId: request.id,
    lotId: lot.id,
    siteId: site.id,
    projectId: request.projectId,
    grade: request.grade,
  };
}

async function lockOrder(tx: Tx, order: BookingOrder): Promise<void> {
  const request = await lockRequest(tx, order.lot.row.request.id);
  if (request === undefined) {
    throw problem('request.state', { detail: 'The request is gone.' });
  }
  requireBookable(request, order.requestVersion);
  const chamberIds = await listChambersSharingLimit(tx, [order.chamberId]);
  await lockPlaces(tx, { chamberIds, unitIds: unitsOf(order.preview.paths) });
  await lockCells(
    tx,
    order.lot.cells.map((cell) => cell.id),
  );
}

async function requireStillBookable(reader: Reader, order: BookingOrder): Promise<void> {
  const { lot } = order.lot.row;
  const booked = await findLiveBookingOfLot(reader, lot.id);
  if (booked !== undefined) {
    throw problem('request.state', {
      detail: `This lot has booking ${booked.id} already. Move or cancel that one instead.`,
    });
  }
}

/** Places and checks an order against a facility; a refusal where it has no place at all. */
export function judgeOrder(
  order: Pick<BookingOrder, 'slotRequest' | 'placement'>,
  loaded: LoadedFacility,
  now: Date,
  ignoreBookingId: number | null = null,
): { readonly offer: Offer; readonly needsS: PhaseNeeds; readonly policy: SitePolicy } {
  const { policy } = loaded;
  const horizonMs = now.getTime() + policy.horizonDays * dayMs;
  const startMs = Date.parse(order.placement.startAt);
  const judged = judgePlacement(loaded.index, order.slotRequest, order.placement, {
    nowMs: now.getTime(),
    untilMs: Math.min(horizonMs, windowAround(startMs).endMs),
    ignoreBookingId,
  });
  if (judged.kind === 'unplaceable') {
    throw unplaceable(judged.sentence);
  }
  requireWithinHorizon(judged.offer, policy, now);
  return { offer: judged.offer, needsS: judged.needsS, policy };
}

/** A new load, or the joined one with its phases as they become. */
async function writeLoad(tx: Tx, offer: Offer, loaded: LoadedFacility, now: Date): Promise<number> {
  const place = placeOf(offer, loaded);
  const loadId = offer.joinsLoadId ?? (await insertLoad(tx, place, now));
  if (offer.joinsLoadId !== null) {
    await updateLoad(tx, loadId, place, now);
  }
  await replacePhases(tx, loadId, place, offer.phases);
  return loadId;
}

export function placeOf(offer: Offer, loaded: LoadedFacility) {
  return {
    chamberId: offer.chamberId,
    strict: loaded.index.chambers.get(offer.chamberId)?.strictDoor ?? true,
    setTempMdegc: Math.round(offer.setTemperatureC * 1000),
  };
}

/** Cells still on their way make it tentative: it is given up at its no-show time. */
export function readinessOf(
  order: Pick<BookingOrder, 'slotRequest'>,
  offer: Pick<Offer, 'startMs'>,
  policy: Pick<SitePolicy, 'noShowHours'>,
) {
  return order.slotRequest.cellsReceived
    ? { state: 'confirmed' as const, noShowAt: null }
    : {
        state: 'tentative' as const,
        noShowAt: new Date(offer.startMs + policy.noShowHours * hourMs),
      };
}

function requireMayConfirm(
  actor: SignedIn,
  site: SiteScope,
  ownerId: number,
  policy: Pick<SitePolicy, 'engineersMayConfirm'>,
): void {
  const { engineersMayConfirm } = policy;
  if (may(actor, 'booking.confirm', site.code, { ownerId, engineersMayConfirm })) {
    return;
  }
  if (may(actor, 'booking.confirm', site.code, { ownerId })) {
    throw problem('offer.policy', {
      detail: 'At this site a scheduler confirms. Propose the slot instead.',
    });
  }
  throw refused('You may book only your own requests. Ask a scheduler.');
}

export function requireFresh(offeredAt: string | undefined, now: Date): void {
  if (offeredAt === undefined) {
    return;
  }
  const ageMs = now.getTime() - Date.parse(offeredAt);
  if (ageMs > offerLifetimeMinutes * minuteMs || ageMs < -minuteMs) {
    throw problem('offer.expired', {
      detail: `An offer is good for ${offerLifetimeMinutes} minutes. Look for offers again.`,
    });
  }
}

function requireBookable(
  request: { readonly id: number; readonly state: string; readonly version: number },
  version: number,
): void {
  const { id, state } = request;
  if (request.version !== version) {
    throw staleVersion(`request ${id}`, { id, state, version: request.version });
  }
  if (state !== 'submitted' && state !== 'partly-booked') {
    throw problem('request.state', {
      detail: `Request ${id} is ${state}. Only a submitted request can be booked.`,
    });
  }
}
