import { sql } from 'drizzle-orm';
import {
  boolean,
  check,
  date,
  doublePrecision,
  index,
  integer,
  pgTable,
  text,
} from 'drizzle-orm/pg-core';
import { id, instant, timestamps, version } from '#server/db/columns.ts';
import { chamberSpecsTable } from './chamber.table.ts';
import { filesTable } from './file.table.ts';
import { instrumentsTable } from './instrument.table.ts';
import { personsTable } from './person.table.ts';

/** What a chamber's log showed at one set temperature. */
export const stabilityAssessmentsTable = pgTable(
  'stability_assessment',
  {
    id: id(),
    chamberId: integer('chamber_id')
      .notNull()
      .references(() => chamberSpecsTable.instrumentId),
    setTempMdegc: integer('set_temp_mdegc').notNull(),
    assessedOn: date('assessed_on', { mode: 'string' }).notNull(),
    logFromAt: instant('log_from_at'),
    logToAt: instant('log_to_at'),
    hoursLogged: doublePrecision('hours_logged').notNull(),
    driftKPerH: doublePrecision('drift_k_per_h').notNull(),
    halfBandK: doublePrecision('half_band_k').notNull(),
    periodS: doublePrecision('period_s'),
    resolutionK: doublePrecision('resolution_k').notNull(),
    sensorPlace: text('sensor_place').notNull(),
    loggerId: integer('logger_id').references(() => instrumentsTable.id),
    /** The log showed that an opening at idle temperature stays within the limit. */
    doorTolerant: boolean('door_tolerant').notNull(),
    logFileId: integer('log_file_id').references(() => filesTable.id),
    assessedById: integer('assessed_by_id')
      .notNull()
      .references(() => personsTable.id),
    note: text('note'),
    version: version(),
    ...timestamps(),
  },
  (t) => [
    check('stability_assessment_span', sql`${t.logToAt} > ${t.logFromAt}`),
    check(
      'stability_assessment_figures',
      sql`${t.hoursLogged} > 0 and ${t.driftKPerH} >= 0 and ${t.halfBandK} >= 0 and ${t.periodS} > 0 and ${t.resolutionK} > 0`,
    ),
    index('stability_assessment_chamber').on(t.chamberId, t.setTempMdegc, t.assessedOn),
    index('stability_assessment_logger').on(t.loggerId),
  ],
);
