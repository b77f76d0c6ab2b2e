import { sql } from 'drizzle-orm';
import {
  boolean,
  check,
  foreignKey,
  index,
  integer,
  pgTable,
  text,
  unique,
} from 'drizzle-orm/pg-core';
import { loadPhases } from '#shared/domain/hold-estimate/types.ts';
import { loadStates } from '#shared/domain/states.ts';
import {
  id,
  instant,
  oneOf,
  properRange,
  timestamps,
  tstzrange,
  version,
} from '#server/db/columns.ts';
import { chamberSpecsTable } from './chamber.table.ts';

/**
 * What is in a chamber between two door openings. Moving it is one UPDATE of `chamberId` and
 * `strict` together; its phases follow by the foreign key.
 */
export const chamberLoadsTable = pgTable(
  'chamber_load',
  {
    id: id(),
    chamberId: integer('chamber_id').notNull(),
    /** The chamber's door rule, kept equal by the foreign key. */
    strict: boolean('strict').notNull(),
    state: text('state', { enum: loadStates }).notNull(),
    /** Until when bookings may join; open to its start where none is set. */
    closesAt: instant('closes_at'),
    setTempMdegc: integer('set_temp_mdegc').notNull(),
    live: boolean('live').notNull(),
    version: version(),
    ...timestamps(),
  },
  (t) => [
    oneOf('chamber_load_state', t.state, loadStates),
    check('chamber_load_cancelled_is_not_live', sql`not ${t.live} or ${t.state} <> 'cancelled'`),
    foreignKey({
      name: 'chamber_load_chamber',
      columns: [t.chamberId, t.strict],
      foreignColumns: [chamberSpecsTable.instrumentId, chamberSpecsTable.strict],
    }).onUpdate('cascade'),
    unique('chamber_load_place').on(t.id, t.chamberId, t.strict),
    index('chamber_load_chamber_state').on(t.chamberId, t.state),
  ],
);

export const loadPhasesTable = pgTable(
  'load_phase',
  {
    id: id(),
    loadId: integer('load_id').notNull(),
    chamberId: integer('chamber_id').notNull(),
    strict: boolean('strict').notNull(),
    seq: integer('seq').notNull(),
    plateau: integer('plateau').notNull().default(0),
    phase: text('phase', { enum: loadPhases }).notNull(),
    setTempMdegc: integer('set_temp_mdegc').notNull(),
    during: tstzrange('during').notNull(),
    live: boolean('live').notNull(),
    /** True: must not be disturbed. False: disturbs. Null: neither. */
    still: boolean('still').generatedAlwaysAs(
      sql`case when phase in ('soak', 'match', 'hold', 'measure') then true when phase in ('ramp', 'return') then false when phase in ('connect', 'unload') and strict then false end`,
    ),
  },
  (t) => [
    oneOf('load_phase_phase', t.phase, loadPhases),
    properRange('load_phase_during', t.during),
    unique('load_phase_seq').on(t.loadId, t.seq),
    foreignKey({
      name: 'load_phase_load',
      columns: [t.loadId, t.chamberId, t.strict],
      foreignColumns: [chamberLoadsTable.id, chamberLoadsTable.chamberId, chamberLoadsTable.strict],
    }).onUpdate('cascade'),
  ],
);
