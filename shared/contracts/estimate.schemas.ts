import { z } from 'zod';
import { figureOrigins, holdLimits, loadPhases } from '#shared/domain/hold-estimate/types.ts';

/** The wire form of a slot estimate: what `estimateSlot` returns, as it is. */
const figure = z.object({
  key: z.string(),
  label: z.string(),
  value: z.number(),
  unit: z.string(),
  formula: z.string(),
  inputs: z.array(z.object({ label: z.string(), value: z.number(), unit: z.string() })),
  source: z.string(),
  origin: z.enum(figureOrigins),
});

const phaseEstimate = z.object({
  phase: z.enum(loadPhases),
  likelyS: z.number(),
  safeS: z.number(),
  isAttended: z.boolean(),
  setTemperatureC: z.number(),
});

const holdRange = z.object({
  likelyS: z.number(),
  safeS: z.number(),
  lowS: z.number(),
  highS: z.number(),
  worstS: z.number(),
});

const numbers = z.object({
  expectedCurrentA: z.number(),
  toleranceA: z.number(),
  allowanceA: z.number(),
  capacitanceF: z.number(),
  seriesResistanceOhm: z.number(),
  externalResistanceOhm: z.number(),
  timeConstantS: z.number(),
  thermalTimeConstantS: z.number(),
  entropicCoefficientVPerK: z.number(),
  entropicBoundVPerK: z.number(),
  startMismatchV: z.number(),
  readingSdA: z.number(),
});

const base = { modelVersion: z.string(), figures: z.array(figure), notes: z.array(z.string()) };
const known = {
  ...base,
  phases: z.array(phaseEstimate),
  likelyTotalS: z.number(),
  safeTotalS: z.number(),
  hold: holdRange,
  limitedBy: z.enum(holdLimits),
  limitText: z.string(),
  numbers,
};
const extent = z.object({ holdS: z.number(), totalS: z.number(), label: z.string() });

export const slotEstimateSchema = z.discriminatedUnion('outcome', [
  z.object({ outcome: z.literal('ok'), ...known }),
  z.object({ outcome: z.literal('too-long'), reason: z.string(), ...known }),
  z.object({
    outcome: z.literal('range'),
    ...base,
    reason: z.string(),
    question: z.object({ field: z.literal('stateOfChargePct'), text: z.string() }),
    shortest: extent,
    longest: extent,
  }),
  z.object({ outcome: z.literal('unknown'), ...base, reason: z.string() }),
  z.object({ outcome: z.literal('impossible'), ...base, reason: z.string(), numbers }),
]);
export type SlotEstimateDto = z.infer<typeof slotEstimateSchema>;
