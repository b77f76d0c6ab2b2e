import { sql } from 'drizzle-orm';
import { check, index, integer, pgTable, primaryKey, text } from 'drizzle-orm/pg-core';
import { bytea, id, instant } from '#server/db/columns.ts';
import { personsTable } from './person.table.ts';
import { projectsTable } from './project.table.ts';
import { sitesTable } from './site.table.ts';

export const filesTable = pgTable(
  'file',
  {
    id: id(),
    siteId: integer('site_id')
      .notNull()
      .references(() => sitesTable.id),
    /** Set where only the project's members may read it. */
    projectId: integer('project_id').references(() => projectsTable.id),
    name: text('name').notNull(),
    /** Told from the content, never from the name. */
    mediaType: text('media_type').notNull(),
    sizeBytes: integer('size_bytes').notNull(),
    sha256: text('sha256').notNull(),
    uploadedById: integer('uploaded_by_id')
      .notNull()
      .references(() => personsTable.id),
    createdAt: instant('created_at').notNull(),
  },
  (t) => [
    check('file_size', sql`${t.sizeBytes} > 0`),
    check('file_sha256', sql`${t.sha256} ~ '^[0-9a-f]{64}$'`),
    index('file_sha256_index').on(t.sha256),
    index('file_site').on(t.siteId),
  ],
);

/** A file's content in pieces of at most 1 MiB. */
export const fileChunksTable = pgTable(
  'file_chunk',
  {
    fileId: integer('file_id')
      .notNull()
      .references(() => filesTable.id, { onDelete: 'cascade' }),
    seq: integer('seq').notNull(),
    bytes: bytea('bytes').notNull(),
  },
  (t) => [
    primaryKey({ name: 'file_chunk_pk', columns: [t.fileId, t.seq] }),
    check('file_chunk_size', sql`octet_length(${t.bytes}) between 1 and 1048576`),
    check('file_chunk_seq', sql`${t.seq} >= 0`),
  ],
);
