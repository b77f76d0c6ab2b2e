import type { Contract } from './define-contract.ts';
import * as audit from './audit.contract.ts';
import * as board from './board.contract.ts';
import * as bookings from './bookings.contract.ts';
import * as calibrations from './calibrations.contract.ts';
import * as equipment from './equipment.contract.ts';
import * as files from './files.contract.ts';
import * as health from './health.contract.ts';
import * as offers from './offers.contract.ts';
import * as people from './people.contract.ts';
import * as registers from './registers.contract.ts';
import * as requests from './requests.contract.ts';
import * as session from './session.contract.ts';
import * as settings from './settings.contract.ts';

/** Every endpoint of the API, for the OpenAPI document and for tests that walk over all of them. */
export const contracts: readonly Contract[] = [
  audit.listAuditEvents,
  board.getBoard,
  board.getWaterline,
  board.searchSite,
  board.getToday,
  bookings.listBookings,
  bookings.getBooking,
  bookings.confirmBooking,
  bookings.moveBooking,
  bookings.cancelBooking,
  bookings.getLoad,
  bookings.closeLoad,
  bookings.reopenLoad,
  calibrations.listDuties,
  calibrations.listCalibrations,
  calibrations.getCalibration,
  calibrations.recordCalibration,
  calibrations.approveCalibration,
  calibrations.refuseCalibration,
  equipment.listInstruments,
  equipment.getInstrument,
  equipment.getInstrumentWeek,
  equipment.takeOutOfService,
  equipment.returnToService,
  equipment.reportBreakdown,
  equipment.createAssessment,
  files.uploadFile,
  files.getFile,
  files.downloadFile,
  health.getHealth,
  offers.findOffers,
  offers.checkPlacement,
  offers.proposeOffer,
  people.listPeople,
  people.addGrant,
  people.revokeGrant,
  registers.listCellTypes,
  registers.listCells,
  registers.listProjects,
  registers.getEstimateBasis,
  registers.listDeviations,
  registers.askDeviation,
  registers.decideDeviation,
  requests.listRequests,
  requests.getRequest,
  requests.createRequest,
  requests.updateRequest,
  requests.submitRequest,
  requests.withdrawRequest,
  requests.declineRequest,
  session.getSession,
  settings.listPolicies,
  settings.setPolicy,
  settings.getWorkingHours,
  settings.setWorkingHours,
];
