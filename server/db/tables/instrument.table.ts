import { sql } from 'drizzle-orm';
import { type AnyPgColumn, check, index, integer, pgTable, text } from 'drizzle-orm/pg-core';
import { instrumentKinds, instrumentStates } from '#shared/domain/states.ts';
import { id, instant, oneOf, timestamps, version } from '#server/db/columns.ts';
import { personsTable } from './person.table.ts';
import { roomsTable, sitesTable } from './site.table.ts';

export const instrumentsTable = pgTable(
  'instrument',
  {
    id: id(),
    /** What people call it: C03, S05. Unique over the company. */
    tag: text('tag').notNull().unique('instrument_tag'),
    kind: text('kind', { enum: instrumentKinds }).notNull(),
    model: text('model').notNull(),
    serial: text('serial'),
    firmware: text('firmware'),
    siteId: integer('site_id')
      .notNull()
      .references(() => sitesTable.id),
    roomId: integer('room_id').references(() => roomsTable.id),
    custodianId: integer('custodian_id').references(() => personsTable.id),
    state: text('state', { enum: instrumentStates }).notNull(),
    releasedById: integer('released_by_id').references(() => personsTable.id),
    releasedAt: instant('released_at'),
    /** A mainframe: what befalls it befalls all below. */
    parentId: integer('parent_id').references((): AnyPgColumn => instrumentsTable.id),
    note: text('note'),
    version: version(),
    ...timestamps(),
  },
  (t) => [
    oneOf('instrument_kind', t.kind, instrumentKinds),
    oneOf('instrument_state', t.state, instrumentStates),
    check('instrument_tag_shape', sql`${t.tag} ~ '^[A-Z][A-Z0-9-]*$'`),
    check('instrument_not_own_parent', sql`${t.parentId} <> ${t.id}`),
    index('instrument_site').on(t.siteId, t.kind, t.tag),
    index('instrument_room').on(t.roomId),
    index('instrument_parent').on(t.parentId),
    index('instrument_custodian').on(t.custodianId),
  ],
);
