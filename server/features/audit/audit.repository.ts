import { and, desc, eq, gte, lt } from 'drizzle-orm';
import type { Reader, Tx } from '#server/db/client.ts';
import { auditEventsTable } from '#server/db/tables/audit.table.ts';
import { personsTable } from '#server/db/tables/person.table.ts';

type NewAuditEvent = typeof auditEventsTable.$inferInsert;

export async function insertAuditEvent(tx: Tx, event: NewAuditEvent): Promise<void> {
  await tx.insert(auditEventsTable).values(event);
}

export type AuditFilter = {
  readonly siteId: number;
  readonly subjectKind?: string;
  readonly subjectId?: number;
  readonly actorId?: number;
  readonly action?: string;
  readonly from?: string;
  readonly to?: string;
};

/** Newest first. */
export async function listAuditRows(
  db: Reader,
  filter: AuditFilter,
  beforeId: number | undefined,
  limit: number,
) {
  const t = auditEventsTable;
  return db
    .select({ event: t, actorName: personsTable.name })
    .from(t)
    .leftJoin(personsTable, eq(personsTable.id, t.actorId))
    .where(
      and(
        eq(t.siteId, filter.siteId),
        beforeId === undefined ? undefined : lt(t.id, beforeId),
        filter.subjectKind === undefined ? undefined : eq(t.subjectKind, filter.subjectKind),
        filter.subjectId === undefined ? undefined : eq(t.subjectId, filter.subjectId),
        filter.actorId === undefined ? undefined : eq(t.actorId, filter.actorId),
        filter.action === undefined ? undefined : eq(t.action, filter.action),
        filter.from === undefined ? undefined : gte(t.at, new Date(filter.from)),
        filter.to === undefined ? undefined : lt(t.at, new Date(filter.to)),
      ),
    )
    .orderBy(desc(t.id))
    .limit(limit);
}
export type AuditRow = Awaited<ReturnType<typeof listAuditRows>>[number];
