import { getBoard, getToday, getWaterline } from '#shared/contracts/board.contract.ts';
import { getBooking, listBookings } from '#shared/contracts/bookings.contract.ts';
import {
  getCalibration,
  listCalibrations,
  listDuties,
} from '#shared/contracts/calibrations.contract.ts';
import {
  getInstrument,
  getInstrumentWeek,
  listInstruments,
} from '#shared/contracts/equipment.contract.ts';
import { findOffers } from '#shared/contracts/offers.contract.ts';

/** Whatever shows what is in date and what can be booked. */
export const validityReaders = [
  listDuties,
  listCalibrations,
  getCalibration,
  getInstrument,
  getInstrumentWeek,
  listInstruments,
  listBookings,
  getBooking,
  getBoard,
  getToday,
  getWaterline,
  findOffers,
];
