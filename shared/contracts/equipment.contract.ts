import { z } from 'zod';
import {
  calibratedFunctions,
  calibrationBadges,
  instrumentKinds,
  instrumentStates,
  unavailabilityReasons,
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
  siteTagParams,
  tag,
} from './common.ts';
import { bookingRowSchema } from './bookings.contract.ts';
import { boardBarSchema, boardBlockSchema } from './board.contract.ts';
import { defineContract } from './define-contract.ts';

export const instrumentRowSchema = z.object({
  tag,
  kind: z.enum(instrumentKinds),
  model: z.string(),
  serial: z.string(),
  roomName: z.string().nullable(),
  state: z.enum(instrumentStates),
  /** Null where nothing on it has to be calibrated. */
  badge: z.enum(calibrationBadges).nullable(),
  dueOn: calendarDay.nullable(),
  channelCount: z.int(),
  custodian: personRef.nullable(),
});
export type InstrumentRow = z.infer<typeof instrumentRowSchema>;

/** Calibration state of one channel × function × range. */
export const scopeStateSchema = z.object({
  channelLabel: z.string().nullable(),
  function: z.enum(calibratedFunctions),
  rangeLabel: z.string().nullable(),
  meterRangeId: recordNumber.nullable(),
  channelId: recordNumber.nullable(),
  badge: z.enum(calibrationBadges),
  dueOn: calendarDay.nullable(),
  calibrationId: recordNumber.nullable(),
  limitation: z.string().nullable(),
});
export type ScopeState = z.infer<typeof scopeStateSchema>;

export const instrumentSchema = z.object({
  ...instrumentRowSchema.shape,
  firmware: z.string().nullable(),
  parentTag: z.string().nullable(),
  childTags: z.array(z.string()),
  note: z.string(),
  /** Facts to show: name, value with unit, and where it comes from. */
  facts: z.array(z.object({ name: z.string(), value: z.string(), source: z.string() })),
  scopes: z.array(scopeStateSchema),
  calibrations: z.array(
    z.object({
      id: recordNumber,
      performedOn: calendarDay,
      dueOn: calendarDay,
      certificateNumber: z.string(),
      state: z.string(),
      conformityAsLeft: z.string(),
      provider: z.string(),
    }),
  ),
  assessments: z.array(
    z.object({
      id: recordNumber,
      setTemperatureC: z.number(),
      assessedOn: calendarDay,
      hoursLogged: z.number(),
      driftKPerH: z.number(),
      halfBandK: z.number(),
      periodS: z.number().nullable(),
      resolutionK: z.number(),
      sensorPlace: z.string(),
      isTooOld: z.boolean(),
      assessedBy: z.string(),
    }),
  ),
  unavailability: z.array(
    z.object({
      id: recordNumber,
      kind: z.enum(unavailabilityReasons),
      from: instant,
      until: instant.nullable(),
      reason: z.string(),
      reportedBy: z.string(),
    }),
  ),
  nextBookings: z.array(bookingRowSchema),
  version: rowVersion,
});
export type InstrumentDto = z.infer<typeof instrumentSchema>;

export const listInstruments = defineContract({
  name: 'list-instruments',
  method: 'GET',
  path: '/api/sites/:site/instruments',
  summary: 'The equipment register of the site.',
  params: siteParams,
  query: z.strictObject({
    ...pageQuery,
    sort: z.enum(['tag', 'due', 'kind']).exactOptional(),
    kind: listOf(instrumentKinds).exactOptional(),
    state: listOf(instrumentStates).exactOptional(),
    badge: listOf(calibrationBadges).exactOptional(),
    text: z.string().max(60).exactOptional(),
  }),
  body: noBody,
  response: pageOf(instrumentRowSchema),
  status: 200,
  access: { kind: 'site-reader' },
  idempotent: false,
  problems: [],
});

