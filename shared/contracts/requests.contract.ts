import { z } from 'zod';
import { measurementKinds } from '#shared/domain/hold-estimate/types.ts';
import { grades, priorities, requestStates } from '#shared/domain/states.ts';
import {
  calendarDay,
  instant,
  listOf,
  noBody,
  noQuery,
  noteText,
  pageOf,
  pageQuery,
  personRef,
  reasonText,
  recordNumber,
  recordNumberText,
  rowVersion,
  siteCode,
  siteParams,
  siteRecordParams,
} from './common.ts';
import { defineContract } from './define-contract.ts';

export const toleranceSchema = z.discriminatedUnion('kind', [
  z.strictObject({
    kind: z.literal('relative'),
    fraction: z.number().min(0.005, 'ask for at least 0.5 %').max(0.5, 'ask for at most 50 %'),
  }),
  z.strictObject({
    kind: z.literal('absolute'),
    currentA: z.number().positive('the tolerance is larger than zero').max(1e-3),
  }),
]);

/** A group of equal cells measured together; every field may be open in a draft. */
export const lotFields = z.strictObject({
  cellTypeId: recordNumber.nullable(),
  /** Registered cells by record number; empty = asked by type and number. */
  cellIds: z.array(recordNumber).max(64),
  cellCount: z.int().min(1, 'at least one cell').max(64, 'at most 64 cells in one lot').nullable(),
  stateOfChargePct: z.number().min(0).max(100).nullable(),
  /** Last charge or discharge of the least rested cell. */
  restedSinceAt: instant.nullable(),
  storageTemperatureC: z.number().min(-60).max(150).nullable(),
  isDamaged: z.boolean(),
});
export type LotFields = z.infer<typeof lotFields>;

export const requestFields = z.strictObject({
  projectId: recordNumber.nullable(),
  kind: z.enum(measurementKinds),
  grade: z.enum(grades),
  lots: z.array(lotFields).min(1, 'a request has at least one lot').max(12),
  setTemperatureC: z.number().min(-60).max(150).nullable(),
  setToleranceK: z.number().min(0).max(10),
  tolerance: toleranceSchema,
  badToGoodRatio: z.number().gt(1, 'a bad cell leaks more than a good one').max(1000),
  earliestStartAt: instant.nullable(),
  neededByAt: instant.nullable(),
  maySplit: z.boolean(),
  note: noteText,
});
export type RequestFields = z.infer<typeof requestFields>;

const lotSchema = z.object({
  id: recordNumber,
  ...lotFields.shape,
  cellTypeName: z.string().nullable(),
  cells: z.array(z.object({ id: recordNumber, serial: z.string().nullable() })),
  bookingId: recordNumber.nullable(),
});
export type LotDto = z.infer<typeof lotSchema>;

export const requestSchema = z.object({
  id: recordNumber,
  site: siteCode,
  state: z.enum(requestStates),
  requester: personRef,
  project: z.object({ id: recordNumber, name: z.string() }).nullable(),
  ...requestFields.omit({ projectId: true, lots: true }).shape,
  lots: z.array(lotSchema),
  priority: z.enum(priorities),
  declineReason: z.string().nullable(),
  withdrawReason: z.string().nullable(),
  /** The slot the engineer would like; it reserves nothing. */
  proposal: z
    .object({
      lotId: recordNumber,
      startAt: instant,
      endAt: instant,
      chamberTag: z.string(),
      proposedAt: instant,
    })
    .nullable(),
  createdAt: instant,
  submittedAt: instant.nullable(),
  version: rowVersion,
});
export type RequestDto = z.infer<typeof requestSchema>;

export const requestRowSchema = z.object({
  id: recordNumber,
  state: z.enum(requestStates),
  requester: personRef,
  projectName: z.string().nullable(),
  kind: z.enum(measurementKinds),
  grade: z.enum(grades),
  cellTypeNames: z.array(z.string()),
  cellCount: z.int(),
  setTemperatureC: z.number().nullable(),
  neededByAt: instant.nullable(),
  submittedAt: instant.nullable(),
  updatedAt: instant,
  priority: z.enum(priorities),
  hasProposal: z.boolean(),
  bookingIds: z.array(recordNumber),
});
export type RequestRow = z.infer<typeof requestRowSchema>;

