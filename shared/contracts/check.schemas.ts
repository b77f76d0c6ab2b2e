import { z } from 'zod';
import { checkCodes, checkOutcomes } from '#shared/domain/checks/types.ts';
import { loadPhases } from '#shared/domain/hold-estimate/types.ts';
import { instant, recordNumber } from './common.ts';

export const checkResultSchema = z.object({
  code: z.enum(checkCodes),
  outcome: z.enum(checkOutcomes),
  sentence: z.string(),
  evidence: z.array(z.object({ label: z.string(), value: z.string(), source: z.string() })),
  waysOut: z.array(
    z.object({ kind: z.string(), sentence: z.string(), subject: z.string().nullable() }),
  ),
  used: z.number().nullable(),
  liftedByDeviationId: recordNumber.nullable(),
});
export type CheckResultDto = z.infer<typeof checkResultSchema>;

/** One phase of a booking or load in time. */
export const phaseSpanSchema = z.object({
  phase: z.enum(loadPhases),
  startAt: instant,
  endAt: instant,
  setTemperatureC: z.number(),
});
export type PhaseSpanDto = z.infer<typeof phaseSpanSchema>;

/** One cell's way through source, meter and position; the identifiers are units and ranges. */
export const pathSchema = z.object({
  panelId: recordNumber,
  panelName: z.string(),
  sourceUnitId: recordNumber,
  sourceTag: z.string(),
  meterUnitId: recordNumber,
  meterTag: z.string(),
  meterRangeId: recordNumber,
  meterRangeLabel: z.string(),
  positionUnitId: recordNumber,
  positionTag: z.string(),
});
export type PathDto = z.infer<typeof pathSchema>;

/** What a caller must say to name a place and time; labels are looked up by the server. */
export const placementSchema = z.strictObject({
  chamberTag: z.string(),
  startAt: instant,
  setTemperatureC: z.number(),
  joinsLoadId: recordNumber.nullable(),
  paths: z
    .array(
      z.strictObject({
        panelId: recordNumber,
        sourceUnitId: recordNumber,
        meterUnitId: recordNumber,
        meterRangeId: recordNumber,
        positionUnitId: recordNumber,
      }),
    )
    .min(1)
    .max(64),
});
export type Placement = z.infer<typeof placementSchema>;
