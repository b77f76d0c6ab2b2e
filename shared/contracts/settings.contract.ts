import { z } from 'zod';
import {
  calendarDay,
  instant,
  noBody,
  noQuery,
  rowVersion,
  siteCode,
  siteParams,
} from './common.ts';
import { defineContract } from './define-contract.ts';

const policyValue = z.union([z.number(), z.boolean(), z.string(), z.array(z.number())]);

export const policySchema = z.object({
  key: z.string(),
  label: z.string(),
  value: policyValue,
  fallback: policyValue,
  kind: z.enum(['number', 'flag', 'outcome', 'days']),
  unit: z.string().nullable(),
  min: z.number().nullable(),
  max: z.number().nullable(),
  isWhole: z.boolean(),
  /** 0 where the site never set it and the default holds. */
  version: z.int().min(0),
  changedAt: instant.nullable(),
  changedBy: z.string().nullable(),
});
export type PolicyDto = z.infer<typeof policySchema>;

export const listPolicies = defineContract({
  name: 'list-policies',
  method: 'GET',
  path: '/api/sites/:site/policies',
  summary: 'Every policy of the site with the value in force, its default and its limits.',
  params: siteParams,
  query: noQuery,
  body: noBody,
  response: z.object({ items: z.array(policySchema) }),
  status: 200,
  access: { kind: 'site-reader' },
  idempotent: false,
  problems: [],
});

export const setPolicy = defineContract({
  name: 'set-policy',
  method: 'PUT',
  path: '/api/sites/:site/policies/:key',
  summary: 'Sets one policy of the site; `version` is the one last seen, 0 for a default.',
  params: z.strictObject({ site: siteCode, key: z.string().max(60) }),
  query: noQuery,
  body: z.strictObject({ value: policyValue, version: z.int().min(0) }),
  response: policySchema,
  status: 200,
  access: { kind: 'action', action: 'policy.edit' },
  idempotent: false,
  problems: ['version.stale'],
});

const minuteOfDay = z.int().min(0).max(1440);
const dayHours = z.strictObject({ fromMin: minuteOfDay, toMin: minuteOfDay });
const daySpans = z
  .array(dayHours)
  .max(4, 'at most four spans a day')
  .refine((spans) => spans.every((span) => span.fromMin < span.toMin), {
    error: 'each span ends after it starts',
  })
  .refine(
    (spans) =>
      spans.every((span, index) => index === 0 || (spans[index - 1]?.toMin ?? 0) <= span.fromMin),
    { error: 'the spans of a day come in order and do not overlap' },
  );
export const workingHoursFields = z.strictObject({
  /** Wall-clock minutes after midnight in the site's zone, Monday first. */
  weekly: z.array(daySpans).length(7, 'seven days, Monday first'),
  exceptions: z
    .array(
      z.strictObject({
        day: calendarDay,
        hours: daySpans,
        reason: z.string().trim().min(1, 'say why the day differs').max(200),
      }),
    )
    .max(400)
    .refine((days) => new Set(days.map((entry) => entry.day)).size === days.length, {
      error: 'each day is named once',
    }),
});
export const workingHoursSchema = z.object({
  zone: z.string(),
  ...workingHoursFields.shape,
  version: rowVersion,
});
export type WorkingHoursDto = z.infer<typeof workingHoursSchema>;

export const getWorkingHours = defineContract({
  name: 'get-working-hours',
  method: 'GET',
  path: '/api/sites/:site/working-hours',
  summary: 'Working hours of the site by weekday, and the days that differ.',
  params: siteParams,
  query: noQuery,
  body: noBody,
  response: workingHoursSchema,
  status: 200,
  access: { kind: 'site-reader' },
  idempotent: false,
  problems: [],
});

export const setWorkingHours = defineContract({
  name: 'set-working-hours',
  method: 'PUT',
  path: '/api/sites/:site/working-hours',
  summary: 'Replaces the working hours and the days that differ.',
  params: siteParams,
  query: noQuery,
  body: z.strictObject({ ...workingHoursFields.shape, version: rowVersion }),
  response: workingHoursSchema,
  status: 200,
  access: { kind: 'action', action: 'policy.edit' },
  idempotent: false,
  problems: ['version.stale'],
});
