import { sql } from 'drizzle-orm';
import { boolean, check, index, integer, jsonb, pgTable, text, unique } from 'drizzle-orm/pg-core';
import { bookingStates, grades } from '#shared/domain/states.ts';
import {
  id,
  instant,
  oneOf,
  properRange,
  timestamps,
  tstzrange,
  version,
} from '#server/db/columns.ts';
import { cellsTable } from './cell.table.ts';
import { meterRangesTable } from './channel.table.ts';
import { chamberLoadsTable } from './load.table.ts';
import { panelsTable } from './panel.table.ts';
import { personsTable } from './person.table.ts';
import { projectsTable } from './project.table.ts';
import { requestLotsTable, requestsTable } from './request.table.ts';
import { sitesTable } from './site.table.ts';
import { unitsTable } from './unit.table.ts';

/** One lot in one chamber load, from the start of connect to the end of unload. */
export const bookingsTable = pgTable(
  'booking',
  {
    id: id(),
    requestId: integer('request_id')
      .notNull()
      .references(() => requestsTable.id),
    lotId: integer('lot_id')
      .notNull()
      .references(() => requestLotsTable.id),
    loadId: integer('load_id')
      .notNull()
      .references(() => chamberLoadsTable.id),
    siteId: integer('site_id')
      .notNull()
      .references(() => sitesTable.id),
    projectId: integer('project_id')
      .notNull()
      .references(() => projectsTable.id),
    state: text('state', { enum: bookingStates }).notNull(),
    atRisk: boolean('at_risk').notNull().default(false),
    atRiskReason: text('at_risk_reason'),
    grade: text('grade', { enum: grades }).notNull(),
    during: tstzrange('during').notNull(),
    likelyS: integer('likely_s').notNull(),
    safeS: integer('safe_s').notNull(),
    /** Frozen when the booking is made. */
    estimateInputs: jsonb('estimate_inputs').notNull(),
    estimateResult: jsonb('estimate_result').notNull(),
    modelVersion: text('model_version').notNull(),
    /** This booking's own phase lengths within its load. */
    ownPhases: jsonb('own_phases').notNull(),
    /** When a tentative booking is released if the cells have not come. */
    noShowAt: instant('no_show_at'),
    confirmedById: integer('confirmed_by_id').references(() => personsTable.id),
    confirmedAt: instant('confirmed_at'),
    cancelReason: text('cancel_reason'),
    version: version(),
    ...timestamps(),
  },
  (t) => [
    oneOf('booking_state', t.state, bookingStates),
    oneOf('booking_grade', t.grade, grades),
    properRange('booking_during', t.during),
    check('booking_lengths', sql`${t.likelyS} > 0 and ${t.safeS} >= ${t.likelyS}`),
    check('booking_risk_has_reason', sql`not ${t.atRisk} or ${t.atRiskReason} is not null`),
    check(
      'booking_cancelled_has_reason',
      sql`${t.state} <> 'cancelled' or ${t.cancelReason} is not null`,
    ),
    index('booking_window').using('gist', t.siteId, t.during),
    index('booking_site_state').on(t.siteId, t.state, t.id),
    index('booking_request').on(t.requestId),
    index('booking_lot').on(t.lotId),
    index('booking_load').on(t.loadId),
    index('booking_project').on(t.projectId),
  ],
);

/** A cell and the path it is measured on. */
export const bookingCellsTable = pgTable(
  'booking_cell',
  {
    id: id(),
    bookingId: integer('booking_id')
      .notNull()
      .references(() => bookingsTable.id),
    cellId: integer('cell_id')
      .notNull()
      .references(() => cellsTable.id),
    sourceUnitId: integer('source_unit_id')
      .notNull()
      .references(() => unitsTable.id),
    meterUnitId: integer('meter_unit_id')
      .notNull()
      .references(() => unitsTable.id),
    positionUnitId: integer('position_unit_id')
      .notNull()
      .references(() => unitsTable.id),
    meterRangeId: integer('meter_range_id')
      .notNull()
      .references(() => meterRangesTable.id),
    panelId: integer('panel_id')
      .notNull()
      .references(() => panelsTable.id),
  },
  (t) => [
    unique('booking_cell_once').on(t.bookingId, t.cellId),
    unique('booking_cell_source').on(t.bookingId, t.sourceUnitId),
    unique('booking_cell_meter').on(t.bookingId, t.meterUnitId),
    unique('booking_cell_position').on(t.bookingId, t.positionUnitId),
    index('booking_cell_cell').on(t.cellId),
    index('booking_cell_source_unit').on(t.sourceUnitId),
    index('booking_cell_meter_unit').on(t.meterUnitId),
    index('booking_cell_position_unit').on(t.positionUnitId),
  ],
);
