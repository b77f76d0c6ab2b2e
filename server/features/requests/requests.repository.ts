import {
  and,
  asc,
  desc,
  eq,
  exists,
  ilike,
  inArray,
  isNotNull,
  ne,
  or,
  sql,
  type SQL,
} from 'drizzle-orm';
import type { Reader, Tx } from '#server/db/client.ts';
import { bookingsTable } from '#server/db/tables/booking.table.ts';
import { cellTypesTable, cellsTable } from '#server/db/tables/cell.table.ts';
import { personsTable } from '#server/db/tables/person.table.ts';
import { projectsTable } from '#server/db/tables/project.table.ts';
import {
  requestLotCellsTable,
  requestLotsTable,
  requestsTable,
} from '#server/db/tables/request.table.ts';
import type { MeasurementKind } from '#shared/domain/hold-estimate/types.ts';
import type { RequestState } from '#shared/domain/states.ts';

export async function lockRequestRow(tx: Tx, siteId: number, requestId: number) {
  const [row] = await tx
    .select()
    .from(requestsTable)
    .where(and(eq(requestsTable.siteId, siteId), eq(requestsTable.id, requestId)))
    .for('no key update');
  return row;
}
export type RequestRow = NonNullable<Awaited<ReturnType<typeof lockRequestRow>>>;

/** Writes to a locked request and counts its version up. */
export async function updateRequest(
  tx: Tx,
  row: Pick<RequestRow, 'id' | 'version'>,
  change: Partial<typeof requestsTable.$inferInsert>,
  at: Date,
): Promise<void> {
  await tx
    .update(requestsTable)
    .set({ ...change, updatedAt: at, version: row.version + 1 })
    .where(eq(requestsTable.id, row.id));
}

/** A request with the names its fields stand for. */
export async function findWholeRequest(reader: Reader, requestId: number) {
  const [row] = await reader
    .select({
      request: requestsTable,
      requesterName: personsTable.name,
      projectName: projectsTable.name,
    })
    .from(requestsTable)
    .innerJoin(personsTable, eq(personsTable.id, requestsTable.requesterId))
    .leftJoin(projectsTable, eq(projectsTable.id, requestsTable.projectId))
    .where(eq(requestsTable.id, requestId));
  return row;
}
export type WholeRequest = NonNullable<Awaited<ReturnType<typeof findWholeRequest>>>;

export async function listLots(reader: Reader, requestId: number) {
  return reader
    .select({ lot: requestLotsTable, cellTypeName: cellTypesTable.name })
    .from(requestLotsTable)
    .leftJoin(cellTypesTable, eq(cellTypesTable.id, requestLotsTable.cellTypeId))
    .where(eq(requestLotsTable.requestId, requestId))
    .orderBy(asc(requestLotsTable.seq));
}
export type LotWithType = Awaited<ReturnType<typeof listLots>>[number];

export async function listCellsOfLots(reader: Reader, lotIds: readonly number[]) {
  if (lotIds.length === 0) {
    return [];
  }
  return reader
    .select({
      lotId: requestLotCellsTable.lotId,
      id: cellsTable.id,
      serial: cellsTable.serial,
      status: cellsTable.status,
      cellTypeId: cellsTable.cellTypeId,
      projectId: cellsTable.projectId,
    })
    .from(requestLotCellsTable)
    .innerJoin(cellsTable, eq(cellsTable.id, requestLotCellsTable.cellId))
    .where(inArray(requestLotCellsTable.lotId, [...lotIds]))
    .orderBy(asc(cellsTable.id));
}
export type CellOfLot = Awaited<ReturnType<typeof listCellsOfLots>>[number];

export async function listBookingsOfLots(reader: Reader, lotIds: readonly number[]) {
  if (lotIds.length === 0) {
    return [];
  }
  return reader
    .select({ lotId: bookingsTable.lotId, id: bookingsTable.id })
    .from(bookingsTable)
    .where(and(inArray(bookingsTable.lotId, [...lotIds]), ne(bookingsTable.state, 'cancelled')))
    .orderBy(asc(bookingsTable.id));
}

/** Cells nobody has seen yet, for a lot that was asked by type and number. */
export async function announceCells(
  tx: Tx,
  lotId: number,
  cells: readonly {
    readonly siteId: number;
    readonly projectId: number;
    readonly cellTypeId: number;
  }[],
  at: Date,
): Promise<void> {
  if (cells.length === 0) {
    return;
  }
  const rows = await tx
    .insert(cellsTable)
    .values(
      cells.map((cell) => ({
        ...cell,
        status: 'announced' as const,
        createdAt: at,
        updatedAt: at,
      })),
    )
    .returning({ cellId: cellsTable.id });
  await tx.insert(requestLotCellsTable).values(rows.map(({ cellId }) => ({ lotId, cellId })));
}

