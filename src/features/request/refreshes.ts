import { getBoard, getToday, getWaterline } from '#shared/contracts/board.contract.ts';
import { getBooking, listBookings } from '#shared/contracts/bookings.contract.ts';
import { findOffers } from '#shared/contracts/offers.contract.ts';
import { listCells, listDeviations } from '#shared/contracts/registers.contract.ts';
import { getRequest, listRequests } from '#shared/contracts/requests.contract.ts';

/** Whatever shows a request, or the places that booking it takes. */
export const requestReaders = [
  getRequest,
  listRequests,
  findOffers,
  listDeviations,
  listCells,
  listBookings,
  getBooking,
  getBoard,
  getToday,
  getWaterline,
];
