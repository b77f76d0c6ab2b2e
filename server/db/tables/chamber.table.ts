import { sql } from 'drizzle-orm';
import {
  boolean,
  check,
  doublePrecision,
  index,
  integer,
  pgTable,
  text,
  unique,
} from 'drizzle-orm/pg-core';
import { cellFormats } from '#shared/domain/hold-estimate/types.ts';
import { eachOneOf, id, timestamps, version } from '#server/db/columns.ts';
import { instrumentsTable } from './instrument.table.ts';

/** One row per chamber; the row that is locked before a load of it is written. */
export const chamberSpecsTable = pgTable(
  'chamber_spec',
  {
    instrumentId: integer('instrument_id')
      .primaryKey()
      .references(() => instrumentsTable.id),
    minSetTempMdegc: integer('min_set_temp_mdegc').notNull(),
    maxSetTempMdegc: integer('max_set_temp_mdegc').notNull(),
    idleTempMdegc: integer('idle_temp_mdegc').notNull().default(25_000),
    rampKPerMin: doublePrecision('ramp_k_per_min').notNull(),
    /** Door rule: an opening disturbs the still phases of other loads. */
    strict: boolean('strict').notNull().default(true),
    /** Highest hazard level the chamber protects against, 0 to 7. */
    protectionLevel: integer('protection_level').notNull(),
    maxEnergyWh: doublePrecision('max_energy_wh').notNull(),
    maxCells: integer('max_cells').notNull(),
    version: version(),
    ...timestamps(),
  },
  (t) => [
    unique('chamber_spec_door').on(t.instrumentId, t.strict),
    check('chamber_spec_idle', sql`${t.idleTempMdegc} between 5000 and 40000`),
    check(
      'chamber_spec_span',
      sql`${t.minSetTempMdegc} < ${t.maxSetTempMdegc} and ${t.idleTempMdegc} between ${t.minSetTempMdegc} and ${t.maxSetTempMdegc}`,
    ),
    check(
      'chamber_spec_figures',
      sql`${t.rampKPerMin} > 0 and ${t.protectionLevel} between 0 and 7 and ${t.maxEnergyWh} > 0 and ${t.maxCells} > 0`,
    ),
  ],
);

/** A place in a chamber. What it is not recorded to take, it cannot take. */
export const chamberPositionsTable = pgTable(
  'chamber_position',
  {
    id: id(),
    chamberId: integer('chamber_id')
      .notNull()
      .references(() => chamberSpecsTable.instrumentId),
    /** With the chamber's tag, as people say it: C03/4. */
    label: text('label').notNull().unique('chamber_position_label'),
    formats: text('formats', { enum: cellFormats }).array().notNull(),
    maxAh: doublePrecision('max_ah').notNull(),
    maxHazard: integer('max_hazard').notNull(),
    holder: text('holder'),
    /** What the holder does to the cell's thermal time constant. */
    holderFactor: doublePrecision('holder_factor').notNull().default(1),
    sizeMm: text('size_mm'),
    version: version(),
    ...timestamps(),
  },
  (t) => [
    unique('chamber_position_of_chamber').on(t.id, t.chamberId),
    index('chamber_position_chamber').on(t.chamberId),
    eachOneOf('chamber_position_formats', t.formats, cellFormats),
    check(
      'chamber_position_figures',
      sql`${t.maxAh} > 0 and ${t.maxHazard} between 0 and 7 and ${t.holderFactor} >= 1`,
    ),
  ],
);
