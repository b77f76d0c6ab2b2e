import type { SignedIn, SiteScope } from '#server/actor.ts';
import type { Tx } from '#server/db/client.ts';
import { lockPlaces } from '#server/db/lock-places.ts';
import type { Deps } from '#server/deps.ts';
import { recordAudit } from '#server/features/audit/audit.service.ts';
import { notFound, problem, refused, staleVersion } from '#server/problem.ts';
import type { BookingDto } from '#shared/contracts/bookings.contract.ts';
import { may } from '#shared/domain/policies/may.ts';
import {
  cancelEmptyLoad,
  freeAllocations,
  lockRequest,
  updateBooking,
} from './booking-writes.repository.ts';
import { findBooking, listBookingPaths } from './bookings.repository.ts';
import type { BookingRecord } from './bookings.repository.ts';
import { describeBooking } from './bookings.service.ts';
import { settleRequestState } from './request-state.ts';

type Changing = Pick<Deps, 'clock' | 'db' | 'requestId' | 'transact'>;

/** Gives the places of a booking back; its lot can be booked again. */
export async function cancelBooking(
  deps: Changing,
  actor: SignedIn,
  site: SiteScope,
  input: { readonly bookingId: number; readonly version: number; readonly reason: string },
): Promise<BookingDto> {
  const seen = await findBooking(deps.db, site.id, input.bookingId);
  if (seen === undefined) {
    throw notFound('such booking');
  }
  if (!may(actor, 'booking.cancel', site.code, { ownerId: seen.requesterId })) {
    throw refused('You may cancel only your own bookings. Ask a scheduler.');
  }
  return deps.transact(async (tx) => {
    await lockBooking(tx, seen);
    const record = (await findBooking(tx, site.id, input.bookingId)) ?? seen;
    if (record.booking.version !== input.version) {
      const current = await describeBooking({ db: tx }, actor, site, record);
      throw staleVersion(`booking ${input.bookingId}`, current);
    }
    await cancelInside(deps, tx, { actor, site, record, reason: input.reason });
    const cancelled = (await findBooking(tx, site.id, input.bookingId)) ?? record;
    return describeBooking({ db: tx }, actor, site, cancelled);
  });
}

/** Locks what a change of a booking touches, in the one order everybody keeps. */
export async function lockBooking(tx: Tx, record: BookingRecord): Promise<void> {
  await lockRequest(tx, record.booking.requestId);
  const paths = await listBookingPaths(tx, [record.booking.id]);
  await lockPlaces(tx, {
    chamberIds: [record.chamberId],
    unitIds: paths.flatMap((path) => [path.sourceUnitId, path.meterUnitId, path.positionUnitId]),
  });
}

/**
 * Cancels a locked booking: for a person, or for the system where nobody came (`actor` null). The
 * load goes with its last booking.
 */
export async function cancelInside(
  deps: Pick<Deps, 'clock' | 'requestId'>,
  tx: Tx,
  cancel: {
    readonly actor: SignedIn | null;
    readonly site: SiteScope;
    readonly record: BookingRecord;
    readonly reason: string;
  },
): Promise<void> {
  const { record, reason } = cancel;
  const { booking } = record;
  const at = deps.clock.now();
  if (booking.state !== 'tentative' && booking.state !== 'confirmed') {
    throw problem('booking.state', {
      detail: `Booking ${booking.id} is ${booking.state}. Only a booking that has not run can be cancelled.`,
    });
  }
  const change = {
    state: 'cancelled' as const,
    cancelReason: reason,
    atRisk: false,
    atRiskReason: null,
  };
  if (!(await updateBooking(tx, booking, change, at))) {
    throw new Error(`Booking ${booking.id} changed while it was locked.`);
  }
  await freeAllocations(tx, booking.id);
  await cancelEmptyLoad(tx, booking.loadId, at);
  await settleRequestState(tx, booking.requestId, at);
  await recordAudit(deps, tx, {
    actor: cancel.actor,
    site: cancel.site,
    action: 'booking.cancel',
    subjectKind: 'booking',
    subjectId: booking.id,
    before: { state: booking.state },
    after: { state: 'cancelled', reason },
  });
}