export type RequestFilter = {
  readonly siteId: number;
  /** Of the site, for what a calendar day means. */
  readonly zone: string;
  /** Own requests, and those of these projects; null: of every project. */
  readonly visibleTo: {
    readonly personId: number;
    readonly projectIds: readonly number[] | null;
  };
  readonly states?: readonly RequestState[];
  readonly kind?: MeasurementKind;
  readonly projectId?: number;
  readonly requesterId?: number;
  readonly text?: string;
  readonly neededBefore?: string;
};
export type RequestSort = 'needed-by' | 'newest' | 'oldest' | 'number';
/** Milliseconds of the sorting instant (null for the number alone) and the number. */
export type RequestAfter = readonly [number | null, number];

const r = requestsTable;
const neverMs = 253_402_300_799_000;
const neededMs = sql<number>`coalesce((extract(epoch from ${r.neededByAt}) * 1000)::float8, ${neverMs})`;
const askedMs = sql<number>`(extract(epoch from coalesce(${r.submittedAt}, ${r.createdAt})) * 1000)::float8`;

const orders: Readonly<
  Record<RequestSort, { readonly key: SQL<number> | null; readonly isDown: boolean }>
> = {
  'needed-by': { key: neededMs, isDown: false },
  newest: { key: askedMs, isDown: true },
  oldest: { key: askedMs, isDown: false },
  number: { key: null, isDown: true },
};

export async function listRequestRows(
  reader: Reader,
  filter: RequestFilter,
  sort: RequestSort,
  after: RequestAfter | undefined,
  limit: number,
) {
  const { key, isDown } = orders[sort];
  const towards = isDown ? desc : asc;
  return reader
    .select({
      request: r,
      sortMs: key ?? sql<number | null>`null::float8`,
      requesterName: personsTable.name,
      projectName: projectsTable.name,
      cellTypeNames: sql<
        string[]
      >`coalesce((select array_agg(distinct ct.name order by ct.name) from request_lot l join cell_type ct on ct.id = l.cell_type_id where l.request_id = ${r.id}), '{}')`,
      cellCount: sql<number>`coalesce((select sum(l.cell_count) from request_lot l where l.request_id = ${r.id}), 0)::int`,
      bookingIds: sql<
        number[]
      >`coalesce((select array_agg(b.id order by b.id) from booking b where b.request_id = ${r.id} and b.state <> 'cancelled'), '{}')`,
    })
    .from(r)
    .innerJoin(personsTable, eq(personsTable.id, r.requesterId))
    .leftJoin(projectsTable, eq(projectsTable.id, r.projectId))
    .where(and(...conditionsOf(reader, filter), goesOn(sort, after)))
    .orderBy(...(key === null ? [] : [towards(key)]), towards(r.id))
    .limit(limit);
}
export type ListedRequest = Awaited<ReturnType<typeof listRequestRows>>[number];

function goesOn(sort: RequestSort, after: RequestAfter | undefined): SQL | undefined {
  if (after === undefined) {
    return undefined;
  }
  const { key, isDown } = orders[sort];
  const [ms, id] = after;
  const sign = sql.raw(isDown ? '<' : '>');
  return key === null
    ? sql`${r.id} ${sign} ${id}`
    : sql`(${key}, ${r.id}) ${sign} (${ms}::float8, ${id}::int)`;
}

function conditionsOf(reader: Reader, filter: RequestFilter): (SQL | undefined)[] {
  const { states, kind, projectId, requesterId, neededBefore, visibleTo } = filter;
  return [
    eq(r.siteId, filter.siteId),
    or(
      eq(r.requesterId, visibleTo.personId),
      visibleTo.projectIds === null
        ? isNotNull(r.projectId)
        : inArray(r.projectId, [...visibleTo.projectIds]),
    ),
    states === undefined ? undefined : inArray(r.state, [...states]),
    kind === undefined ? undefined : eq(r.kind, kind),
    projectId === undefined ? undefined : eq(r.projectId, projectId),
    requesterId === undefined ? undefined : eq(r.requesterId, requesterId),
    neededBefore === undefined
      ? undefined
      : sql`${r.neededByAt} < (${neededBefore}::timestamp at time zone ${filter.zone})`,
    textCondition(reader, filter.text),
  ];
}

/** A number, or part of a note, a project or a cell type. */
function textCondition(reader: Reader, text: string | undefined): SQL | undefined {
  const wanted = text?.trim() ?? '';
  if (wanted === '') {
    return undefined;
  }
  const pattern = `%${wanted.replaceAll(/[\\%_]/g, '\\$&')}%`;
  const ofType = reader
    .select({ id: requestLotsTable.id })
    .from(requestLotsTable)
    .innerJoin(cellTypesTable, eq(cellTypesTable.id, requestLotsTable.cellTypeId))
    .where(and(eq(requestLotsTable.requestId, r.id), ilike(cellTypesTable.name, pattern)));
  return or(
    /^\d{1,9}$/.test(wanted) ? eq(r.id, Number(wanted)) : undefined,
    ilike(r.note, pattern),
    ilike(projectsTable.name, pattern),
    ilike(personsTable.name, pattern),
    exists(ofType),
  );
}