export const requestSorts = ['needed-by', 'newest', 'oldest', 'number'] as const;

export const listRequests = defineContract({
  name: 'list-requests',
  method: 'GET',
  path: '/api/sites/:site/requests',
  summary: 'Requests of the site that the caller may see, filtered and paged.',
  params: siteParams,
  query: z.strictObject({
    ...pageQuery,
    sort: z.enum(requestSorts).exactOptional(),
    state: listOf(requestStates).exactOptional(),
    kind: z.enum(measurementKinds).exactOptional(),
    projectId: recordNumberText.exactOptional(),
    mine: z.enum(['true', 'false']).exactOptional(),
    text: z.string().max(80).exactOptional(),
    neededBefore: calendarDay.exactOptional(),
  }),
  body: noBody,
  response: pageOf(requestRowSchema),
  status: 200,
  access: { kind: 'site-reader' },
  idempotent: false,
  problems: [],
});

export const getRequest = defineContract({
  name: 'get-request',
  method: 'GET',
  path: '/api/sites/:site/requests/:id',
  summary: 'One request with its lots.',
  params: siteRecordParams,
  query: noQuery,
  body: noBody,
  response: requestSchema,
  status: 200,
  access: { kind: 'site-reader' },
  idempotent: false,
  problems: [],
});

export const createRequest = defineContract({
  name: 'create-request',
  method: 'POST',
  path: '/api/sites/:site/requests',
  summary: 'Keeps a new request as a draft.',
  params: siteParams,
  query: noQuery,
  body: requestFields,
  response: requestSchema,
  status: 201,
  access: { kind: 'action', action: 'request.create' },
  idempotent: true,
  problems: ['input.invalid'],
});

export const updateRequest = defineContract({
  name: 'update-request',
  method: 'PUT',
  path: '/api/sites/:site/requests/:id',
  summary: 'Changes a draft or a submitted request; afterwards only note and needed-by.',
  params: siteRecordParams,
  query: noQuery,
  body: z.strictObject({ ...requestFields.shape, version: rowVersion }),
  response: requestSchema,
  status: 200,
  access: { kind: 'action', action: 'request.edit' },
  idempotent: false,
  problems: ['request.state', 'version.stale'],
});

const versionBody = z.strictObject({ version: rowVersion });

export const submitRequest = defineContract({
  name: 'submit-request',
  method: 'POST',
  path: '/api/sites/:site/requests/:id/submit',
  summary: 'Hands a complete draft to the schedulers; announces cells asked by type and number.',
  params: siteRecordParams,
  query: noQuery,
  body: versionBody,
  response: requestSchema,
  status: 200,
  access: { kind: 'action', action: 'request.edit' },
  idempotent: true,
  problems: ['request.state', 'request.incomplete', 'version.stale'],
});

export const withdrawRequest = defineContract({
  name: 'withdraw-request',
  method: 'POST',
  path: '/api/sites/:site/requests/:id/withdraw',
  summary: 'Takes a request back; it stays readable.',
  params: siteRecordParams,
  query: noQuery,
  body: z.strictObject({ version: rowVersion, reason: reasonText }),
  response: requestSchema,
  status: 200,
  access: { kind: 'action', action: 'request.withdraw' },
  idempotent: true,
  problems: ['request.state', 'version.stale'],
});

export const declineRequest = defineContract({
  name: 'decline-request',
  method: 'POST',
  path: '/api/sites/:site/requests/:id/decline',
  summary: 'Sends a submitted request back to draft with the reason.',
  params: siteRecordParams,
  query: noQuery,
  body: z.strictObject({ version: rowVersion, reason: reasonText }),
  response: requestSchema,
  status: 200,
  access: { kind: 'action', action: 'request.decline' },
  idempotent: true,
  problems: ['request.state', 'version.stale'],
});
