import type { z } from 'zod';
import type { SignedIn, SiteScope } from '#server/actor.ts';
import type { Reader, Tx } from '#server/db/client.ts';
import { deferringClashes } from '#server/db/deferring-clashes.ts';
import { lockPlaces } from '#server/db/lock-places.ts';
import type { Deps } from '#server/deps.ts';
import { recordAudit } from '#server/features/audit/audit.service.ts';
import { loadFacility } from '#server/features/availability/facility.service.ts';
import type { LoadedFacility } from '#server/features/availability/facility.service.ts';
import { windowAround } from '#server/features/availability/place-extent.ts';
import { getLotFacts } from '#server/features/availability/slot-request.service.ts';
import { toSlotRequest } from '#server/features/availability/to-slot-request.ts';
import type { LotFacts } from '#server/features/availability/to-slot-request.ts';
import { notFound, problem, staleVersion } from '#server/problem.ts';
import type {
  BookingDto,
  moveBooking as moveBookingContract,
} from '#shared/contracts/bookings.contract.ts';
import type { Offer, SlotRequest } from '#shared/domain/availability/types.ts';
import { refuseStops, requireWithinHorizon, unplaceable } from './booking-order.ts';
import {
  cancelEmptyLoad,
  insertCheckResults,
  insertLoad,
  lockCells,
  lockRequest,
  placeCells,
  refusingClashes,
  replacePhases,
  updateBooking,
  updateLoad,
} from './booking-writes.repository.ts';
import { findBooking, listBookingPaths } from './bookings.repository.ts';
import type { BookingRecord } from './bookings.repository.ts';
import { describeBooking } from './bookings.service.ts';
import { cellsOnPaths, refuseCellInUse } from './cells-on-paths.ts';
import { judgeOrder, placeOf, readinessOf } from './confirm-booking.service.ts';
import { freezeEstimate } from './frozen-estimate.ts';
import { findChamberByTag, isAloneInLoad, listChambersSharingLimit } from './places.repository.ts';
import { unitsOf } from './units-of.ts';

type Changing = Pick<Deps, 'clock' | 'db' | 'requestId' | 'transact'>;
type MoveInput = z.output<typeof moveBookingContract.body> & { readonly bookingId: number };

type Move = {
  readonly input: MoveInput;
  readonly lot: LotFacts;
  readonly slotRequest: SlotRequest;
  readonly newChamberId: number;
};

/** Moves a booking that has not started: its load if it is alone in it, else out of the load. */
export async function moveBooking(
  deps: Changing,
  actor: SignedIn,
  site: SiteScope,
  input: MoveInput,
): Promise<BookingDto> {
  const now = deps.clock.now();
  const seen = await requireBooking(deps.db, site, input.bookingId);
  await requireMovable(deps, actor, site, seen, input.version);
  const move = await prepareMove(deps.db, actor, site, seen, input, now);
  const preview = await judgeMove(deps.db, site, move, seen, now);
  refuseStops(preview.offer.checks);
  return deps.transact(async (tx) => {
    await lockMove(tx, seen, move, preview.offer);
    const record = await requireBooking(tx, site, input.bookingId);
    await requireMovable({ ...deps, db: tx }, actor, site, record, input.version);
    const judged = await judgeMove(tx, site, move, record, now);
    refuseStops(judged.offer.checks);
    await writeMove(tx, site, { ...move, ...judged, record, now });
    await recordAudit(deps, tx, {
      actor,
      site,
      action: 'booking.move',
      subjectKind: 'booking',
      subjectId: input.bookingId,
      before: placeNamed(record.chamberTag, record.booking.during),
      after: { ...placeNamed(judged.offer.chamberTag, judged.offer), reason: input.reason },
    });
    const moved = await requireBooking(tx, site, input.bookingId);
    return describeBooking({ db: tx }, actor, site, moved);
  });
}

async function requireBooking(
  reader: Reader,
  site: SiteScope,
  bookingId: number,
): Promise<BookingRecord> {
  const record = await findBooking(reader, site.id, bookingId);
  if (record === undefined) {
    throw notFound('such booking');
  }
  return record;
}

async function requireMovable(
  deps: Pick<Deps, 'clock' | 'db'>,
  actor: SignedIn,
  site: SiteScope,
  record: BookingRecord,
  version: number,
): Promise<void> {
  const { booking } = record;
  if (booking.version !== version) {
    throw staleVersion(`booking ${booking.id}`, await describeBooking(deps, actor, site, record));
  }
  if (booking.state !== 'tentative' && booking.state !== 'confirmed') {
    throw problem('booking.state', {
      detail: `Booking ${booking.id} is ${booking.state}. Only one that has not started can be moved.`,
    });
  }
  if (booking.during.startMs <= deps.clock.now().getTime()) {
    throw problem('booking.state', {
      detail: `Booking ${booking.id} has started. Only one that has not started can be moved.`,
    });
  }
}

