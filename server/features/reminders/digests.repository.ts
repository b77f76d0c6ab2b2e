import { and, asc, eq, sql } from 'drizzle-orm';
import { z } from 'zod';
import type { Reader, Tx } from '#server/db/client.ts';
import { dutiesTable } from '#server/db/tables/calibration.table.ts';
import { channelsTable, meterRangesTable } from '#server/db/tables/channel.table.ts';
import { instrumentsTable } from '#server/db/tables/instrument.table.ts';
import { digestsTable, notificationsTable } from '#server/db/tables/notification.table.ts';
import { personsTable } from '#server/db/tables/person.table.ts';
import { sitesTable } from '#server/db/tables/site.table.ts';

type NewDigest = Pick<
  typeof digestsTable.$inferInsert,
  'personId' | 'siteId' | 'day' | 'messageId' | 'createdAt'
>;

/** The person's digest of the day, made if there is none, and locked. */
export async function openDigest(tx: Tx, digest: NewDigest) {
  const t = digestsTable;
  const made = await tx
    .insert(t)
    .values({ ...digest, state: 'waiting' })
    .onConflictDoNothing({ target: [t.personId, t.siteId, t.day] })
    .returning({ id: t.id });
  const [row] = await tx
    .select({ id: t.id, state: t.state, attempts: t.attempts })
    .from(t)
    .where(and(eq(t.personId, digest.personId), eq(t.siteId, digest.siteId), eq(t.day, digest.day)))
    .for('update');
  if (row === undefined) {
    throw new Error('A digest that was just made is gone.');
  }
  return { ...row, isNew: made.length === 1 };
}

/** Locked, with the person and the site; undefined where there is no such digest. */
export async function lockDigest(tx: Tx, id: number) {
  const t = digestsTable;
  const [row] = await tx
    .select({
      id: t.id,
      state: t.state,
      leaseUntil: t.leaseUntil,
      attempts: t.attempts,
      messageId: t.messageId,
      day: t.day,
      person: {
        id: personsTable.id,
        email: personsTable.email,
        barredAt: personsTable.barredAt,
      },
      site: {
        id: sitesTable.id,
        code: sitesTable.code,
        name: sitesTable.name,
        zone: sitesTable.zone,
      },
    })
    .from(t)
    .innerJoin(personsTable, eq(personsTable.id, t.personId))
    .innerJoin(sitesTable, eq(sitesTable.id, t.siteId))
    .where(eq(t.id, id))
    .for('update', { of: t });
  return row;
}
export type DigestRow = NonNullable<Awaited<ReturnType<typeof lockDigest>>>;

/** What the digest was made for, as far as it still stands; by due day, then tag. */
export async function listStandingItems(db: Reader, digestId: number, siteId: number) {
  const n = notificationsTable;
  return db
    .select({
      dutyKind: dutiesTable.kind,
      dueOn: n.dueOn,
      custodianId: sql<
        number | null
      >`coalesce(${dutiesTable.custodianId}, ${instrumentsTable.custodianId})`,
      tag: instrumentsTable.tag,
      model: instrumentsTable.model,
      channel: channelsTable.label,
      range: meterRangesTable.label,
    })
    .from(n)
    .innerJoin(
      dutiesTable,
      // Done meanwhile, it has another due day.
      and(eq(dutiesTable.id, n.dutyId), eq(dutiesTable.nextDueOn, n.dueOn)),
    )
    .innerJoin(instrumentsTable, eq(instrumentsTable.id, dutiesTable.instrumentId))
    .leftJoin(channelsTable, eq(channelsTable.id, dutiesTable.channelId))
    .leftJoin(meterRangesTable, eq(meterRangesTable.id, dutiesTable.meterRangeId))
    .where(
      and(
        eq(n.digestId, digestId),
        eq(instrumentsTable.siteId, siteId),
        sql`${instrumentsTable.state} <> 'retired'`,
        sql`${dutiesTable.endedAt} is null`,
      ),
    )
    .orderBy(asc(n.dueOn), asc(instrumentsTable.tag), asc(n.id));
}
export type StandingItem = Awaited<ReturnType<typeof listStandingItems>>[number];

export async function leaseDigest(tx: Tx, id: number, until: Date): Promise<void> {
  const t = digestsTable;
  await tx
    .update(t)
    .set({ state: 'sending', leaseUntil: until, attempts: sql`${t.attempts} + 1` })
    .where(eq(t.id, id));
}

export async function dropDigest(tx: Tx, id: number): Promise<void> {
  await tx
    .update(digestsTable)
    .set({ state: 'dropped', leaseUntil: null })
    .where(eq(digestsTable.id, id));
}

function isLeasedUntil(id: number, until: Date) {
  const t = digestsTable;
  return and(eq(t.id, id), eq(t.state, 'sending'), eq(t.leaseUntil, until));
}

/** False where the lease has passed to somebody else. */
export async function markSent(tx: Tx, id: number, lease: Date, at: Date): Promise<boolean> {
  const rows = await tx
    .update(digestsTable)
    .set({ state: 'sent', sentAt: at, leaseUntil: null })
    .where(isLeasedUntil(id, lease))
    .returning({ id: digestsTable.id });
  return rows.length === 1;
}

/** Gives the lease back; its end stays as the moment of the last try. */
export async function releaseDigest(tx: Tx, id: number, lease: Date, at: Date): Promise<void> {
  await tx
    .update(digestsTable)
    .set({ state: 'waiting', leaseUntil: at })
    .where(isLeasedUntil(id, lease));
}

/**
 * Digests left behind: their lease has run out, or nobody has tried for a while. The pause grows from
 * five minutes to six hours, since a mail server that refused one address often may be meant.
 */
export async function listLeftBehind(db: Reader, now: Date, limit: number): Promise<number[]> {
  const t = digestsTable;
  const pause = sql`least(interval '6 hours', interval '5 minutes' * power(2, least(${t.attempts} / 5, 7)))`;
  const rows = await db
    .select({ id: t.id })
    .from(t)
    .where(
      sql`(${t.state} = 'sending' and ${t.leaseUntil} <= ${now.toISOString()})
        or (${t.state} = 'waiting'
          and coalesce(${t.leaseUntil}, ${t.createdAt}) + ${pause} <= ${now.toISOString()})`,
    )
    .orderBy(asc(t.id))
    .limit(limit);
  return rows.map((row) => row.id);
}

export async function isMetrologist(db: Reader, personId: number, siteId: number) {
  const { rows } = await db.execute(sql`
    select exists (
      select from role_grant
      where person_id = ${personId} and role = 'metrologist'
        and (site_id is null or site_id = ${siteId})) as "isOne"`);
  return z.object({ isOne: z.boolean() }).parse(rows[0]).isOne;
}
