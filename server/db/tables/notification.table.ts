import { sql } from 'drizzle-orm';
import { check, date, index, integer, pgTable, text, unique } from 'drizzle-orm/pg-core';
import { digestStates } from '#shared/domain/states.ts';
import { id, instant, oneOf } from '#server/db/columns.ts';
import { dutiesTable } from './calibration.table.ts';
import { personsTable } from './person.table.ts';
import { sitesTable } from './site.table.ts';

/** One mail to a person for a site's day. */
export const digestsTable = pgTable(
  'digest',
  {
    id: id(),
    personId: integer('person_id')
      .notNull()
      .references(() => personsTable.id),
    siteId: integer('site_id')
      .notNull()
      .references(() => sitesTable.id),
    day: date('day', { mode: 'string' }).notNull(),
    messageId: text('message_id').notNull().unique('digest_message_id'),
    state: text('state', { enum: digestStates }).notNull(),
    attempts: integer('attempts').notNull().default(0),
    leaseUntil: instant('lease_until'),
    sentAt: instant('sent_at'),
    createdAt: instant('created_at').notNull(),
  },
  (t) => [
    oneOf('digest_state', t.state, digestStates),
    check('digest_sent', sql`(${t.state} = 'sent') = (${t.sentAt} is not null)`),
    unique('digest_day').on(t.personId, t.siteId, t.day),
    index('digest_unsent')
      .on(t.id)
      .where(sql`${t.state} in ('waiting', 'sending')`),
  ],
);

/** One reason to write to a person about a duty. */
export const notificationsTable = pgTable(
  'notification',
  {
    id: id(),
    dutyId: integer('duty_id')
      .notNull()
      .references(() => dutiesTable.id),
    dueOn: date('due_on', { mode: 'string' }).notNull(),
    /** Which lead time or which week overdue. */
    reason: text('reason').notNull(),
    personId: integer('person_id')
      .notNull()
      .references(() => personsTable.id),
    digestId: integer('digest_id')
      .notNull()
      .references(() => digestsTable.id),
    createdAt: instant('created_at').notNull(),
  },
  (t) => [
    unique('notification_once').on(t.dutyId, t.dueOn, t.reason, t.personId),
    index('notification_digest').on(t.digestId),
    index('notification_person').on(t.personId),
  ],
);
