import { index, json, pgTable, timestamp, varchar } from 'drizzle-orm/pg-core';

/** The shape the session store expects. */
export const sessionsTable = pgTable(
  'session',
  {
    sid: varchar('sid').primaryKey(),
    sess: json('sess').notNull(),
    expire: timestamp('expire', { withTimezone: true, mode: 'date', precision: 6 }).notNull(),
  },
  (t) => [index('session_expire').on(t.expire)],
);
