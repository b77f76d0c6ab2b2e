import { integer, jsonb, pgTable, text, unique } from 'drizzle-orm/pg-core';
import { id, timestamps, version } from '#server/db/columns.ts';
import { personsTable } from './person.table.ts';
import { sitesTable } from './site.table.ts';

/** A policy a site has set away from its default; no site is the whole company. */
export const settingsTable = pgTable(
  'setting',
  {
    id: id(),
    siteId: integer('site_id').references(() => sitesTable.id),
    key: text('key').notNull(),
    value: jsonb('value').notNull(),
    changedById: integer('changed_by_id').references(() => personsTable.id),
    version: version(),
    ...timestamps(),
  },
  (t) => [unique('setting_key').on(t.siteId, t.key).nullsNotDistinct()],
);