async function prepareMove(
  reader: Reader,
  actor: SignedIn,
  site: SiteScope,
  record: BookingRecord,
  input: MoveInput,
  now: Date,
): Promise<Move> {
  const { id: bookingId, requestId, lotId } = record.booking;
  const lot = await getLotFacts(reader, actor, site, { requestId, lotId, bookingId });
  const slotRequest = toSlotRequest(lot, now.getTime());
  if (slotRequest === null) {
    throw problem('booking.state', {
      detail: `The lot of booking ${bookingId} is no longer complete. Complete the request first.`,
    });
  }
  const { chamberTag } = input.placement;
  const chamber = await findChamberByTag(reader, site.id, chamberTag);
  if (chamber === undefined) {
    throw unplaceable(`There is no chamber ${chamberTag} at this site.`);
  }
  return { input, lot, slotRequest, newChamberId: chamber.id };
}

async function judgeMove(
  reader: Reader,
  site: SiteScope,
  move: Move,
  record: BookingRecord,
  now: Date,
) {
  const startMs = Date.parse(move.input.placement.startAt);
  const loaded = await loadFacility(reader, site, {
    window: windowAround(startMs),
    chamberIds: [move.newChamberId],
  });
  requireWithinHorizon({ startMs, endMs: startMs }, loaded.policy, now);
  const order = { slotRequest: move.slotRequest, placement: move.input.placement };
  return { loaded, ...judgeOrder(order, loaded, now, record.booking.id) };
}

async function lockMove(tx: Tx, record: BookingRecord, move: Move, preview: Offer): Promise<void> {
  const { booking, chamberId } = record;
  await lockRequest(tx, booking.requestId);
  const oldUnits = (await listBookingPaths(tx, [booking.id])).flatMap((path) => [
    path.sourceUnitId,
    path.meterUnitId,
    path.positionUnitId,
  ]);
  await lockPlaces(tx, {
    chamberIds: await listChambersSharingLimit(tx, [chamberId, move.newChamberId]),
    unitIds: [...oldUnits, ...unitsOf(preview.paths)],
  });
  await lockCells(
    tx,
    move.lot.cells.map((cell) => cell.id),
  );
}

type Writing = Move &
  ReturnType<typeof judgeOrder> & {
    readonly loaded: LoadedFacility;
    readonly record: BookingRecord;
    readonly now: Date;
  };

async function writeMove(tx: Tx, site: SiteScope, writing: Writing): Promise<void> {
  const { offer, needsS, policy, loaded, record, now, slotRequest, input } = writing;
  const { booking } = record;
  const cells = cellsOnPaths(writing.lot, offer.paths);
  await refuseCellInUse(tx, cells, offer, booking.id, loaded.index.calendar);
  await refusingClashes(() =>
    deferringClashes(tx, async () => {
      const loadId = await chooseLoad(tx, writing);
      await replacePhases(tx, loadId, placeOf(offer, loaded), offer.phases);
      const isSaved = await updateBooking(
        tx,
        { id: booking.id, version: input.version },
        {
          loadId,
          during: { startMs: offer.startMs, endMs: offer.endMs },
          ...freezeEstimate({ offer, needsS, slotRequest, index: loaded.index }),
          ...readinessOf(writing, offer, policy),
          atRisk: false,
          atRiskReason: null,
        },
        now,
      );
      if (!isSaved) {
        throw new Error(`Booking ${booking.id} of ${site.code} changed while it was locked.`);
      }
      await placeCells(tx, booking.id, cells, offer, now);
      if (loadId !== booking.loadId) {
        await cancelEmptyLoad(tx, booking.loadId, now);
      }
    }),
  );
  await insertCheckResults(tx, booking.id, 'confirm', offer.checks, now);
}

/** The joined load, its own where nobody else is in it, or a new one. */
async function chooseLoad(tx: Tx, { offer, loaded, record, now }: Writing): Promise<number> {
  const place = placeOf(offer, loaded);
  const { id, loadId } = record.booking;
  const isOwn = offer.joinsLoadId === null && (await isAloneInLoad(tx, loadId, id));
  const target = offer.joinsLoadId ?? (isOwn ? loadId : null);
  if (target === null) {
    return insertLoad(tx, place, now);
  }
  await updateLoad(tx, target, place, now);
  return target;
}

function placeNamed(
  chamberTag: string,
  during: { readonly startMs: number; readonly endMs: number },
) {
  return {
    chamberTag,
    startAt: new Date(during.startMs).toISOString(),
    endAt: new Date(during.endMs).toISOString(),
  };
}
