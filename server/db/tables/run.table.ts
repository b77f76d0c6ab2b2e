import { sql } from 'drizzle-orm';
import { check, index, integer, jsonb, pgTable, text } from 'drizzle-orm/pg-core';
import { loadPhases } from '#shared/domain/hold-estimate/types.ts';
import { runEndReasons, runEventKinds } from '#shared/domain/states.ts';
import { id, instant, oneOf, timestamps, version } from '#server/db/columns.ts';
import { bookingsTable } from './booking.table.ts';
import { personsTable } from './person.table.ts';

/** What really happened; the booking stays the plan. */
export const runsTable = pgTable(
  'run',
  {
    id: id(),
    bookingId: integer('booking_id')
      .notNull()
      .unique('run_booking')
      .references(() => bookingsTable.id),
    startedAt: instant('started_at').notNull(),
    endedAt: instant('ended_at'),
    endReason: text('end_reason', { enum: runEndReasons }),
    observedSettleS: integer('observed_settle_s'),
    note: text('note'),
    startedById: integer('started_by_id')
      .notNull()
      .references(() => personsTable.id),
    version: version(),
    ...timestamps(),
  },
  (t) => [
    oneOf('run_end_reason', t.endReason, runEndReasons),
    check('run_span', sql`${t.endedAt} > ${t.startedAt}`),
    check('run_end_has_reason', sql`(${t.endedAt} is null) = (${t.endReason} is null)`),
    check('run_settle', sql`${t.observedSettleS} >= 0`),
  ],
);

export const runEventsTable = pgTable(
  'run_event',
  {
    id: id(),
    runId: integer('run_id')
      .notNull()
      .references(() => runsTable.id),
    at: instant('at').notNull(),
    kind: text('kind', { enum: runEventKinds }).notNull(),
    phase: text('phase', { enum: loadPhases }),
    detail: jsonb('detail').notNull(),
    recordedById: integer('recorded_by_id')
      .notNull()
      .references(() => personsTable.id),
    createdAt: instant('created_at').notNull(),
  },
  (t) => [
    oneOf('run_event_kind', t.kind, runEventKinds),
    oneOf('run_event_phase', t.phase, loadPhases),
    index('run_event_run').on(t.runId, t.at),
  ],
);
