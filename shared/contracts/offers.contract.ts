import { z } from 'zod';
import { checkCodes } from '#shared/domain/checks/types.ts';
import {
  checkResultSchema,
  pathSchema,
  phaseSpanSchema,
  placementSchema,
} from './check.schemas.ts';
import {
  instant,
  noBody,
  noQuery,
  recordNumber,
  recordNumberText,
  rowVersion,
  siteCode,
} from './common.ts';
import { defineContract } from './define-contract.ts';
import { slotEstimateSchema } from './estimate.schemas.ts';
import { requestSchema } from './requests.contract.ts';

export const lotParams = z.strictObject({
  site: siteCode,
  id: recordNumberText,
  lotId: recordNumberText,
});

/** An offer is good for this long; it is checked again whenever it is used. */
export const offerLifetimeMinutes = 10;

export const offerSchema = z.object({
  placement: placementSchema,
  startAt: instant,
  endAt: instant,
  chamberTag: z.string(),
  joinsLoadId: recordNumber.nullable(),
  setTemperatureC: z.number(),
  paths: z.array(pathSchema),
  phases: z.array(phaseSpanSchema),
  waitS: z.number(),
  estimate: slotEstimateSchema,
  checks: z.array(checkResultSchema),
  /** What is particular about this slot, in a sentence or two. */
  remark: z.string(),
});
export type OfferDto = z.infer<typeof offerSchema>;

export const offersSchema = z.object({
  lotId: recordNumber,
  offeredAt: instant,
  expiresAt: instant,
  startsLookedAt: z.int(),
  offers: z.array(offerSchema),
  blockedEarlier: z.object({ offer: offerSchema, blockedBy: checkResultSchema }).nullable(),
  reasons: z.array(
    z.object({
      code: z.enum([...checkCodes, 'no-path', 'not-estimable', 'no-time']),
      sentence: z.string(),
      chambers: z.array(z.string()),
    }),
  ),
  /** May this caller confirm, or only propose? */
  mayConfirm: z.boolean(),
});
export type OffersDto = z.infer<typeof offersSchema>;

export const findOffers = defineContract({
  name: 'find-offers',
  method: 'GET',
  path: '/api/sites/:site/requests/:id/lots/:lotId/offers',
  summary: 'The earliest valid slots for a lot, and the earlier one that a single rule blocks.',
  params: lotParams,
  query: z.strictObject({ after: instant.exactOptional() }),
  body: noBody,
  response: offersSchema,
  status: 200,
  access: { kind: 'site-reader' },
  idempotent: false,
  problems: ['request.incomplete', 'request.state'],
});

export const checkPlacement = defineContract({
  name: 'check-placement',
  method: 'POST',
  path: '/api/sites/:site/requests/:id/lots/:lotId/checks',
  summary: 'Runs every check for one place and time without booking it.',
  params: lotParams,
  query: noQuery,
  body: z.strictObject({
    chamberTag: z.string(),
    startAt: instant,
    /** Absent: the server picks free paths in that chamber. */
    placement: placementSchema.exactOptional(),
    /** When moving: the booking that must not clash with itself. */
    movesBookingId: recordNumber.exactOptional(),
  }),
  response: z.object({
    offer: offerSchema.nullable(),
    /** Why no placement could be formed at all, e.g. nothing is wired for it. */
    reason: z.string().nullable(),
    offeredAt: instant,
  }),
  status: 200,
  access: { kind: 'site-reader' },
  idempotent: false,
  problems: ['request.incomplete', 'request.state'],
});

export const proposeOffer = defineContract({
  name: 'propose-offer',
  method: 'POST',
  path: '/api/sites/:site/requests/:id/lots/:lotId/proposal',
  summary: 'Notes the slot the engineer would like and submits the request if it is a draft.',
  params: lotParams,
  query: noQuery,
  body: z.strictObject({ version: rowVersion, offeredAt: instant, placement: placementSchema }),
  response: requestSchema,
  status: 200,
  access: { kind: 'action', action: 'request.propose' },
  idempotent: true,
  problems: [
    'request.state',
    'request.incomplete',
    'version.stale',
    'offer.expired',
    'booking.checks',
    'booking.clash',
  ],
});
