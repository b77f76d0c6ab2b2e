import { sql } from 'drizzle-orm';
import {
  boolean,
  check,
  doublePrecision,
  index,
  integer,
  jsonb,
  pgTable,
  primaryKey,
  text,
  unique,
} from 'drizzle-orm/pg-core';
import { grades, priorities, requestStates, toleranceKinds } from '#shared/domain/states.ts';
import { measurementKinds } from '#shared/domain/hold-estimate/types.ts';
import { id, instant, oneOf, timestamps, version } from '#server/db/columns.ts';
import { cellTypesTable, cellsTable } from './cell.table.ts';
import { personsTable } from './person.table.ts';
import { projectsTable } from './project.table.ts';
import { sitesTable } from './site.table.ts';

export const requestsTable = pgTable(
  'request',
  {
    id: id(),
    siteId: integer('site_id')
      .notNull()
      .references(() => sitesTable.id),
    /** A draft may still lack it. */
    projectId: integer('project_id').references(() => projectsTable.id),
    requesterId: integer('requester_id')
      .notNull()
      .references(() => personsTable.id),
    state: text('state', { enum: requestStates }).notNull(),
    kind: text('kind', { enum: measurementKinds }).notNull(),
    grade: text('grade', { enum: grades }).notNull(),
    /** A draft may still lack it. */
    setTempMdegc: integer('set_temp_mdegc'),
    setToleranceMk: integer('set_tolerance_mk').notNull().default(0),
    toleranceKind: text('tolerance_kind', { enum: toleranceKinds }),
    toleranceFraction: doublePrecision('tolerance_fraction'),
    toleranceCurrentA: doublePrecision('tolerance_current_a'),
    badToGoodRatio: doublePrecision('bad_to_good_ratio'),
    earliestStartAt: instant('earliest_start_at'),
    neededByAt: instant('needed_by_at'),
    maySplit: boolean('may_split').notNull().default(false),
    note: text('note'),
    priority: text('priority', { enum: priorities }).notNull().default('normal'),
    submittedAt: instant('submitted_at'),
    declineReason: text('decline_reason'),
    withdrawReason: text('withdraw_reason'),
    /** The engineer's preferred offer; it reserves nothing. */
    proposedOffer: jsonb('proposed_offer'),
    proposedAt: instant('proposed_at'),
    version: version(),
    ...timestamps(),
  },
  (t) => [
    oneOf('request_state', t.state, requestStates),
    oneOf('request_kind', t.kind, measurementKinds),
    oneOf('request_grade', t.grade, grades),
    oneOf('request_tolerance_kind', t.toleranceKind, toleranceKinds),
    oneOf('request_priority', t.priority, priorities),
    check('request_set_tolerance', sql`${t.setToleranceMk} >= 0`),
    check(
      'request_tolerance',
      sql`(${t.toleranceKind} is distinct from 'relative' or (${t.toleranceFraction} > 0 and ${t.toleranceFraction} < 1)) and (${t.toleranceKind} is distinct from 'absolute' or ${t.toleranceCurrentA} > 0) and ${t.badToGoodRatio} > 1`,
    ),
    check(
      'request_complete',
      sql`${t.state} in ('draft', 'withdrawn') or (${t.projectId} is not null and ${t.setTempMdegc} is not null and ${t.submittedAt} is not null and (${t.kind} <> 'settled' or ${t.toleranceKind} is not null) and (${t.kind} <> 'screening' or ${t.badToGoodRatio} is not null))`,
    ),
    index('request_site').on(t.siteId, t.state, t.id),
    index('request_project').on(t.projectId),
    index('request_requester').on(t.requesterId),
  ],
);

/** Cells of one type measured together: by serial, or by type and number. */
export const requestLotsTable = pgTable(
  'request_lot',
  {
    id: id(),
    requestId: integer('request_id')
      .notNull()
      .references(() => requestsTable.id, { onDelete: 'cascade' }),
    seq: integer('seq').notNull(),
    /** A draft may still lack type and number. */
    cellTypeId: integer('cell_type_id').references(() => cellTypesTable.id),
    cellCount: integer('cell_count'),
    stateOfChargePct: doublePrecision('state_of_charge_pct'),
    /** Last charge or discharge of the least rested cell. */
    restedSinceAt: instant('rested_since_at'),
    storageTemperatureC: doublePrecision('storage_temperature_c'),
    isDamaged: boolean('is_damaged').notNull().default(false),
  },
  (t) => [
    unique('request_lot_seq').on(t.requestId, t.seq),
    check('request_lot_count', sql`${t.cellCount} > 0`),
    check('request_lot_state_of_charge', sql`${t.stateOfChargePct} between 0 and 100`),
    index('request_lot_cell_type').on(t.cellTypeId),
  ],
);

export const requestLotCellsTable = pgTable(
  'request_lot_cell',
  {
    lotId: integer('lot_id')
      .notNull()
      .references(() => requestLotsTable.id, { onDelete: 'cascade' }),
    cellId: integer('cell_id')
      .notNull()
      .references(() => cellsTable.id),
  },
  (t) => [
    primaryKey({ name: 'request_lot_cell_pk', columns: [t.lotId, t.cellId] }),
    index('request_lot_cell_cell').on(t.cellId),
  ],
);
