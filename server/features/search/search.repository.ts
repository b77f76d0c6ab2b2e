import { and, asc, desc, eq, ilike, inArray, or, sql } from 'drizzle-orm';
import type { Reader } from '#server/db/client.ts';
import { bookingsTable } from '#server/db/tables/booking.table.ts';
import { calibrationsTable } from '#server/db/tables/calibration.table.ts';
import { cellTypesTable, cellsTable } from '#server/db/tables/cell.table.ts';
import { instrumentsTable } from '#server/db/tables/instrument.table.ts';
import { chamberLoadsTable } from '#server/db/tables/load.table.ts';
import { projectsTable } from '#server/db/tables/project.table.ts';
import { requestsTable } from '#server/db/tables/request.table.ts';

const most = 12;

function pattern(text: string): string {
  return `%${text.replaceAll(/[\\%_]/g, '\\$&')}%`;
}

export async function findInstruments(reader: Reader, siteId: number, text: string) {
  const t = instrumentsTable;
  // `C03/4` is asked for as often as `C03`: a channel or position leads to what it belongs to.
  const [tag = text] = text.split('/');
  return reader
    .select({ tag: t.tag, kind: t.kind, model: t.model })
    .from(t)
    .where(
      and(
        eq(t.siteId, siteId),
        or(
          ilike(t.tag, pattern(tag)),
          ilike(t.model, pattern(text)),
          ilike(t.serial, pattern(text)),
        ),
      ),
    )
    .orderBy(sql`${t.tag} <> ${tag.toUpperCase()}`, asc(t.tag))
    .limit(most);
}

export async function findCells(
  reader: Reader,
  siteId: number,
  projectIds: readonly number[] | null,
  text: string,
) {
  const t = cellsTable;
  return reader
    .select({
      serial: t.serial,
      typeName: cellTypesTable.name,
      projectName: projectsTable.name,
      place: t.place,
      requestId: sql<
        number | null
      >`(select max(l.request_id) from request_lot_cell lc join request_lot l on l.id = lc.lot_id where lc.cell_id = ${t.id})`,
    })
    .from(t)
    .innerJoin(cellTypesTable, eq(cellTypesTable.id, t.cellTypeId))
    .innerJoin(projectsTable, eq(projectsTable.id, t.projectId))
    .where(
      and(
        eq(t.siteId, siteId),
        projectIds === null ? undefined : inArray(t.projectId, [...projectIds, -1]),
        ilike(t.serial, pattern(text)),
      ),
    )
    .orderBy(asc(t.serial))
    .limit(most);
}

export async function findBookingByNumber(reader: Reader, siteId: number, id: number) {
  const [row] = await reader
    .select({
      id: bookingsTable.id,
      state: bookingsTable.state,
      during: bookingsTable.during,
      projectId: bookingsTable.projectId,
      requesterId: requestsTable.requesterId,
      chamberTag: instrumentsTable.tag,
    })
    .from(bookingsTable)
    .innerJoin(chamberLoadsTable, eq(chamberLoadsTable.id, bookingsTable.loadId))
    .innerJoin(instrumentsTable, eq(instrumentsTable.id, chamberLoadsTable.chamberId))
    .innerJoin(requestsTable, eq(requestsTable.id, bookingsTable.requestId))
    .where(and(eq(bookingsTable.siteId, siteId), eq(bookingsTable.id, id)));
  return row;
}

export async function findRequestByNumber(reader: Reader, siteId: number, id: number) {
  const [row] = await reader
    .select({
      id: requestsTable.id,
      state: requestsTable.state,
      projectId: requestsTable.projectId,
      requesterId: requestsTable.requesterId,
      projectName: projectsTable.name,
    })
    .from(requestsTable)
    .leftJoin(projectsTable, eq(projectsTable.id, requestsTable.projectId))
    .where(and(eq(requestsTable.siteId, siteId), eq(requestsTable.id, id)));
  return row;
}

export async function findCalibrations(
  reader: Reader,
  siteId: number,
  { text, id }: { readonly text: string; readonly id: number | null },
) {
  const t = calibrationsTable;
  return reader
    .select({
      id: t.id,
      tag: instrumentsTable.tag,
      performedOn: t.performedOn,
      certificateNumber: t.certificateNumber,
    })
    .from(t)
    .innerJoin(instrumentsTable, eq(instrumentsTable.id, t.instrumentId))
    .where(
      and(
        eq(instrumentsTable.siteId, siteId),
        or(id === null ? undefined : eq(t.id, id), ilike(t.certificateNumber, pattern(text))),
      ),
    )
    .orderBy(desc(t.id))
    .limit(most);
}
