import { and, asc, eq, inArray, ne, sql } from 'drizzle-orm';
import type { Reader, Tx } from '#server/db/client.ts';
import { formatRange } from '#server/db/range-text.ts';
import { allocationsTable } from '#server/db/tables/allocation.table.ts';
import { bookingsTable } from '#server/db/tables/booking.table.ts';
import { chamberPositionsTable, chamberSpecsTable } from '#server/db/tables/chamber.table.ts';
import { channelsTable } from '#server/db/tables/channel.table.ts';
import { instrumentsTable } from '#server/db/tables/instrument.table.ts';
import { chamberLoadsTable, loadPhasesTable } from '#server/db/tables/load.table.ts';
import { otherWorkTable } from '#server/db/tables/other-work.table.ts';
import { outagesTable } from '#server/db/tables/outage.table.ts';
import { roomsTable } from '#server/db/tables/site.table.ts';
import { unitsTable } from '#server/db/tables/unit.table.ts';
import type { PhaseSpan } from '#shared/domain/facility/types.ts';
import type { Span } from '#shared/domain/intervals/types.ts';

export async function findChamberByTag(reader: Reader, siteId: number, tag: string) {
  const [row] = await reader
    .select({ id: instrumentsTable.id, tag: instrumentsTable.tag })
    .from(instrumentsTable)
    .innerJoin(chamberSpecsTable, eq(chamberSpecsTable.instrumentId, instrumentsTable.id))
    .where(and(eq(instrumentsTable.siteId, siteId), eq(instrumentsTable.tag, tag)));
  return row;
}

/** The chambers that share an energy limit with these, themselves included. */
export async function listChambersSharingLimit(
  reader: Reader,
  chamberIds: readonly number[],
): Promise<number[]> {
  const limited = reader
    .select({ roomId: roomsTable.id })
    .from(instrumentsTable)
    .innerJoin(roomsTable, eq(roomsTable.id, instrumentsTable.roomId))
    .where(
      and(
        inArray(instrumentsTable.id, [...chamberIds]),
        sql`${roomsTable.maxEnergyWh} is not null`,
      ),
    );
  const rows = await reader
    .select({ id: chamberSpecsTable.instrumentId })
    .from(chamberSpecsTable)
    .innerJoin(instrumentsTable, eq(instrumentsTable.id, chamberSpecsTable.instrumentId))
    .where(inArray(instrumentsTable.roomId, limited));
  return [...new Set([...chamberIds, ...rows.map((row) => row.id)])];
}

export type TakenUnit = {
  readonly tag: string;
  readonly bookingId: number | null;
  readonly outageTitle: string | null;
  readonly until: number;
};

/** The first thing that holds one of the units during a span, apart from some bookings' own. */
export async function findTakenUnit(
  reader: Reader,
  unitIds: readonly number[],
  span: Span,
  exceptBookingIds: readonly number[],
): Promise<TakenUnit | null> {
  const t = allocationsTable;
  const except = exceptBookingIds.length === 0 ? [0] : [...exceptBookingIds];
  const [row] = await reader
    .select({
      channelLabel: channelsTable.label,
      positionLabel: chamberPositionsTable.label,
      bookingId: t.bookingId,
      outageTitle: outagesTable.title,
      during: t.during,
    })
    .from(t)
    .innerJoin(unitsTable, eq(unitsTable.id, t.unitId))
    .leftJoin(channelsTable, eq(channelsTable.id, unitsTable.channelId))
    .leftJoin(chamberPositionsTable, eq(chamberPositionsTable.id, unitsTable.positionId))
    .leftJoin(outagesTable, eq(outagesTable.id, t.outageId))
    .where(
      and(
        eq(t.live, true),
        inArray(t.unitId, [...unitIds]),
        sql`${t.during} && ${formatRange(span)}::tstzrange`,
        sql`(${t.bookingId} is null or ${t.bookingId} not in ${except})`,
      ),
    )
    .orderBy(asc(t.unitId), asc(sql`lower(${t.during})`))
    .limit(1);
  return row === undefined
    ? null
    : {
        tag: row.channelLabel ?? row.positionLabel ?? 'A unit',
        bookingId: row.bookingId,
        outageTitle: row.outageTitle,
        until: row.during.endMs,
      };
}

export type PhaseClashRow = {
  readonly loadId: number;
  readonly phase: string;
  readonly setTempMdegc: number;
  readonly until: number;
  readonly ownPhase: string;
  readonly ownTempMdegc: number;
};

/** A phase of another load in the chamber that these phases cannot stand beside. */
export async function findPhaseClash(
  reader: Reader,
  chamberId: number,
  own: readonly (PhaseSpan & { readonly isStill: boolean | null })[],
  exceptLoadIds: readonly number[],
): Promise<PhaseClashRow | null> {
  const t = loadPhasesTable;
  const wanted = own.map((phase) => ({
    during: formatRange(phase),
    phase: phase.phase,
    temp: Math.round(phase.setTemperatureC * 1000),
    still: phase.isStill,
  }));
  const conflict = sql`(${t.setTempMdegc} <> own.temp or ${t.still} <> own.still)`;
  const [row] = await reader
    .select({
      loadId: t.loadId,
      phase: t.phase,
      setTempMdegc: t.setTempMdegc,
      during: t.during,
      ownPhase: sql<string>`own.phase`,
      ownTempMdegc: sql<number>`own.temp`,
    })
    .from(t)
    .innerJoin(
      sql`jsonb_to_recordset(${JSON.stringify(wanted)}::jsonb) as own (during tstzrange, phase text, temp integer, still boolean)`,
      sql`${t.during} && own.during and ${conflict}`,
    )
    .where(
      and(
        eq(t.live, true),
        eq(t.chamberId, chamberId),
        ...exceptLoadIds.map((loadId) => ne(t.loadId, loadId)),
      ),
    )
    .orderBy(asc(sql`lower(${t.during})`))
    .limit(1);
  return row === undefined ? null : { ...row, until: row.during.endMs };
}

/** A load as it stands; lock its chamber first. */
export async function findLoadRow(reader: Reader, siteId: number, loadId: number) {
  const [row] = await reader
    .select({ load: chamberLoadsTable })
    .from(chamberLoadsTable)
    .innerJoin(instrumentsTable, eq(instrumentsTable.id, chamberLoadsTable.chamberId))
    .where(and(eq(instrumentsTable.siteId, siteId), eq(chamberLoadsTable.id, loadId)));
  return row?.load;
}

export async function isChamberStrict(tx: Tx, chamberId: number): Promise<boolean> {
  const [row] = await tx
    .select({ strict: chamberSpecsTable.strict })
    .from(chamberSpecsTable)
    .where(eq(chamberSpecsTable.instrumentId, chamberId));
  if (row === undefined) {
    throw new Error(`Chamber ${chamberId} has no specification.`);
  }
  return row.strict;
}

/** Is nothing else in a load: no other booking that was not cancelled, no other work? */
export async function isAloneInLoad(tx: Tx, loadId: number, bookingId: number): Promise<boolean> {
  const others = await tx
    .select({ id: bookingsTable.id })
    .from(bookingsTable)
    .where(
      and(
        eq(bookingsTable.loadId, loadId),
        ne(bookingsTable.id, bookingId),
        ne(bookingsTable.state, 'cancelled'),
      ),
    )
    .limit(1);
  const work = await tx
    .select({ id: otherWorkTable.id })
    .from(otherWorkTable)
    .where(eq(otherWorkTable.loadId, loadId))
    .limit(1);
  return others.length === 0 && work.length === 0;
}