export async function insertRequest(
  tx: Tx,
  values: typeof requestsTable.$inferInsert,
): Promise<number> {
  const [made] = await tx.insert(r).values(values).returning({ id: r.id });
  if (made === undefined) {
    throw new Error('No request was written.');
  }
  return made.id;
}

type LotValues = Omit<typeof requestLotsTable.$inferInsert, 'id' | 'requestId' | 'seq'>;

/** Writes the lots in their order; those that are there keep their numbers. */
export async function writeLots(
  tx: Tx,
  request: { readonly id: number; readonly projectId: number | null },
  lots: readonly { readonly values: LotValues; readonly cellIds: readonly number[] }[],
): Promise<void> {
  const { id: requestId, projectId } = request;
  const present = await listLots(tx, requestId);
  for (const [place, { values, cellIds }] of lots.entries()) {
    const seq = place + 1;
    const [row] = await tx
      .insert(requestLotsTable)
      .values({ ...values, requestId, seq })
      .onConflictDoUpdate({
        target: [requestLotsTable.requestId, requestLotsTable.seq],
        set: values,
      })
      .returning({ id: requestLotsTable.id });
    if (row === undefined) {
      throw new Error('No lot was written.');
    }
    await writeLotCells(tx, row.id, cellIds, {
      cellTypeId: values.cellTypeId ?? null,
      projectId,
      cellCount: values.cellCount ?? 0,
    });
  }
  const surplus = present.filter(({ lot }) => lot.seq > lots.length).map(({ lot }) => lot.id);
  if (surplus.length > 0) {
    await tx.delete(requestLotsTable).where(inArray(requestLotsTable.id, surplus));
  }
}

/**
 * Named cells replace what was there; without names, announced ones stay up to the number asked as
 * long as they are of the type and project that are asked for now.
 */
async function writeLotCells(
  tx: Tx,
  lotId: number,
  cellIds: readonly number[],
  asked: {
    readonly cellTypeId: number | null;
    readonly projectId: number | null;
    readonly cellCount: number;
  },
): Promise<void> {
  const present = await listCellsOfLots(tx, [lotId]);
  const announced = present
    .filter(
      (cell) =>
        cell.status === 'announced' &&
        cell.cellTypeId === asked.cellTypeId &&
        cell.projectId === asked.projectId,
    )
    .map(({ id }) => id);
  const wanted = cellIds.length > 0 ? cellIds : announced.slice(0, asked.cellCount);
  const gone = present.map(({ id }) => id).filter((id) => !wanted.includes(id));
  const added = wanted.filter((id) => !present.some((cell) => cell.id === id));
  if (gone.length > 0) {
    await tx
      .delete(requestLotCellsTable)
      .where(
        and(eq(requestLotCellsTable.lotId, lotId), inArray(requestLotCellsTable.cellId, gone)),
      );
  }
  if (added.length > 0) {
    await tx.insert(requestLotCellsTable).values(added.map((cellId) => ({ lotId, cellId })));
  }
}

/** Every booking the lots ever had, cancelled ones too. */
export async function listEverBookedLots(reader: Reader, requestId: number) {
  const rows = await reader
    .selectDistinct({ seq: requestLotsTable.seq })
    .from(bookingsTable)
    .innerJoin(requestLotsTable, eq(requestLotsTable.id, bookingsTable.lotId))
    .where(eq(bookingsTable.requestId, requestId));
  return rows.map(({ seq }) => seq);
}

export async function listCellFacts(reader: Reader, cellIds: readonly number[]) {
  if (cellIds.length === 0) {
    return [];
  }
  return reader
    .select({
      id: cellsTable.id,
      siteId: cellsTable.siteId,
      projectId: cellsTable.projectId,
      cellTypeId: cellsTable.cellTypeId,
    })
    .from(cellsTable)
    .where(inArray(cellsTable.id, [...cellIds]));
}

export async function listKnownCellTypes(reader: Reader, ids: readonly number[]) {
  if (ids.length === 0) {
    return [];
  }
  const rows = await reader
    .select({ id: cellTypesTable.id })
    .from(cellTypesTable)
    .where(inArray(cellTypesTable.id, [...ids]));
  return rows.map(({ id }) => id);
}

export async function isOpenProject(reader: Reader, projectId: number): Promise<boolean> {
  const rows = await reader
    .select({ id: projectsTable.id })
    .from(projectsTable)
    .where(and(eq(projectsTable.id, projectId), sql`${projectsTable.closedAt} is null`));
  return rows.length === 1;
}
