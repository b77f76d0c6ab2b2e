import { index, integer, pgTable, text } from 'drizzle-orm/pg-core';
import { instant } from '#server/db/columns.ts';

/** Unlogged: counters may be lost in a crash. */
export const rateLimitsTable = pgTable(
  'rate_limit',
  {
    key: text('key').primaryKey(),
    hits: integer('hits').notNull(),
    resetsAt: instant('resets_at').notNull(),
  },
  (t) => [index('rate_limit_resets').on(t.resetsAt)],
);
