import { sql } from 'drizzle-orm';
import {
  check,
  doublePrecision,
  index,
  integer,
  pgTable,
  text,
  uniqueIndex,
} from 'drizzle-orm/pg-core';
import {
  cellConditions,
  cellStatuses,
  cellTypeStates,
  chargeDirections,
} from '#shared/domain/states.ts';
import { cellClasses, cellFormats, chemistries } from '#shared/domain/hold-estimate/types.ts';
import { id, instant, oneOf, timestamps, version } from '#server/db/columns.ts';
import { personsTable } from './person.table.ts';
import { projectsTable } from './project.table.ts';
import { sitesTable } from './site.table.ts';

/** Limits are the cell maker's; measured figures stand for the class default where present. */
export const cellTypesTable = pgTable(
  'cell_type',
  {
    id: id(),
    name: text('name').notNull().unique('cell_type_name'),
    cellClass: text('cell_class', { enum: cellClasses }).notNull(),
    format: text('format', { enum: cellFormats }).notNull(),
    chemistry: text('chemistry', { enum: chemistries }).notNull(),
    capacityAh: doublePrecision('capacity_ah').notNull(),
    nominalV: doublePrecision('nominal_v').notNull(),
    minV: doublePrecision('min_v').notNull(),
    maxV: doublePrecision('max_v').notNull(),
    minStorageC: doublePrecision('min_storage_c').notNull(),
    maxStorageC: doublePrecision('max_storage_c').notNull(),
    minTestC: doublePrecision('min_test_c').notNull(),
    maxTestC: doublePrecision('max_test_c').notNull(),
    maxHoldStateOfChargePct: doublePrecision('max_hold_state_of_charge_pct').notNull(),
    capacitanceFPerAh: doublePrecision('capacitance_f_per_ah'),
    resistanceOhm: doublePrecision('resistance_ohm'),
    thermalTimeConstantS: doublePrecision('thermal_time_constant_s'),
    entropicCoefficientVPerK: doublePrecision('entropic_coefficient_v_per_k'),
    massKg: doublePrecision('mass_kg'),
    surfaceM2: doublePrecision('surface_m2'),
    selfDischargeAPerAh: doublePrecision('self_discharge_a_per_ah'),
    hazardLevel: integer('hazard_level'),
    state: text('state', { enum: cellTypeStates }).notNull(),
    draftedById: integer('drafted_by_id').references(() => personsTable.id),
    releasedById: integer('released_by_id').references(() => personsTable.id),
    releasedAt: instant('released_at'),
    note: text('note'),
    version: version(),
    ...timestamps(),
  },
  (t) => [
    oneOf('cell_type_class', t.cellClass, cellClasses),
    oneOf('cell_type_format', t.format, cellFormats),
    oneOf('cell_type_chemistry', t.chemistry, chemistries),
    oneOf('cell_type_state', t.state, cellTypeStates),
    check(
      'cell_type_limits',
      sql`${t.capacityAh} > 0 and ${t.minV} < ${t.maxV} and ${t.nominalV} between ${t.minV} and ${t.maxV} and ${t.minStorageC} < ${t.maxStorageC} and ${t.minTestC} < ${t.maxTestC} and ${t.maxHoldStateOfChargePct} > 0 and ${t.maxHoldStateOfChargePct} <= 100`,
    ),
    check(
      'cell_type_figures',
      sql`${t.capacitanceFPerAh} > 0 and ${t.resistanceOhm} > 0 and ${t.thermalTimeConstantS} > 0 and ${t.massKg} > 0 and ${t.surfaceM2} > 0 and ${t.selfDischargeAPerAh} > 0`,
    ),
    check('cell_type_hazard', sql`${t.hazardLevel} between 0 and 7`),
    check(
      'cell_type_released',
      sql`${t.state} <> 'released' or (${t.hazardLevel} is not null and ${t.releasedById} is not null and ${t.releasedAt} is not null)`,
    ),
  ],
);

export const cellsTable = pgTable(
  'cell',
  {
    id: id(),
    /** Announced cells have none yet. */
    serial: text('serial'),
    lotCode: text('lot_code'),
    siteId: integer('site_id')
      .notNull()
      .references(() => sitesTable.id),
    projectId: integer('project_id')
      .notNull()
      .references(() => projectsTable.id),
    cellTypeId: integer('cell_type_id')
      .notNull()
      .references(() => cellTypesTable.id),
    status: text('status', { enum: cellStatuses }).notNull(),
    receivedAt: instant('received_at'),
    condition: text('condition', { enum: cellConditions }),
    conditionNote: text('condition_note'),
    stateOfChargePct: doublePrecision('state_of_charge_pct'),
    ocvV: doublePrecision('ocv_v'),
    lastChargedAt: instant('last_charged_at'),
    lastChargeDirection: text('last_charge_direction', { enum: chargeDirections }),
    lastChargeTemperatureC: doublePrecision('last_charge_temperature_c'),
    storageTemperatureC: doublePrecision('storage_temperature_c'),
    place: text('place'),
    version: version(),
    ...timestamps(),
  },
  (t) => [
    oneOf('cell_status', t.status, cellStatuses),
    oneOf('cell_condition', t.condition, cellConditions),
    oneOf('cell_charge_direction', t.lastChargeDirection, chargeDirections),
    check('cell_state_of_charge', sql`${t.stateOfChargePct} between 0 and 100`),
    check(
      'cell_received',
      sql`${t.status} = 'announced' or (${t.receivedAt} is not null and ${t.condition} is not null)`,
    ),
    uniqueIndex('cell_serial')
      .on(t.cellTypeId, t.serial)
      .where(sql`${t.serial} is not null`),
    index('cell_site').on(t.siteId, t.status),
    index('cell_project').on(t.projectId),
  ],
);
