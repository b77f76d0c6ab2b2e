import { sql } from 'drizzle-orm';
import { index, integer, jsonb, pgTable, text } from 'drizzle-orm/pg-core';
import { id, instant } from '#server/db/columns.ts';

/** An effect that leaves the database, written in the transaction of its cause. */
export const outboxTable = pgTable(
  'outbox',
  {
    id: id(),
    topic: text('topic').notNull(),
    payload: jsonb('payload').notNull(),
    createdAt: instant('created_at').notNull(),
    relayedAt: instant('relayed_at'),
    attempts: integer('attempts').notNull().default(0),
    lastError: text('last_error'),
    requestId: text('request_id'),
  },
  (t) => [
    index('outbox_waiting')
      .on(t.id)
      .where(sql`${t.relayedAt} is null`),
  ],
);
