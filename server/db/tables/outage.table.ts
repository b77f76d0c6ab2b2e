import { sql } from 'drizzle-orm';
import { check, index, integer, pgTable, primaryKey, text } from 'drizzle-orm/pg-core';
import { outageStates, unavailabilityReasons } from '#shared/domain/states.ts';
import {
  id,
  instant,
  oneOf,
  properRange,
  timestamps,
  tstzrange,
  version,
} from '#server/db/columns.ts';
import { instrumentsTable } from './instrument.table.ts';
import { personsTable } from './person.table.ts';
import { sitesTable } from './site.table.ts';
import { unitsTable } from './unit.table.ts';

/** A planned time out of use; it takes its units like a booking does. */
export const outagesTable = pgTable(
  'outage',
  {
    id: id(),
    siteId: integer('site_id')
      .notNull()
      .references(() => sitesTable.id),
    title: text('title').notNull(),
    reason: text('reason'),
    state: text('state', { enum: outageStates }).notNull(),
    during: tstzrange('during').notNull(),
    plannedById: integer('planned_by_id')
      .notNull()
      .references(() => personsTable.id),
    version: version(),
    ...timestamps(),
  },
  (t) => [
    oneOf('outage_state', t.state, outageStates),
    properRange('outage_during', t.during),
    index('outage_window').using('gist', t.siteId, t.during),
  ],
);

/** The instruments an outage was planned for; its units are its allocations. */
export const outageInstrumentsTable = pgTable(
  'outage_instrument',
  {
    outageId: integer('outage_id')
      .notNull()
      .references(() => outagesTable.id),
    instrumentId: integer('instrument_id')
      .notNull()
      .references(() => instrumentsTable.id),
  },
  (t) => [
    primaryKey({ name: 'outage_instrument_pk', columns: [t.outageId, t.instrumentId] }),
    index('outage_instrument_instrument').on(t.instrumentId),
  ],
);

/** Something broke or was withdrawn: never refused, but it puts bookings at risk. */
export const unavailabilitiesTable = pgTable(
  'unavailability',
  {
    id: id(),
    instrumentId: integer('instrument_id').references(() => instrumentsTable.id),
    unitId: integer('unit_id').references(() => unitsTable.id),
    reason: text('reason', { enum: unavailabilityReasons }).notNull(),
    note: text('note').notNull(),
    startsAt: instant('starts_at').notNull(),
    /** Open until somebody says that it works again. */
    endsAt: instant('ends_at'),
    reportedById: integer('reported_by_id')
      .notNull()
      .references(() => personsTable.id),
    endedById: integer('ended_by_id').references(() => personsTable.id),
    version: version(),
    ...timestamps(),
  },
  (t) => [
    oneOf('unavailability_reason', t.reason, unavailabilityReasons),
    check('unavailability_of_one', sql`num_nonnulls(${t.instrumentId}, ${t.unitId}) = 1`),
    check('unavailability_span', sql`${t.endsAt} >= ${t.startsAt}`),
    index('unavailability_instrument').on(t.instrumentId, t.startsAt),
    index('unavailability_unit').on(t.unitId, t.startsAt),
  ],
);
