import type { Db } from '#server/db/client.ts';
import { sitesTable } from '#server/db/tables/site.table.ts';

type SiteWish = { readonly code?: string; readonly name?: string; readonly zone?: string };

const officeDay = [{ fromMin: 480, toMin: 1080 }];

/** A site that works Monday to Friday, 08:00 to 18:00. */
export async function buildSite(db: Db, wish: SiteWish = {}) {
  const at = new Date('2026-01-05T09:00:00Z');
  const code = wish.code ?? 'larkfen';
  const [site] = await db
    .insert(sitesTable)
    .values({
      code,
      name: wish.name ?? code,
      zone: wish.zone ?? 'Europe/Dublin',
      workingHours: {
        '1': officeDay,
        '2': officeDay,
        '3': officeDay,
        '4': officeDay,
        '5': officeDay,
      },
      createdAt: at,
      updatedAt: at,
    })
    .returning();
  if (site === undefined) {
    throw new Error('No site was made.');
  }
  return site;
}
