import { getBoard, getToday, getWaterline } from '#shared/contracts/board.contract.ts';
import { getBooking, getLoad, listBookings } from '#shared/contracts/bookings.contract.ts';
import { getInstrument, getInstrumentWeek } from '#shared/contracts/equipment.contract.ts';
import { findOffers } from '#shared/contracts/offers.contract.ts';
import { getRequest, listRequests } from '#shared/contracts/requests.contract.ts';

/** Whatever shows places that a change of a booking or load takes or gives back. */
export const placeReaders = [
  getBooking,
  listBookings,
  getLoad,
  getBoard,
  getToday,
  getWaterline,
  getRequest,
  listRequests,
  findOffers,
  getInstrument,
  getInstrumentWeek,
];
