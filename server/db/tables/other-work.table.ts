import { index, integer, pgTable, text } from 'drizzle-orm/pg-core';
import { otherWorkKinds } from '#shared/domain/states.ts';
import { id, oneOf, properRange, timestamps, tstzrange, version } from '#server/db/columns.ts';
import { chamberLoadsTable } from './load.table.ts';
import { personsTable } from './person.table.ts';
import { projectsTable } from './project.table.ts';
import { sitesTable } from './site.table.ts';

/** Cycling or ageing on the same chambers: it holds a load and takes units like a booking. */
export const otherWorkTable = pgTable(
  'other_work',
  {
    id: id(),
    siteId: integer('site_id')
      .notNull()
      .references(() => sitesTable.id),
    loadId: integer('load_id')
      .notNull()
      .references(() => chamberLoadsTable.id),
    projectId: integer('project_id').references(() => projectsTable.id),
    kind: text('kind', { enum: otherWorkKinds }).notNull(),
    title: text('title').notNull(),
    cellCount: integer('cell_count').notNull(),
    during: tstzrange('during').notNull(),
    plannedById: integer('planned_by_id')
      .notNull()
      .references(() => personsTable.id),
    version: version(),
    ...timestamps(),
  },
  (t) => [
    oneOf('other_work_kind', t.kind, otherWorkKinds),
    properRange('other_work_during', t.during),
    index('other_work_load').on(t.loadId),
    index('other_work_window').using('gist', t.siteId, t.during),
  ],
);
