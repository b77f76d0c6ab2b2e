import { and, asc, eq, exists, gt, ilike, inArray, ne, notExists, or, sql } from 'drizzle-orm';
import type { Reader } from '#server/db/client.ts';
import { bookingsTable, bookingCellsTable } from '#server/db/tables/booking.table.ts';
import { cellTypesTable, cellsTable } from '#server/db/tables/cell.table.ts';
import { chamberSpecsTable } from '#server/db/tables/chamber.table.ts';
import { meterRangesTable, sourceSpecsTable } from '#server/db/tables/channel.table.ts';
import { instrumentsTable } from '#server/db/tables/instrument.table.ts';
import { projectsTable } from '#server/db/tables/project.table.ts';
import {
  requestLotCellsTable,
  requestLotsTable,
  requestsTable,
} from '#server/db/tables/request.table.ts';

export async function listCellTypeRows(reader: Reader) {
  return reader.select().from(cellTypesTable).orderBy(asc(cellTypesTable.name));
}
export type CellTypeRow = Awaited<ReturnType<typeof listCellTypeRows>>[number];

export type CellFilter = {
  readonly siteId: number;
  /** Null: every project. */
  readonly projectIds: readonly number[] | null;
  readonly cellTypeId?: number;
  readonly projectId?: number;
  readonly text?: string;
  readonly isFree?: boolean;
};

const c = cellsTable;

/** Registered cells by serial; announced ones only where a request still asks for them. */
export async function listCellRows(
  reader: Reader,
  filter: CellFilter,
  after: readonly [string, number] | undefined,
  limit: number,
) {
  const serial = sql<string>`coalesce(${c.serial}, '')`;
  const asked = reader
    .select({ id: requestLotCellsTable.cellId })
    .from(requestLotCellsTable)
    .innerJoin(requestLotsTable, eq(requestLotsTable.id, requestLotCellsTable.lotId))
    .innerJoin(requestsTable, eq(requestsTable.id, requestLotsTable.requestId))
    .where(and(eq(requestLotCellsTable.cellId, c.id), ne(requestsTable.state, 'withdrawn')));
  return reader
    .select({ cell: c, cellTypeName: cellTypesTable.name, projectName: projectsTable.name })
    .from(c)
    .innerJoin(cellTypesTable, eq(cellTypesTable.id, c.cellTypeId))
    .innerJoin(projectsTable, eq(projectsTable.id, c.projectId))
    .where(
      and(
        eq(c.siteId, filter.siteId),
        or(ne(c.status, 'announced'), exists(asked)),
        ...filterConditions(reader, filter),
        after === undefined ? undefined : sql`(${serial}, ${c.id}) > (${after[0]}, ${after[1]})`,
      ),
    )
    .orderBy(serial, asc(c.id))
    .limit(limit);
}
export type CellRecord = Awaited<ReturnType<typeof listCellRows>>[number];

function filterConditions(reader: Reader, filter: CellFilter) {
  const { projectIds, cellTypeId, projectId, text, isFree } = filter;
  const booked = reader
    .select({ id: bookingCellsTable.cellId })
    .from(bookingCellsTable)
    .innerJoin(bookingsTable, eq(bookingsTable.id, bookingCellsTable.bookingId))
    .where(
      and(
        eq(bookingCellsTable.cellId, c.id),
        inArray(bookingsTable.state, ['tentative', 'confirmed', 'running']),
      ),
    );
  const pattern = `%${(text ?? '').trim().replaceAll(/[\\%_]/g, '\\$&')}%`;
  return [
    projectIds === null ? undefined : inArray(c.projectId, [...projectIds, -1]),
    cellTypeId === undefined ? undefined : eq(c.cellTypeId, cellTypeId),
    projectId === undefined ? undefined : eq(c.projectId, projectId),
    text === undefined
      ? undefined
      : or(
          ilike(c.serial, pattern),
          ilike(c.lotCode, pattern),
          ilike(cellTypesTable.name, pattern),
        ),
    isFree === true
      ? and(notExists(booked), inArray(c.status, ['received', 'stored']), eq(c.condition, 'good'))
      : undefined,
  ];
}

export async function listProjectRows(reader: Reader, projectIds: readonly number[] | null) {
  return reader
    .select({ id: projectsTable.id, name: projectsTable.name, customer: projectsTable.customer })
    .from(projectsTable)
    .where(
      and(
        sql`${projectsTable.closedAt} is null`,
        projectIds === null ? undefined : inArray(projectsTable.id, [...projectIds, -1]),
      ),
    )
    .orderBy(asc(projectsTable.name));
}

/** Sources, ranges and chambers of a site that a path could use, smallest figure first. */
export async function listWiringRecords(reader: Reader, siteId: number) {
  const ofSite = and(
    eq(instrumentsTable.siteId, siteId),
    sql`${instrumentsTable.state} <> 'retired'`,
  );
  return {
    sourceOutputs: await reader
      .select({ ohm: sourceSpecsTable.outputOhm })
      .from(sourceSpecsTable)
      .innerJoin(instrumentsTable, eq(instrumentsTable.id, sourceSpecsTable.instrumentId))
      .where(ofSite)
      .orderBy(asc(sourceSpecsTable.outputOhm)),
    ranges: await reader
      .select({ range: meterRangesTable })
      .from(meterRangesTable)
      .innerJoin(instrumentsTable, eq(instrumentsTable.id, meterRangesTable.instrumentId))
      .where(and(ofSite, gt(meterRangesTable.fullScaleA, 0)))
      .orderBy(asc(meterRangesTable.fullScaleA), asc(meterRangesTable.noiseA)),
    chambers: await reader
      .select({
        idleTempMdegc: chamberSpecsTable.idleTempMdegc,
        rampKPerMin: chamberSpecsTable.rampKPerMin,
      })
      .from(chamberSpecsTable)
      .innerJoin(instrumentsTable, eq(instrumentsTable.id, chamberSpecsTable.instrumentId))
      .where(ofSite)
      .orderBy(asc(chamberSpecsTable.rampKPerMin)),
  };
}
