import { sql } from 'drizzle-orm';
import {
  check,
  doublePrecision,
  foreignKey,
  index,
  integer,
  pgTable,
  text,
} from 'drizzle-orm/pg-core';
import { unitKinds } from '#shared/domain/states.ts';
import { id, instant, oneOf, timestamps, version } from '#server/db/columns.ts';
import { cellTypesTable } from './cell.table.ts';
import { chamberPositionsTable, chamberSpecsTable } from './chamber.table.ts';
import { channelsTable } from './channel.table.ts';
import { instrumentsTable } from './instrument.table.ts';
import { personsTable } from './person.table.ts';

/** The smallest thing taken exclusively; the row that is locked before it is taken. */
export const unitsTable = pgTable(
  'unit',
  {
    id: id(),
    kind: text('kind', { enum: unitKinds }).notNull(),
    /** The instrument or chamber the unit belongs to. */
    instrumentId: integer('instrument_id')
      .notNull()
      .references(() => instrumentsTable.id),
    channelId: integer('channel_id').unique('unit_channel'),
    positionId: integer('position_id').unique('unit_position'),
  },
  (t) => [
    oneOf('unit_kind', t.kind, unitKinds),
    check(
      'unit_is_one_thing',
      sql`(${t.kind} = 'chamber-position') = (${t.positionId} is not null) and (${t.kind} = 'chamber-position') = (${t.channelId} is null)`,
    ),
    foreignKey({
      name: 'unit_channel_of_instrument',
      columns: [t.channelId, t.instrumentId],
      foreignColumns: [channelsTable.id, channelsTable.instrumentId],
    }),
    foreignKey({
      name: 'unit_position_of_chamber',
      columns: [t.positionId, t.instrumentId],
      foreignColumns: [chamberPositionsTable.id, chamberPositionsTable.chamberId],
    }),
    index('unit_instrument').on(t.instrumentId),
  ],
);

/** Something a unit may not be used for, from its calibration or its keeper. */
export const limitationsTable = pgTable(
  'limitation',
  {
    id: id(),
    unitId: integer('unit_id')
      .notNull()
      .references(() => unitsTable.id),
    note: text('note').notNull(),
    maxCurrentA: doublePrecision('max_current_a'),
    startsAt: instant('starts_at').notNull(),
    endsAt: instant('ends_at'),
    recordedById: integer('recorded_by_id')
      .notNull()
      .references(() => personsTable.id),
    version: version(),
    ...timestamps(),
  },
  (t) => [
    check('limitation_span', sql`${t.endsAt} > ${t.startsAt}`),
    check('limitation_current', sql`${t.maxCurrentA} > 0`),
    index('limitation_unit').on(t.unitId),
  ],
);

/** The safety officer's leave for holds without a person present. */
export const unattendedPermissionsTable = pgTable(
  'unattended_permission',
  {
    id: id(),
    chamberId: integer('chamber_id')
      .notNull()
      .references(() => chamberSpecsTable.instrumentId),
    /** No cell type: any up to the hazard level. */
    cellTypeId: integer('cell_type_id').references(() => cellTypesTable.id),
    maxHazard: integer('max_hazard').notNull(),
    maxTemperatureC: doublePrecision('max_temperature_c').notNull(),
    maxStateOfChargePct: doublePrecision('max_state_of_charge_pct').notNull(),
    /** Whom to call when something happens meanwhile. */
    contact: text('contact').notNull(),
    startsAt: instant('starts_at').notNull(),
    endsAt: instant('ends_at'),
    note: text('note').notNull(),
    grantedById: integer('granted_by_id')
      .notNull()
      .references(() => personsTable.id),
    version: version(),
    ...timestamps(),
  },
  (t) => [
    check('unattended_permission_span', sql`${t.endsAt} > ${t.startsAt}`),
    check(
      'unattended_permission_figures',
      sql`${t.maxHazard} between 0 and 7 and ${t.maxStateOfChargePct} > 0 and ${t.maxStateOfChargePct} <= 100`,
    ),
    index('unattended_permission_chamber').on(t.chamberId),
    index('unattended_permission_cell_type').on(t.cellTypeId),
  ],
);
