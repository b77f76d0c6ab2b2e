import { z } from 'zod';
import { checkCodes } from '#shared/domain/checks/types.ts';
import { cellClasses, cellFormats, chemistries } from '#shared/domain/hold-estimate/types.ts';
import { cellStatuses, deviationStates } from '#shared/domain/states.ts';
import {
  instant,
  noBody,
  noQuery,
  pageOf,
  pageQuery,
  reasonText,
  recordNumber,
  recordNumberText,
  siteParams,
} from './common.ts';
import { defineContract } from './define-contract.ts';

export const cellTypeSchema = z.object({
  id: recordNumber,
  name: z.string(),
  cellClass: z.enum(cellClasses),
  format: z.enum(cellFormats),
  chemistry: z.enum(chemistries),
  capacityAh: z.number(),
  hazardLevel: z.int(),
  isReleased: z.boolean(),
  minTemperatureC: z.number(),
  maxTemperatureC: z.number(),
  minVoltageV: z.number(),
  maxVoltageV: z.number(),
  maxHoldStateOfChargePct: z.number(),
  energyWh: z.number(),
  measured: z
    .object({
      capacitanceFPerAh: z.number().nullable(),
      resistanceOhm: z.number().nullable(),
      thermalTimeConstantS: z.number().nullable(),
      entropicCoefficientVPerK: z.number().nullable(),
      massKg: z.number().nullable(),
      surfaceM2: z.number().nullable(),
      selfDischargeAPerAh: z.number().nullable(),
    })
    .nullable(),
});
export type CellTypeDto = z.infer<typeof cellTypeSchema>;

export const listCellTypes = defineContract({
  name: 'list-cell-types',
  method: 'GET',
  path: '/api/sites/:site/cell-types',
  summary: 'Cell types with the figures an estimate needs and their limits.',
  params: siteParams,
  query: noQuery,
  body: noBody,
  response: z.object({ items: z.array(cellTypeSchema) }),
  status: 200,
  access: { kind: 'site-reader' },
  idempotent: false,
  problems: [],
});

export const cellRowSchema = z.object({
  id: recordNumber,
  serial: z.string().nullable(),
  cellTypeId: recordNumber,
  cellTypeName: z.string(),
  projectName: z.string().nullable(),
  status: z.enum(cellStatuses),
  stateOfChargePct: z.number().nullable(),
  lastChargedAt: instant.nullable(),
  storageTemperatureC: z.number().nullable(),
  place: z.string(),
});
export type CellRow = z.infer<typeof cellRowSchema>;

export const listCells = defineContract({
  name: 'list-cells',
  method: 'GET',
  path: '/api/sites/:site/cells',
  summary: 'Registered cells of projects the caller may see, by serial.',
  params: siteParams,
  query: z.strictObject({
    ...pageQuery,
    cellTypeId: recordNumberText.exactOptional(),
    projectId: recordNumberText.exactOptional(),
    text: z.string().max(60).exactOptional(),
    isFree: z.enum(['true', 'false']).exactOptional(),
  }),
  body: noBody,
  response: pageOf(cellRowSchema),
  status: 200,
  access: { kind: 'site-reader' },
  idempotent: false,
  problems: [],
});

export const listProjects = defineContract({
  name: 'list-projects',
  method: 'GET',
  path: '/api/sites/:site/projects',
  summary: 'Projects the caller may see; `isMember` says which the caller may ask for.',
  params: siteParams,
  query: noQuery,
  body: noBody,
  response: z.object({
    items: z.array(
      z.object({ id: recordNumber, name: z.string(), customer: z.string(), isMember: z.boolean() }),
    ),
  }),
  status: 200,
  access: { kind: 'site-reader' },
  idempotent: false,
  problems: [],
});

/** Everything the browser needs to run the same estimate as the server. */
export const getEstimateBasis = defineContract({
  name: 'get-estimate-basis',
  method: 'GET',
  path: '/api/sites/:site/estimate-basis',
  summary: 'Reference wiring, process times and chamber defaults of the site.',
  params: siteParams,
  query: noQuery,
  body: noBody,
  response: z.object({
    wiring: z.object({
      label: z.string(),
      leadResistanceOhm: z.number(),
      sourceOutputOhm: z.number(),
      burdenOhm: z.number().nullable(),
      burdenInsideLoop: z.boolean().nullable(),
      meterNoiseA: z.number(),
      meterResolutionA: z.number(),
      sampleIntervalS: z.number(),
    }),
    process: z.object({
      connectFixedMin: z.number(),
      connectPerCellMin: z.number(),
      unloadFixedMin: z.number(),
      unloadPerCellMin: z.number(),
      recabledPaths: z.number(),
      recableMinPerPath: z.number(),
      matchMin: z.number(),
      matchAttended: z.boolean(),
      minimumMeasureMin: z.number(),
      safePercentile: z.number(),
    }),
    chamber: z.object({ idleTemperatureC: z.number(), rampKPerMin: z.number() }),
    holderFactor: z.number(),
    learnedRatios: z
      .object({
        mean: z.number(),
        kappa: z.number(),
        shape: z.number(),
        rate: z.number(),
        runCount: z.number(),
      })
      .nullable(),
    staffedHours: z.string(),
    zone: z.string(),
  }),
  status: 200,
  access: { kind: 'site-reader' },
  idempotent: false,
  problems: [],
});

export const deviationSchema = z.object({
  id: recordNumber,
  requestId: recordNumber,
  code: z.enum(checkCodes),
  state: z.enum(deviationStates),
  reason: z.string(),
  /** What the person who decided said to it. */
  decisionReason: z.string().nullable(),
  customerAcceptance: z.string().nullable(),
  askedBy: z.string(),
  askedAt: instant,
  decidedBy: z.string().nullable(),
  decidedAt: instant.nullable(),
  expiresAt: instant.nullable(),
});
export type DeviationDto = z.infer<typeof deviationSchema>;

const requestDeviationParams = z.strictObject({
  site: siteParams.shape.site,
  id: recordNumberText,
});

export const listDeviations = defineContract({
  name: 'list-deviations',
  method: 'GET',
  path: '/api/sites/:site/requests/:id/deviations',
  summary: 'Deviations asked for and decided on a request.',
  params: requestDeviationParams,
  query: noQuery,
  body: noBody,
  response: z.object({ items: z.array(deviationSchema) }),
  status: 200,
  access: { kind: 'site-reader' },
  idempotent: false,
  problems: [],
});

export const askDeviation = defineContract({
  name: 'ask-deviation',
  method: 'POST',
  path: '/api/sites/:site/requests/:id/deviations',
  summary: 'Asks that a rule which may be lifted be lifted for this request.',
  params: requestDeviationParams,
  query: noQuery,
  body: z.strictObject({ code: z.enum(checkCodes), reason: reasonText }),
  response: deviationSchema,
  status: 201,
  access: { kind: 'action', action: 'request.edit' },
  idempotent: true,
  problems: ['deviation.not-liftable', 'request.state'],
});

export const decideDeviation = defineContract({
  name: 'decide-deviation',
  method: 'POST',
  path: '/api/sites/:site/deviations/:id/decision',
  summary: 'A metrologist or manager other than the asker grants or refuses.',
  params: requestDeviationParams,
  query: noQuery,
  body: z.strictObject({
    grant: z.boolean(),
    reason: reasonText,
    customerAcceptance: z.string().trim().max(300).nullable(),
    expiresAt: instant.nullable(),
  }),
  response: deviationSchema,
  status: 200,
  access: { kind: 'action', action: 'deviation.grant' },
  idempotent: true,
  problems: ['deviation.same-person', 'request.state'],
});
