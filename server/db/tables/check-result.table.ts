import { sql } from 'drizzle-orm';
import { check, index, integer, jsonb, pgTable, text } from 'drizzle-orm/pg-core';
import { checkCodes, checkOutcomes } from '#shared/domain/checks/types.ts';
import { checkStages, deviationStates } from '#shared/domain/states.ts';
import { id, instant, oneOf, timestamps, version } from '#server/db/columns.ts';
import { bookingsTable } from './booking.table.ts';
import { personsTable } from './person.table.ts';
import { requestsTable } from './request.table.ts';

/** A booking's checks as they stood when they were run. */
export const checkResultsTable = pgTable(
  'check_result',
  {
    id: id(),
    bookingId: integer('booking_id')
      .notNull()
      .references(() => bookingsTable.id),
    runAt: instant('run_at').notNull(),
    stage: text('stage', { enum: checkStages }).notNull(),
    code: text('code', { enum: checkCodes }).notNull(),
    outcome: text('outcome', { enum: checkOutcomes }).notNull(),
    sentence: text('sentence').notNull(),
    /** Evidence, ways out and the share of the limit used. */
    evidence: jsonb('evidence').notNull(),
  },
  (t) => [
    oneOf('check_result_stage', t.stage, checkStages),
    oneOf('check_result_outcome', t.outcome, checkOutcomes),
    index('check_result_booking').on(t.bookingId, t.runAt),
  ],
);

/** A check lifted beforehand, with reason, by somebody other than the one who asked. */
export const deviationsTable = pgTable(
  'deviation',
  {
    id: id(),
    requestId: integer('request_id').references(() => requestsTable.id),
    bookingId: integer('booking_id').references(() => bookingsTable.id),
    checkCode: text('check_code', { enum: checkCodes }).notNull(),
    state: text('state', { enum: deviationStates }).notNull(),
    /** Why it was asked for. */
    reason: text('reason').notNull(),
    decisionReason: text('decision_reason'),
    /** How the customer agreed; needed for reported work. */
    customerAcceptance: text('customer_acceptance'),
    requestedById: integer('requested_by_id')
      .notNull()
      .references(() => personsTable.id),
    requestedAt: instant('requested_at').notNull(),
    decidedById: integer('decided_by_id').references(() => personsTable.id),
    decidedAt: instant('decided_at'),
    expiresAt: instant('expires_at'),
    version: version(),
    ...timestamps(),
  },
  (t) => [
    check('deviation_of_one', sql`num_nonnulls(${t.requestId}, ${t.bookingId}) = 1`),
    check('deviation_by_another', sql`${t.requestedById} <> ${t.decidedById}`),
    check('deviation_span', sql`${t.expiresAt} > ${t.decidedAt}`),
    check(
      'deviation_decided',
      sql`${t.state} = 'asked' or (${t.decidedById} is not null and ${t.decidedAt} is not null)`,
    ),
    oneOf('deviation_state', t.state, deviationStates),
    index('deviation_request').on(t.requestId),
    index('deviation_booking').on(t.bookingId),
  ],
);
