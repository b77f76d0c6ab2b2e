import { index, integer, pgTable, primaryKey, text } from 'drizzle-orm/pg-core';
import { id, instant, timestamps, version } from '#server/db/columns.ts';
import { personsTable } from './person.table.ts';

export const projectsTable = pgTable('project', {
  id: id(),
  code: text('code').notNull().unique('project_code'),
  name: text('name').notNull(),
  customer: text('customer'),
  costCentre: text('cost_centre'),
  closedAt: instant('closed_at'),
  version: version(),
  ...timestamps(),
});

export const projectMembersTable = pgTable(
  'project_member',
  {
    projectId: integer('project_id')
      .notNull()
      .references(() => projectsTable.id),
    personId: integer('person_id')
      .notNull()
      .references(() => personsTable.id),
    createdAt: instant('created_at').notNull(),
  },
  (t) => [
    primaryKey({ name: 'project_member_pk', columns: [t.projectId, t.personId] }),
    index('project_member_person').on(t.personId),
  ],
);
