import { z } from 'zod';
import { bookingStates, grades, loadStates } from '#shared/domain/states.ts';
import {
  checkResultSchema,
  pathSchema,
  phaseSpanSchema,
  placementSchema,
} from './check.schemas.ts';
import {
  instant,
  listOf,
  noBody,
  noQuery,
  pageOf,
  pageQuery,
  personRef,
  reasonText,
  recordNumber,
  rowVersion,
  siteParams,
  siteRecordParams,
} from './common.ts';
import { defineContract } from './define-contract.ts';
import { slotEstimateSchema } from './estimate.schemas.ts';

const historyEntry = z.object({
  at: instant,
  actor: z.string(),
  what: z.string(),
  reason: z.string().nullable(),
});

/** A booking the caller may not look into is "taken": its place and time, nothing else. */
export const bookingRowSchema = z.object({
  id: recordNumber,
  isVisible: z.boolean(),
  state: z.enum(bookingStates),
  isAtRisk: z.boolean(),
  atRiskReason: z.string().nullable(),
  requestId: recordNumber.nullable(),
  projectName: z.string().nullable(),
  cellTypeName: z.string().nullable(),
  cellCount: z.int(),
  chamberTag: z.string(),
  loadId: recordNumber,
  setTemperatureC: z.number(),
  grade: z.enum(grades),
  startAt: instant,
  endAt: instant,
});
export type BookingRow = z.infer<typeof bookingRowSchema>;

export const bookingSchema = z.object({
  ...bookingRowSchema.shape,
  kind: z.enum(['settled', 'screening']).nullable(),
  requester: personRef.nullable(),
  lotId: recordNumber.nullable(),
  paths: z.array(pathSchema),
  cells: z.array(
    z.object({
      id: recordNumber,
      serial: z.string().nullable(),
      positionTag: z.string(),
    }),
  ),
  /** Its own phases inside the load's, from door to door. */
  phases: z.array(phaseSpanSchema),
  likelyS: z.number().nullable(),
  safeS: z.number().nullable(),
  noShowAt: instant.nullable(),
  cancelReason: z.string().nullable(),
  /** As they stood when the booking was confirmed or last moved. */
  checks: z.array(checkResultSchema),
  checkedAt: instant.nullable(),
  /** The estimate as frozen in the booking. */
  estimate: slotEstimateSchema.nullable(),
  deviations: z.array(
    z.object({ id: recordNumber, code: z.string(), reason: z.string(), grantedBy: z.string() }),
  ),
  history: z.array(historyEntry),
  confirmedBy: personRef.nullable(),
  confirmedAt: instant.nullable(),
  version: rowVersion,
});
export type BookingDto = z.infer<typeof bookingSchema>;

export const listBookings = defineContract({
  name: 'list-bookings',
  method: 'GET',
  path: '/api/sites/:site/bookings',
  summary: 'Bookings by start, newest or next first.',
  params: siteParams,
  query: z.strictObject({
    ...pageQuery,
    sort: z.enum(['start', 'newest']).exactOptional(),
    state: listOf(bookingStates).exactOptional(),
    atRisk: z.enum(['true', 'false']).exactOptional(),
    mine: z.enum(['true', 'false']).exactOptional(),
    from: instant.exactOptional(),
    to: instant.exactOptional(),
    tag: z.string().max(12).exactOptional(),
  }),
  body: noBody,
  response: pageOf(bookingRowSchema),
  status: 200,
  access: { kind: 'site-reader' },
  idempotent: false,
  problems: [],
});

export const getBooking = defineContract({
  name: 'get-booking',
  method: 'GET',
  path: '/api/sites/:site/bookings/:id',
  summary: 'One booking with its paths, phases, checks and history.',
  params: siteRecordParams,
  query: noQuery,
  body: noBody,
  response: bookingSchema,
  status: 200,
  access: { kind: 'site-reader' },
  idempotent: false,
  problems: [],
});

export const confirmBooking = defineContract({
  name: 'confirm-booking',
  method: 'POST',
  path: '/api/sites/:site/bookings',
  summary: 'Books a lot: the checks run again inside the transaction.',
  params: siteParams,
  query: noQuery,
  body: z.strictObject({
    requestId: recordNumber,
    lotId: recordNumber,
    requestVersion: rowVersion,
    /** When the offer was made; absent when a scheduler places by form. */
    offeredAt: instant.exactOptional(),
    placement: placementSchema,
  }),
  response: bookingSchema,
  status: 201,
  access: { kind: 'action', action: 'booking.confirm' },
  idempotent: true,
  problems: [
    'request.state',
    'version.stale',
    'offer.expired',
    'offer.policy',
    'booking.clash',
    'booking.checks',
    'booking.horizon',
  ],
});

export const moveBooking = defineContract({
  name: 'move-booking',
  method: 'POST',
  path: '/api/sites/:site/bookings/:id/move',
  summary: 'Moves a booking that has not started to another time or place.',
  params: siteRecordParams,
  query: noQuery,
  body: z.strictObject({ version: rowVersion, placement: placementSchema, reason: reasonText }),
  response: bookingSchema,
  status: 200,
  access: { kind: 'action', action: 'booking.move' },
  idempotent: true,
  problems: [
    'booking.state',
    'version.stale',
    'booking.clash',
    'booking.checks',
    'booking.horizon',
  ],
});

export const cancelBooking = defineContract({
  name: 'cancel-booking',
  method: 'POST',
  path: '/api/sites/:site/bookings/:id/cancel',
  summary: 'Gives the places back; the request can be booked again.',
  params: siteRecordParams,
  query: noQuery,
  body: z.strictObject({ version: rowVersion, reason: reasonText }),
  response: bookingSchema,
  status: 200,
  access: { kind: 'action', action: 'booking.cancel' },
  idempotent: true,
  problems: ['booking.state', 'version.stale'],
});

export const loadSchema = z.object({
  id: recordNumber,
  chamberTag: z.string(),
  state: z.enum(loadStates),
  setTemperatureC: z.number(),
  closesAt: instant.nullable(),
  startAt: instant,
  endAt: instant,
  isStrictDoor: z.boolean(),
  phases: z.array(phaseSpanSchema),
  bookings: z.array(bookingRowSchema),
  positionsTaken: z.int(),
  positions: z.int(),
  cellCount: z.int(),
  energyWh: z.number(),
  maxEnergyWh: z.number(),
  maxCells: z.int(),
  version: rowVersion,
});
export type LoadDto = z.infer<typeof loadSchema>;

export const getLoad = defineContract({
  name: 'get-load',
  method: 'GET',
  path: '/api/sites/:site/loads/:id',
  summary: 'What is in a chamber between two door openings.',
  params: siteRecordParams,
  query: noQuery,
  body: noBody,
  response: loadSchema,
  status: 200,
  access: { kind: 'site-reader' },
  idempotent: false,
  problems: [],
});

export const closeLoad = defineContract({
  name: 'close-load',
  method: 'POST',
  path: '/api/sites/:site/loads/:id/close',
  summary: 'Lets no further booking join an open load.',
  params: siteRecordParams,
  query: noQuery,
  body: z.strictObject({ version: rowVersion }),
  response: loadSchema,
  status: 200,
  access: { kind: 'action', action: 'load.close' },
  idempotent: true,
  problems: ['load.state', 'version.stale'],
});

export const reopenLoad = defineContract({
  ...closeLoad,
  name: 'reopen-load',
  path: '/api/sites/:site/loads/:id/reopen',
  summary: 'Lets bookings join again until the closing time, before loading starts.',
  body: z.strictObject({ version: rowVersion, closesAt: instant }),
});
