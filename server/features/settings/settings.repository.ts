import { and, asc, eq, sql } from 'drizzle-orm';
import type { Reader, Tx } from '#server/db/client.ts';
import { personsTable } from '#server/db/tables/person.table.ts';
import { settingsTable } from '#server/db/tables/setting.table.ts';
import { siteCalendarExceptionsTable, sitesTable } from '#server/db/tables/site.table.ts';
import type { DayHours } from '#shared/domain/facility/types.ts';

const siteColumns = {
  id: sitesTable.id,
  code: sitesTable.code,
  name: sitesTable.name,
  zone: sitesTable.zone,
};

export async function findSiteRow(db: Reader, code: string) {
  const [row] = await db.select(siteColumns).from(sitesTable).where(eq(sitesTable.code, code));
  return row ?? null;
}

export async function listSiteRows(db: Reader) {
  return db.select(siteColumns).from(sitesTable).orderBy(asc(sitesTable.code));
}

export async function listSettingRows(db: Reader, siteId: number) {
  const rows = await db
    .select({ setting: settingsTable, changedBy: personsTable.name })
    .from(settingsTable)
    .leftJoin(personsTable, eq(personsTable.id, settingsTable.changedById))
    .where(eq(settingsTable.siteId, siteId))
    .orderBy(asc(settingsTable.key));
  return rows.map(({ setting, changedBy }) => ({ ...setting, changedBy }));
}
export type SettingRow = Awaited<ReturnType<typeof listSettingRows>>[number];

type SettingChange = {
  readonly siteId: number;
  readonly key: string;
  readonly value: unknown;
  readonly changedById: number;
  readonly at: Date;
};

/** False where somebody set it meanwhile. */
export async function insertSetting(tx: Tx, change: SettingChange): Promise<boolean> {
  const { at, ...values } = change;
  const rows = await tx
    .insert(settingsTable)
    .values({ ...values, createdAt: at, updatedAt: at })
    .onConflictDoNothing()
    .returning({ id: settingsTable.id });
  return rows.length === 1;
}

/** False where the row is no longer at the version seen. */
export async function updateSetting(
  tx: Tx,
  change: SettingChange,
  version: number,
): Promise<boolean> {
  const rows = await tx
    .update(settingsTable)
    .set({
      value: change.value,
      changedById: change.changedById,
      updatedAt: change.at,
      version: sql`${settingsTable.version} + 1`,
    })
    .where(
      and(
        eq(settingsTable.siteId, change.siteId),
        eq(settingsTable.key, change.key),
        eq(settingsTable.version, version),
      ),
    )
    .returning({ id: settingsTable.id });
  return rows.length === 1;
}

export async function getHoursRows(db: Reader, siteId: number) {
  const [site] = await db.select().from(sitesTable).where(eq(sitesTable.id, siteId));
  if (site === undefined) {
    throw new Error(`Site ${siteId} is gone.`);
  }
  const exceptions = await db
    .select()
    .from(siteCalendarExceptionsTable)
    .where(eq(siteCalendarExceptionsTable.siteId, siteId))
    .orderBy(asc(siteCalendarExceptionsTable.day));
  return { site, exceptions };
}
export type HoursRows = Awaited<ReturnType<typeof getHoursRows>>;

export async function updateWeekHours(
  tx: Tx,
  change: {
    readonly siteId: number;
    readonly hours: (typeof sitesTable.$inferInsert)['workingHours'];
    readonly version: number;
    readonly at: Date;
  },
): Promise<boolean> {
  const rows = await tx
    .update(sitesTable)
    .set({
      workingHours: change.hours,
      updatedAt: change.at,
      version: sql`${sitesTable.version} + 1`,
    })
    .where(and(eq(sitesTable.id, change.siteId), eq(sitesTable.version, change.version)))
    .returning({ id: sitesTable.id });
  return rows.length === 1;
}

export async function replaceExceptions(
  tx: Tx,
  siteId: number,
  exceptions: readonly { day: string; hours: DayHours[]; reason: string }[],
  at: Date,
): Promise<void> {
  const t = siteCalendarExceptionsTable;
  await tx.delete(t).where(eq(t.siteId, siteId));
  if (exceptions.length > 0) {
    await tx
      .insert(t)
      .values(exceptions.map((entry) => ({ ...entry, siteId, createdAt: at, updatedAt: at })));
  }
}
