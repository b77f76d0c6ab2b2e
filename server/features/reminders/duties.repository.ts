import { and, asc, eq, exists, inArray, isNotNull, isNull, lte, ne, or, sql } from 'drizzle-orm';
import type { Reader, Tx } from '#server/db/client.ts';
import { dutiesTable } from '#server/db/tables/calibration.table.ts';
import { instrumentsTable } from '#server/db/tables/instrument.table.ts';
import { digestsTable, notificationsTable } from '#server/db/tables/notification.table.ts';
import { grantsTable, personsTable } from '#server/db/tables/person.table.ts';
import { sitesTable } from '#server/db/tables/site.table.ts';

export async function findReminderSite(db: Reader, siteId: number) {
  const [row] = await db
    .select({
      id: sitesTable.id,
      code: sitesTable.code,
      name: sitesTable.name,
      zone: sitesTable.zone,
    })
    .from(sitesTable)
    .where(eq(sitesTable.id, siteId));
  return row ?? null;
}

/** Who keeps the instrument, unless the duty names somebody else. */
const custodianId = sql<
  number | null
>`coalesce(${dutiesTable.custodianId}, ${instrumentsTable.custodianId})`;

/** Duties of the site's instruments that fall due on or before a day. */
export async function listDutiesDueBy(db: Reader, siteId: number, day: string) {
  const rows = await db
    .select({ id: dutiesTable.id, dueOn: dutiesTable.nextDueOn, custodianId })
    .from(dutiesTable)
    .innerJoin(instrumentsTable, eq(instrumentsTable.id, dutiesTable.instrumentId))
    .where(
      and(
        eq(instrumentsTable.siteId, siteId),
        ne(instrumentsTable.state, 'retired'),
        isNull(dutiesTable.endedAt),
        isNotNull(dutiesTable.nextDueOn),
        lte(dutiesTable.nextDueOn, day),
      ),
    )
    .orderBy(asc(dutiesTable.id));
  return rows.flatMap(({ dueOn, ...row }) => (dueOn === null ? [] : [{ ...row, dueOn }]));
}
export type DueDuty = Awaited<ReturnType<typeof listDutiesDueBy>>[number];

function isMetrologistAt(db: Reader, siteId: number) {
  return exists(
    db
      .select({ one: sql`1` })
      .from(grantsTable)
      .where(
        and(
          eq(grantsTable.personId, personsTable.id),
          eq(grantsTable.role, 'metrologist'),
          or(isNull(grantsTable.siteId), eq(grantsTable.siteId, siteId)),
        ),
      ),
  );
}

/** Those of the named people, and the site's metrologists, to whom mail can go. */
export async function listRecipients(db: Reader, siteId: number, named: readonly number[]) {
  const isMetrologist = isMetrologistAt(db, siteId);
  return db
    .select({
      id: personsTable.id,
      isMetrologist: sql<boolean>`${isMetrologist}`,
    })
    .from(personsTable)
    .where(
      and(
        isNull(personsTable.barredAt),
        isNotNull(personsTable.email),
        named.length === 0
          ? isMetrologist
          : or(isMetrologist, inArray(personsTable.id, [...named])),
      ),
    )
    .orderBy(asc(personsTable.id));
}

/** What people were already told about these duties. A digest that was dropped told nobody. */
export async function listTold(db: Reader, dutyIds: readonly number[]) {
  if (dutyIds.length === 0) {
    return [];
  }
  return db
    .select({
      dutyId: notificationsTable.dutyId,
      dueOn: notificationsTable.dueOn,
      reason: notificationsTable.reason,
      personId: notificationsTable.personId,
    })
    .from(notificationsTable)
    .innerJoin(digestsTable, eq(digestsTable.id, notificationsTable.digestId))
    .where(
      and(inArray(notificationsTable.dutyId, [...dutyIds]), ne(digestsTable.state, 'dropped')),
    );
}

export type NewNotification = Pick<
  typeof notificationsTable.$inferInsert,
  'dutyId' | 'dueOn' | 'reason' | 'personId' | 'digestId' | 'createdAt'
>;

/** A reason once given stays with its digest, except where that was dropped. */
export async function insertNotifications(
  tx: Tx,
  notifications: readonly NewNotification[],
): Promise<void> {
  const t = notificationsTable;
  await tx
    .insert(t)
    .values([...notifications])
    .onConflictDoUpdate({
      target: [t.dutyId, t.dueOn, t.reason, t.personId],
      set: { digestId: sql`excluded.digest_id`, createdAt: sql`excluded.created_at` },
      setWhere: sql`exists (
        select from digest where digest.id = ${t.digestId} and digest.state = 'dropped')`,
    });
}
