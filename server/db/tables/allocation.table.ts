import { sql } from 'drizzle-orm';
import { boolean, check, index, integer, pgTable } from 'drizzle-orm/pg-core';
import { id, instant, properRange, tstzrange } from '#server/db/columns.ts';
import { bookingsTable } from './booking.table.ts';
import { otherWorkTable } from './other-work.table.ts';
import { outagesTable } from './outage.table.ts';
import { unitsTable } from './unit.table.ts';

/** One unit taken over one half-open span: the plan. No two live ones of a unit overlap. */
export const allocationsTable = pgTable(
  'allocation',
  {
    id: id(),
    unitId: integer('unit_id')
      .notNull()
      .references(() => unitsTable.id),
    during: tstzrange('during').notNull(),
    live: boolean('live').notNull(),
    bookingId: integer('booking_id').references(() => bookingsTable.id),
    outageId: integer('outage_id').references(() => outagesTable.id),
    otherWorkId: integer('other_work_id').references(() => otherWorkTable.id),
    createdAt: instant('created_at').notNull(),
  },
  (t) => [
    properRange('allocation_during', t.during),
    check(
      'allocation_has_one_reason',
      sql`num_nonnulls(${t.bookingId}, ${t.outageId}, ${t.otherWorkId}) = 1`,
    ),
    index('allocation_window')
      .using('gist', t.during)
      .where(sql`${t.live}`),
    index('allocation_booking').on(t.bookingId),
    index('allocation_outage').on(t.outageId),
    index('allocation_other_work').on(t.otherWorkId),
  ],
);