export const getInstrument = defineContract({
  name: 'get-instrument',
  method: 'GET',
  path: '/api/sites/:site/instruments/:tag',
  summary: 'One instrument with calibration state by range.',
  params: siteTagParams,
  query: noQuery,
  body: noBody,
  response: instrumentSchema,
  status: 200,
  access: { kind: 'site-reader' },
  idempotent: false,
  problems: [],
});

export const getInstrumentWeek = defineContract({
  name: 'get-instrument-week',
  method: 'GET',
  path: '/api/sites/:site/instruments/:tag/week',
  summary:
    'Bookings and closed stretches of one chamber or instrument, all its channels or positions.',
  params: siteTagParams,
  query: z.strictObject({ from: instant, to: instant }),
  body: noBody,
  response: z.object({ bars: z.array(boardBarSchema), blocks: z.array(boardBlockSchema) }),
  status: 200,
  access: { kind: 'site-reader' },
  idempotent: false,
  problems: ['input.invalid'],
});

/** What a state change touched: bookings newly at risk. */
export const stateChangeSchema = z.object({
  instrument: instrumentSchema,
  affected: z.array(bookingRowSchema),
});

export const takeOutOfService = defineContract({
  name: 'take-out-of-service',
  method: 'POST',
  path: '/api/sites/:site/instruments/:tag/out-of-service',
  summary: 'Takes an instrument out of service at once; bookings over it become at risk.',
  params: siteTagParams,
  query: noQuery,
  body: z.strictObject({ version: rowVersion, reason: reasonText, until: instant.nullable() }),
  response: stateChangeSchema,
  status: 200,
  access: { kind: 'action', action: 'equipment.take-out-of-service' },
  idempotent: true,
  problems: ['instrument.state', 'version.stale'],
});

export const returnToService = defineContract({
  name: 'return-to-service',
  method: 'POST',
  path: '/api/sites/:site/instruments/:tag/in-service',
  summary: 'Releases an instrument; bookings at risk only for this reason are cleared.',
  params: siteTagParams,
  query: noQuery,
  body: z.strictObject({ version: rowVersion, note: noteText }),
  response: stateChangeSchema,
  status: 200,
  access: { kind: 'action', action: 'equipment.release' },
  idempotent: true,
  problems: ['instrument.state', 'version.stale'],
});

export const reportBreakdown = defineContract({
  name: 'report-breakdown',
  method: 'POST',
  path: '/api/sites/:site/instruments/:tag/breakdowns',
  summary: 'Reports that something does not work; it blocks new bookings until somebody decides.',
  params: siteTagParams,
  query: noQuery,
  body: z.strictObject({ reason: reasonText, until: instant.nullable() }),
  response: stateChangeSchema,
  status: 201,
  access: { kind: 'action', action: 'breakdown.report' },
  idempotent: true,
  problems: [],
});

export const createAssessment = defineContract({
  name: 'create-assessment',
  method: 'POST',
  path: '/api/sites/:site/instruments/:tag/assessments',
  summary: 'Enters what a judged chamber log showed at one set temperature.',
  params: siteTagParams,
  query: noQuery,
  body: z.strictObject({
    setTemperatureC: z.number().min(-60).max(150),
    assessedOn: calendarDay,
    hoursLogged: z.number().positive('how long the log ran').max(10_000),
    driftKPerH: z.number().min(0).max(10),
    halfBandK: z.number().min(0).max(20),
    periodS: z.number().positive().max(86_400).nullable(),
    resolutionK: z.number().positive('the logger shows steps larger than zero').max(5),
    sensorPlace: z.string().trim().min(2, 'say where the sensor was').max(120),
    loggerTag: tag.nullable(),
    isDoorTolerant: z.boolean(),
    note: noteText,
  }),
  response: instrumentSchema,
  status: 201,
  access: { kind: 'action', action: 'stability.assess' },
  idempotent: true,
  problems: ['instrument.state', 'input.invalid'],
});
