import { sql } from 'drizzle-orm';
import { bigint, check, index, integer, jsonb, pgTable, text, unique } from 'drizzle-orm/pg-core';
import { instant } from '#server/db/columns.ts';
import { personsTable } from './person.table.ts';
import { sitesTable } from './site.table.ts';

/** Append-only. Written unsealed; a sealer chains committed rows by hash, once each. */
export const auditEventsTable = pgTable(
  'audit_event',
  {
    id: bigint('id', { mode: 'number' }).primaryKey().generatedAlwaysAsIdentity(),
    at: instant('at').notNull(),
    /** Nobody where the system itself acted. */
    actorId: integer('actor_id').references(() => personsTable.id),
    siteId: integer('site_id').references(() => sitesTable.id),
    action: text('action').notNull(),
    subjectKind: text('subject_kind').notNull(),
    subjectId: integer('subject_id'),
    before: jsonb('before'),
    after: jsonb('after'),
    requestId: text('request_id'),
    sealNo: bigint('seal_no', { mode: 'number' }),
    prevHash: text('prev_hash'),
    hash: text('hash'),
  },
  (t) => [
    unique('audit_event_seal_no').on(t.sealNo),
    check(
      'audit_event_sealed_whole',
      sql`num_nonnulls(${t.sealNo}, ${t.prevHash}, ${t.hash}) in (0, 3)`,
    ),
    index('audit_event_subject').on(t.subjectKind, t.subjectId, t.id),
    index('audit_event_site').on(t.siteId, t.id),
    index('audit_event_actor').on(t.actorId, t.id),
    index('audit_event_unsealed')
      .on(t.id)
      .where(sql`${t.sealNo} is null`),
  ],
);
