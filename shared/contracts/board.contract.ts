import { z } from 'zod';
import { bookingStates, calibrationBadges } from '#shared/domain/states.ts';
import { phaseSpanSchema } from './check.schemas.ts';
import { instant, noBody, noQuery, recordNumber, siteParams } from './common.ts';
import { defineContract } from './define-contract.ts';

export const boardGroups = ['chambers', 'sources', 'meters'] as const;
export type BoardGroup = (typeof boardGroups)[number];

/** A row of the board: a chamber, a position, an instrument or a channel. */
export const boardRowSchema = z.object({
  /** Stable key: the tag, `C03` or `C03/4`. */
  key: z.string(),
  group: z.enum(boardGroups),
  /** Key of the row it folds under; null for a chamber or instrument. */
  parentKey: z.string().nullable(),
  label: z.string(),
  note: z.string(),
  badge: z.enum(calibrationBadges).nullable(),
  childCount: z.int(),
  href: z.string(),
});
export type BoardRow = z.infer<typeof boardRowSchema>;

export const boardBarSchema = z.object({
  bookingId: recordNumber,
  rowKey: z.string(),
  isVisible: z.boolean(),
  state: z.enum(bookingStates),
  isAtRisk: z.boolean(),
  atRiskFrom: instant.nullable(),
  atRiskReason: z.string().nullable(),
  title: z.string(),
  startAt: instant,
  endAt: instant,
  /** Likely end of the hold; what follows until the safe end is margin. */
  holdLikelyEndAt: instant.nullable(),
  phases: z.array(phaseSpanSchema),
});
export type BoardBar = z.infer<typeof boardBarSchema>;

/** A stretch drawn behind bars: outage, unavailability, or after a due date. */
export const boardBlockSchema = z.object({
  rowKey: z.string(),
  kind: z.enum(['outage', 'unavailable', 'not-bookable']),
  startAt: instant,
  endAt: instant,
  sentence: z.string(),
});
export type BoardBlock = z.infer<typeof boardBlockSchema>;

/** Positions taken over time, and the set-temperature line of a chamber. */
export const tideSchema = z.object({
  rowKey: z.string(),
  positions: z.int(),
  taken: z.array(z.object({ at: instant, count: z.int() })),
  /** Corners of the line: level between equal values, slanting while the chamber ramps or returns. */
  temperature: z.array(z.object({ at: instant, setTemperatureC: z.number() })),
});
export type Tide = z.infer<typeof tideSchema>;

export const boardWindowSchema = z.object({
  from: instant,
  to: instant,
  rows: z.array(boardRowSchema),
  rowCount: z.int(),
  bars: z.array(boardBarSchema),
  blocks: z.array(boardBlockSchema),
  tides: z.array(tideSchema),
  staffed: z.array(z.object({ startAt: instant, endAt: instant })),
});
export type BoardWindow = z.infer<typeof boardWindowSchema>;

export const getBoard = defineContract({
  name: 'get-board',
  method: 'GET',
  path: '/api/sites/:site/board',
  summary: 'One window of the board: a stretch of rows over a stretch of time.',
  params: siteParams,
  query: z.strictObject({
    from: instant,
    to: instant,
    /** Groups shown, comma separated. */
    groups: z
      .string()
      .transform((text) => text.split(',').filter((part) => part !== ''))
      .pipe(z.array(z.enum(boardGroups)))
      .exactOptional(),
    /** Rows unfolded, by key, comma separated. */
    open: z.string().max(2000).exactOptional(),
    /** Keep only rows whose tag contains this. */
    text: z.string().max(40).exactOptional(),
    offset: z.coerce.number().int().min(0).exactOptional(),
    limit: z.coerce.number().int().min(1).max(60).exactOptional(),
  }),
  body: noBody,
  response: boardWindowSchema,
  status: 200,
  access: { kind: 'site-reader' },
  idempotent: false,
  problems: ['input.invalid'],
});

export const waterlineSchema = z.object({
  at: instant,
  positionsTaken: z.int(),
  positions: z.int(),
  vessels: z.array(
    z.object({
      tag: z.string(),
      setTemperatureC: z.number(),
      taken: z.int(),
      positions: z.int(),
      state: z.enum(['ok', 'stale', 'out']),
      sentence: z.string(),
    }),
  ),
});
export type Waterline = z.infer<typeof waterlineSchema>;

export const getWaterline = defineContract({
  name: 'get-waterline',
  method: 'GET',
  path: '/api/sites/:site/waterline',
  summary: 'Positions taken now, chamber by chamber, as planned (no live reading).',
  params: siteParams,
  query: noQuery,
  body: noBody,
  response: waterlineSchema,
  status: 200,
  access: { kind: 'site-reader' },
  idempotent: false,
  problems: [],
});

export const searchHitSchema = z.object({
  kind: z.enum(['instrument', 'booking', 'request', 'cell', 'calibration']),
  label: z.string(),
  detail: z.string(),
  href: z.string(),
});

export const searchSite = defineContract({
  name: 'search-site',
  method: 'GET',
  path: '/api/sites/:site/search',
  summary: 'Finds a tag, a cell serial, or a record by number.',
  params: siteParams,
  query: z.strictObject({ text: z.string().trim().min(1).max(60) }),
  body: noBody,
  response: z.object({ hits: z.array(searchHitSchema) }),
  status: 200,
  access: { kind: 'site-reader' },
  idempotent: false,
  problems: [],
});

export const todaySchema = z.object({
  day: z.string(),
  staffed: z.array(z.object({ startAt: instant, endAt: instant })),
  positions: z.int(),
  tide: z.array(z.object({ at: instant, count: z.int() })),
  doors: z.array(
    z.object({ at: instant, chamberTag: z.string(), what: z.enum(['load', 'unload']) }),
  ),
  happenings: z.array(
    z.object({
      at: instant,
      kind: z.enum(['load', 'unload', 'outage', 'due', 'settled']),
      what: z.string(),
      touches: z.string(),
      state: z.string(),
      tone: z.enum(['reed', 'heron', 'marigold', 'brick', 'ink']),
      href: z.string().nullable(),
    }),
  ),
  waits: z.array(
    z.object({
      kind: z.enum([
        'proposal',
        'request',
        'at-risk',
        'second-signature',
        'release',
        'draft',
        'booking',
        'deviation',
      ]),
      what: z.string(),
      why: z.string(),
      since: instant,
      action: z.string(),
      href: z.string(),
    }),
  ),
  fallsDue: z.array(
    z.object({
      tag: z.string(),
      name: z.string(),
      badge: z.enum(calibrationBadges),
      dueOn: z.string(),
      bookings: z.array(z.object({ startAt: instant, endAt: instant })),
      bookingsPastDue: z.int(),
      atRisk: z.int(),
    }),
  ),
});
export type Today = z.infer<typeof todaySchema>;

export const getToday = defineContract({
  name: 'get-today',
  method: 'GET',
  path: '/api/sites/:site/today',
  summary: 'The day at the site and the work that waits for the caller, by role.',
  params: siteParams,
  query: noQuery,
  body: noBody,
  response: todaySchema,
  status: 200,
  access: { kind: 'site-reader' },
  idempotent: false,
  problems: [],
});
