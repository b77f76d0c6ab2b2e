import type { Db } from '#server/db/client.ts';
import { cellTypesTable, cellsTable } from '#server/db/tables/cell.table.ts';
import { projectMembersTable, projectsTable } from '#server/db/tables/project.table.ts';
import {
  requestLotCellsTable,
  requestLotsTable,
  requestsTable,
} from '#server/db/tables/request.table.ts';
import { randomBytes } from 'node:crypto';
import { first } from './build-bookable.ts';

const at = new Date('2026-02-20T09:00:00Z');
const stamps = { createdAt: at, updatedAt: at };

/** A project with its members. */
export async function buildProject(db: Db, memberIds: readonly number[] = []): Promise<number> {
  const code = `P-${randomBytes(4).toString('hex')}`;
  const projectId = first(
    await db
      .insert(projectsTable)
      .values({ code, name: `Project ${code}`, ...stamps })
      .returning({ id: projectsTable.id }),
  );
  if (memberIds.length > 0) {
    await db
      .insert(projectMembersTable)
      .values(memberIds.map((personId) => ({ projectId, personId, createdAt: at })));
  }
  return projectId;
}

/** A released 3.5 Ah cylindrical NMC cell, as in the estimate's own worked examples. */
export async function buildCellType(
  db: Db,
  safetyOfficerId: number,
  change: Partial<typeof cellTypesTable.$inferInsert> = {},
): Promise<number> {
  return first(
    await db
      .insert(cellTypesTable)
      .values({
        name: `LF-35 ${randomBytes(4).toString('hex')}`,
        cellClass: 'cylindrical',
        format: '18650',
        chemistry: 'nmc811',
        capacityAh: 3.5,
        nominalV: 3.6,
        minV: 2.5,
        maxV: 4.2,
        minStorageC: -20,
        maxStorageC: 50,
        minTestC: -10,
        maxTestC: 60,
        maxHoldStateOfChargePct: 80,
        hazardLevel: 4,
        state: 'released',
        releasedById: safetyOfficerId,
        releasedAt: at,
        ...stamps,
        ...change,
      })
      .returning({ id: cellTypesTable.id }),
  );
}

export type BuiltRequest = {
  readonly requestId: number;
  readonly lotId: number;
  readonly cellIds: readonly number[];
  /** As it stands when made. */
  readonly version: number;
};

type RequestWish = {
  readonly siteId: number;
  readonly requesterId: number;
  readonly projectId: number;
  readonly cellTypeId: number;
  readonly cellCount?: number;
  /** Announced cells have not come yet. */
  readonly areCellsHere?: boolean;
  readonly request?: Partial<typeof requestsTable.$inferInsert>;
  readonly lot?: Partial<typeof requestLotsTable.$inferInsert>;
};

/** A submitted request for the settled current of well rested cells at 25 °C. */
export async function buildRequest(db: Db, wish: RequestWish): Promise<BuiltRequest> {
  const { siteId, requesterId, projectId, cellTypeId, cellCount = 1 } = wish;
  const requestId = first(
    await db
      .insert(requestsTable)
      .values({
        siteId,
        requesterId,
        projectId,
        state: 'submitted',
        kind: 'settled',
        grade: 'reported',
        setTempMdegc: 25_000,
        setToleranceMk: 500,
        toleranceKind: 'relative',
        toleranceFraction: 0.1,
        submittedAt: at,
        ...stamps,
        ...wish.request,
      })
      .returning({ id: requestsTable.id }),
  );
  const lotId = first(
    await db
      .insert(requestLotsTable)
      .values({
        requestId,
        seq: 1,
        cellTypeId,
        cellCount,
        stateOfChargePct: 50,
        restedSinceAt: new Date('2026-01-01T00:00:00Z'),
        ...wish.lot,
      })
      .returning({ id: requestLotsTable.id }),
  );
  const cells = await db
    .insert(cellsTable)
    .values(Array.from({ length: cellCount }, () => buildCell(wish)))
    .returning({ id: cellsTable.id });
  const cellIds = cells.map((cell) => cell.id);
  await db.insert(requestLotCellsTable).values(cellIds.map((cellId) => ({ lotId, cellId })));
  return { requestId, lotId, cellIds, version: 1 };
}

function buildCell(wish: RequestWish): typeof cellsTable.$inferInsert {
  const { siteId, projectId, cellTypeId } = wish;
  const place = { siteId, projectId, cellTypeId, ...stamps };
  return wish.areCellsHere === false
    ? { ...place, status: 'announced' }
    : {
        ...place,
        status: 'received',
        serial: `LC-${randomBytes(5).toString('hex')}`,
        receivedAt: at,
        condition: 'good',
        ocvV: 3.7,
      };
}
