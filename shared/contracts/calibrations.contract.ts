import { z } from 'zod';
import {
  calibratedFunctions,
  calibrationBadges,
  calibrationStates,
  conformities,
  instrumentKinds,
} from '#shared/domain/states.ts';
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
  rowVersion,
  siteParams,
  siteRecordParams,
  tag,
} from './common.ts';
import { bookingRowSchema } from './bookings.contract.ts';
import { defineContract } from './define-contract.ts';

export const dutyRowSchema = z.object({
  dutyId: recordNumber,
  tag,
  instrumentKind: z.enum(instrumentKinds),
  model: z.string(),
  kind: z.enum(['calibration']),
  scope: z.string(),
  badge: z.enum(calibrationBadges),
  /** Null where it was never calibrated. */
  dueOn: calendarDay.nullable(),
  daysLeft: z.int().nullable(),
  intervalMonths: z.int(),
  custodian: personRef.nullable(),
  lastCalibrationId: recordNumber.nullable(),
  awaitingApprovalId: recordNumber.nullable(),
  bookingsPastDue: z.int(),
  atRisk: z.int(),
});
export type DutyRow = z.infer<typeof dutyRowSchema>;

export const listDuties = defineContract({
  name: 'list-duties',
  method: 'GET',
  path: '/api/sites/:site/duties',
  summary: 'What falls due, soonest first.',
  params: siteParams,
  query: z.strictObject({
    ...pageQuery,
    badge: listOf(calibrationBadges).exactOptional(),
    kind: listOf(instrumentKinds).exactOptional(),
    dueBefore: calendarDay.exactOptional(),
    mine: z.enum(['true', 'false']).exactOptional(),
    text: z.string().max(60).exactOptional(),
  }),
  body: noBody,
  response: pageOf(dutyRowSchema),
  status: 200,
  access: { kind: 'site-reader' },
  idempotent: false,
  problems: [],
});

const scopeFields = z.strictObject({
  channelId: recordNumber.nullable(),
  function: z.enum(calibratedFunctions),
  meterRangeId: recordNumber.nullable(),
  limitation: z.string().trim().max(300).nullable(),
});

export const calibrationFields = z.strictObject({
  scopes: z.array(scopeFields).min(1, 'name at least one channel, function and range').max(200),
  performedOn: calendarDay,
  dueOn: calendarDay,
  provider: z.string().trim().min(2, 'who calibrated it, or in-house').max(120),
  certificateNumber: z.string().trim().min(1, 'the certificate has a number').max(80),
  conformityAsFound: z.enum(conformities),
  conformityAsLeft: z.enum(conformities),
  note: noteText,
  fileId: recordNumber.nullable(),
});
export type CalibrationFields = z.infer<typeof calibrationFields>;

export const calibrationSchema = z.object({
  id: recordNumber,
  tag,
  model: z.string(),
  state: z.enum(calibrationStates),
  ...calibrationFields.omit({ scopes: true, fileId: true }).shape,
  scopes: z.array(
    z.object({
      ...scopeFields.shape,
      channelLabel: z.string().nullable(),
      rangeLabel: z.string().nullable(),
    }),
  ),
  file: z
    .object({
      id: recordNumber,
      name: z.string(),
      mediaType: z.string(),
      sizeBytes: z.int(),
      sha256: z.string(),
    })
    .nullable(),
  recordedBy: personRef,
  recordedAt: instant,
  decidedBy: personRef.nullable(),
  decidedAt: instant.nullable(),
  refusalReason: z.string().nullable(),
  replacesId: recordNumber.nullable(),
  replacedById: recordNumber.nullable(),
  version: rowVersion,
});
export type CalibrationDto = z.infer<typeof calibrationSchema>;

export const listCalibrations = defineContract({
  name: 'list-calibrations',
  method: 'GET',
  path: '/api/sites/:site/calibrations',
  summary: 'Calibration records, newest first.',
  params: siteParams,
  query: z.strictObject({
    ...pageQuery,
    state: listOf(calibrationStates).exactOptional(),
    tag: tag.exactOptional(),
    text: z.string().max(60).exactOptional(),
  }),
  body: noBody,
  response: pageOf(
    calibrationSchema.pick({
      id: true,
      tag: true,
      model: true,
      state: true,
      performedOn: true,
      dueOn: true,
      provider: true,
      certificateNumber: true,
      conformityAsFound: true,
      conformityAsLeft: true,
      recordedBy: true,
      recordedAt: true,
    }),
  ),
  status: 200,
  access: { kind: 'site-reader' },
  idempotent: false,
  problems: [],
});

export const getCalibration = defineContract({
  name: 'get-calibration',
  method: 'GET',
  path: '/api/sites/:site/calibrations/:id',
  summary: 'One calibration record.',
  params: siteRecordParams,
  query: noQuery,
  body: noBody,
  response: calibrationSchema,
  status: 200,
  access: { kind: 'site-reader' },
  idempotent: false,
  problems: [],
});

export const recordCalibration = defineContract({
  name: 'record-calibration',
  method: 'POST',
  path: '/api/sites/:site/calibrations',
  summary: 'Records a calibration; it counts only once a second person has approved it.',
  params: siteParams,
  query: noQuery,
  body: z.strictObject({
    tag,
    ...calibrationFields.shape,
    /** An approved record this one corrects. */
    replacesId: recordNumber.exactOptional(),
  }),
  response: calibrationSchema,
  status: 201,
  access: { kind: 'action', action: 'calibration.record' },
  idempotent: true,
  problems: ['calibration.scope', 'calibration.state', 'file.incomplete'],
});

export const decisionSchema = z.object({
  calibration: calibrationSchema,
  /** Bookings whose risk this decision changed. */
  affected: z.array(bookingRowSchema),
});

export const approveCalibration = defineContract({
  name: 'approve-calibration',
  method: 'POST',
  path: '/api/sites/:site/calibrations/:id/approve',
  summary: 'A second person approves; badges, shading and checks follow at once.',
  params: siteRecordParams,
  query: noQuery,
  body: z.strictObject({ version: rowVersion }),
  response: decisionSchema,
  status: 200,
  access: { kind: 'action', action: 'calibration.approve' },
  idempotent: true,
  problems: ['calibration.state', 'calibration.same-person', 'version.stale'],
});

export const refuseCalibration = defineContract({
  name: 'refuse-calibration',
  method: 'POST',
  path: '/api/sites/:site/calibrations/:id/refuse',
  summary: 'A second person sends the record back with the reason.',
  params: siteRecordParams,
  query: noQuery,
  body: z.strictObject({ version: rowVersion, reason: reasonText }),
  response: decisionSchema,
  status: 200,
  access: { kind: 'action', action: 'calibration.approve' },
  idempotent: true,
  problems: ['calibration.state', 'calibration.same-person', 'version.stale'],
});
