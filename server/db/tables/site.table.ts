import { sql } from 'drizzle-orm';
import { check, date, doublePrecision, integer, pgTable, text, unique } from 'drizzle-orm/pg-core';
import { checkedJson, id, timestamps, version } from '#server/db/columns.ts';
import { dayHoursSchema, weekHoursSchema } from '#server/db/json-shapes.ts';

export const sitesTable = pgTable(
  'site',
  {
    id: id(),
    /** Stands in addresses: `/api/sites/<code>/…`. */
    code: text('code').notNull().unique('site_code'),
    name: text('name').notNull(),
    /** IANA name, e.g. Europe/Dublin. */
    zone: text('zone').notNull(),
    workingHours: checkedJson('working_hours', weekHoursSchema).notNull(),
    version: version(),
    ...timestamps(),
  },
  (t) => [check('site_code_is_slug', sql`${t.code} ~ '^[a-z][a-z0-9-]*$'`)],
);

/** A date whose hours differ from the week's; no hours is a closed day. */
export const siteCalendarExceptionsTable = pgTable(
  'site_calendar_exception',
  {
    id: id(),
    siteId: integer('site_id')
      .notNull()
      .references(() => sitesTable.id),
    day: date('day', { mode: 'string' }).notNull(),
    hours: checkedJson('hours', dayHoursSchema).notNull(),
    reason: text('reason').notNull(),
    version: version(),
    ...timestamps(),
  },
  (t) => [unique('site_calendar_exception_day').on(t.siteId, t.day)],
);

export const roomsTable = pgTable(
  'room',
  {
    id: id(),
    siteId: integer('site_id')
      .notNull()
      .references(() => sitesTable.id),
    name: text('name').notNull(),
    maxEnergyWh: doublePrecision('max_energy_wh'),
    /** How far the room's temperature strays from its middle; drives source and meter drift. */
    temperatureSwingK: doublePrecision('temperature_swing_k'),
    note: text('note'),
    version: version(),
    ...timestamps(),
  },
  (t) => [
    unique('room_name').on(t.siteId, t.name),
    check('room_energy', sql`${t.maxEnergyWh} > 0`),
    check('room_swing', sql`${t.temperatureSwingK} >= 0`),
  ],
);
