import { sql } from 'drizzle-orm';
import {
  boolean,
  check,
  doublePrecision,
  index,
  integer,
  pgTable,
  primaryKey,
  text,
  unique,
} from 'drizzle-orm/pg-core';
import { id, timestamps, version } from '#server/db/columns.ts';
import { chamberSpecsTable } from './chamber.table.ts';
import { unitsTable } from './unit.table.ts';

/** Channels and positions that can be connected with each other. */
export const panelsTable = pgTable(
  'panel',
  {
    id: id(),
    name: text('name').notNull(),
    chamberId: integer('chamber_id')
      .notNull()
      .references(() => chamberSpecsTable.instrumentId),
    /** Unknown stops a booking. */
    leadResistanceOhm: doublePrecision('lead_resistance_ohm'),
    guarded: boolean('guarded').notNull(),
    recablingAllowed: boolean('recabling_allowed').notNull(),
    version: version(),
    ...timestamps(),
  },
  (t) => [
    unique('panel_name').on(t.chamberId, t.name),
    check('panel_lead_resistance', sql`${t.leadResistanceOhm} >= 0`),
  ],
);

export const panelMembersTable = pgTable(
  'panel_member',
  {
    panelId: integer('panel_id')
      .notNull()
      .references(() => panelsTable.id),
    unitId: integer('unit_id')
      .notNull()
      .references(() => unitsTable.id),
  },
  (t) => [
    primaryKey({ name: 'panel_member_pk', columns: [t.panelId, t.unitId] }),
    index('panel_member_unit').on(t.unitId),
  ],
);
