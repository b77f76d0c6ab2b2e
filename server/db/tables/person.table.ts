import { index, integer, pgTable, text, unique } from 'drizzle-orm/pg-core';
import { roles } from '#shared/domain/policies/actions.ts';
import { grantOrigins } from '#shared/domain/states.ts';
import { id, instant, oneOf, timestamps, version } from '#server/db/columns.ts';
import { sitesTable } from './site.table.ts';

export const personsTable = pgTable(
  'person',
  {
    id: id(),
    providerKey: text('provider_key').notNull(),
    sub: text('sub').notNull(),
    name: text('name').notNull(),
    email: text('email'),
    lastSignedInAt: instant('last_signed_in_at'),
    /** Set when an administrator barred the person. */
    barredAt: instant('barred_at'),
    version: version(),
    ...timestamps(),
  },
  (t) => [unique('person_identity').on(t.providerKey, t.sub), index('person_name').on(t.name)],
);

/** A role at one site, or everywhere when no site is named. */
export const grantsTable = pgTable(
  'role_grant',
  {
    id: id(),
    personId: integer('person_id')
      .notNull()
      .references(() => personsTable.id),
    role: text('role', { enum: roles }).notNull(),
    siteId: integer('site_id').references(() => sitesTable.id),
    origin: text('origin', { enum: grantOrigins }).notNull(),
    grantedById: integer('granted_by_id').references(() => personsTable.id),
    createdAt: instant('created_at').notNull(),
  },
  (t) => [
    oneOf('role_grant_role', t.role, roles),
    oneOf('role_grant_origin', t.origin, grantOrigins),
    unique('role_grant_once').on(t.personId, t.role, t.siteId, t.origin).nullsNotDistinct(),
    index('role_grant_site').on(t.siteId),
  ],
);
