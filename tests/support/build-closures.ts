import type { Db } from '#server/db/client.ts';
import { allocationsTable } from '#server/db/tables/allocation.table.ts';
import { chamberLoadsTable, loadPhasesTable } from '#server/db/tables/load.table.ts';
import { otherWorkTable } from '#server/db/tables/other-work.table.ts';
import { outageInstrumentsTable, outagesTable } from '#server/db/tables/outage.table.ts';
import { first } from './build-bookable.ts';

const at = new Date('2026-02-20T09:00:00Z');
const stamps = { createdAt: at, updatedAt: at };

type Stretch = {
  readonly siteId: number;
  readonly plannedById: number;
  readonly title: string;
  readonly from: string;
  readonly to: string;
  readonly unitIds: readonly number[];
};

function spanOf({ from, to }: Stretch) {
  return { startMs: Date.parse(from), endMs: Date.parse(to) };
}

/** A planned outage of instruments that takes the units given. */
export async function buildOutage(
  db: Db,
  wish: Stretch & { readonly instrumentIds: readonly number[] },
): Promise<number> {
  const { siteId, plannedById, title } = wish;
  const during = spanOf(wish);
  const outageId = first(
    await db
      .insert(outagesTable)
      .values({ siteId, title, plannedById, state: 'planned', during, ...stamps })
      .returning({ id: outagesTable.id }),
  );
  await db
    .insert(outageInstrumentsTable)
    .values(wish.instrumentIds.map((instrumentId) => ({ outageId, instrumentId })));
  await db
    .insert(allocationsTable)
    .values(
      wish.unitIds.map((unitId) => ({ unitId, during, live: true, outageId, createdAt: at })),
    );
  return outageId;
}

/** Ageing in a strict chamber at one temperature that takes the positions given. */
export async function buildOtherWork(
  db: Db,
  wish: Stretch & {
    readonly chamberId: number;
    readonly setTempMdegc: number;
    readonly projectId?: number;
  },
): Promise<number> {
  const { siteId, plannedById, title, chamberId, setTempMdegc } = wish;
  const during = spanOf(wish);
  const chamber = { chamberId, strict: true, live: true, setTempMdegc };
  const loadId = first(
    await db
      .insert(chamberLoadsTable)
      .values({ ...chamber, state: 'closed', ...stamps })
      .returning({ id: chamberLoadsTable.id }),
  );
  await db.insert(loadPhasesTable).values({ ...chamber, loadId, seq: 0, phase: 'hold', during });
  const otherWorkId = first(
    await db
      .insert(otherWorkTable)
      .values({
        siteId,
        loadId,
        projectId: wish.projectId ?? null,
        kind: 'ageing',
        title,
        cellCount: wish.unitIds.length,
        during,
        plannedById,
        ...stamps,
      })
      .returning({ id: otherWorkTable.id }),
  );
  await db
    .insert(allocationsTable)
    .values(
      wish.unitIds.map((unitId) => ({ unitId, during, live: true, otherWorkId, createdAt: at })),
    );
  return otherWorkId;
}
