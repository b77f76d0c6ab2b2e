import { index, integer, jsonb, pgTable, primaryKey, text, uuid } from 'drizzle-orm/pg-core';
import { instant } from '#server/db/columns.ts';
import { personsTable } from './person.table.ts';

/** The answer a creating call got, so that a repeat gets it again. */
export const idempotencyKeysTable = pgTable(
  'idempotency_key',
  {
    personId: integer('person_id')
      .notNull()
      .references(() => personsTable.id),
    key: uuid('key').notNull(),
    contract: text('contract').notNull(),
    requestHash: text('request_hash').notNull(),
    /** Missing while the first call is still being answered. */
    status: integer('status'),
    response: jsonb('response'),
    createdAt: instant('created_at').notNull(),
  },
  (t) => [
    primaryKey({ name: 'idempotency_key_pk', columns: [t.personId, t.key] }),
    index('idempotency_key_created').on(t.createdAt),
  ],
);
