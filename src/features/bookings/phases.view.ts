import type { BookingDto } from '#shared/contracts/bookings.contract.ts';

/** When the hold will most likely have settled; null where the booking keeps no estimate to tell. */
export function likelyHoldEnd(booking: Pick<BookingDto, 'phases' | 'estimate'>): string | null {
  const hold = booking.phases.find((span) => span.phase === 'hold');
  const { estimate } = booking;
  if (hold === undefined || estimate === null || !('hold' in estimate)) {
    return null;
  }
  return new Date(Date.parse(hold.startAt) + estimate.hold.likelyS * 1000).toISOString();
}
