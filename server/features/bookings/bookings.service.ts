import { z } from 'zod';
import type { SignedIn, SiteScope } from '#server/actor.ts';
import type { Reader } from '#server/db/client.ts';
import type { Deps } from '#server/deps.ts';
import { listAuditEvents } from '#server/features/audit/audit.service.ts';
import { maySeeRequest } from '#server/features/availability/slot-request.service.ts';
import { decodeCursor, encodeCursor, rowsToRead, toPage } from '#server/paging.ts';
import type { Page } from '#server/paging.ts';
import { notFound } from '#server/problem.ts';
import type {
  BookingDto,
  BookingRow,
  listBookings as listBookingsContract,
} from '#shared/contracts/bookings.contract.ts';
import type { Placement } from '#shared/contracts/check.schemas.ts';
import { presentBooking, presentBookingRow } from './bookings.presenter.ts';
import {
  findBooking,
  findLiveBookingOfLot as findLotBooking,
  findPersonName,
  listBookingPaths,
  listBookingRecords,
  listBookingsByIds,
  listBookingsOfLoad,
  listConfirmedChecks,
  listDeviationsOf,
  listPhasesOfLoads,
} from './bookings.repository.ts';
import type { BookingFilter, BookingRecord } from './bookings.repository.ts';

type Reading = Pick<Deps, 'db'>;

/** The bookings a caller may look into; all others are only "taken". */
export function isBookingVisible(actor: SignedIn, site: SiteScope, record: BookingRecord): boolean {
  const { requesterId, booking } = record;
  return maySeeRequest(actor, site.code, { requesterId, projectId: booking.projectId });
}

export async function listBookings(
  deps: Reading,
  actor: SignedIn,
  site: SiteScope,
  query: z.output<typeof listBookingsContract.query>,
): Promise<Page<BookingRow>> {
  const sort = query.sort ?? 'start';
  const after = decodeCursor(sort, z.tuple([z.int(), z.int()]), query.cursor);
  const rows = await listBookingRecords(
    deps.db,
    filterOf(actor, site, query),
    sort,
    after === undefined ? undefined : { startMs: after[0], id: after[1] },
    rowsToRead(query),
  );
  return toPage(
    rows,
    query,
    (row) => presentBookingRow(row, isBookingVisible(actor, site, row)),
    ({ booking }) => encodeCursor(sort, [booking.during.startMs, booking.id]),
  );
}

const firstMs = Date.parse('1970-01-01T00:00:00Z');
const lastMs = Date.parse('2200-01-01T00:00:00Z');

function filterOf(
  actor: SignedIn,
  site: SiteScope,
  query: z.output<typeof listBookingsContract.query>,
): BookingFilter {
  const { state, atRisk, mine, from, to, tag } = query;
  const window = {
    startMs: from === undefined ? firstMs : Date.parse(from),
    endMs: to === undefined ? lastMs : Date.parse(to),
  };
  const isWindowed = (from !== undefined || to !== undefined) && window.startMs < window.endMs;
  return {
    siteId: site.id,
    ...(state === undefined ? {} : { states: state }),
    ...(atRisk === undefined ? {} : { isAtRisk: atRisk === 'true' }),
    ...(mine === 'true' ? { requesterId: actor.personId } : {}),
    ...(isWindowed ? { window } : {}),
    ...(tag === undefined ? {} : { tag }),
  };
}

export async function getBooking(
  deps: Reading,
  actor: SignedIn,
  site: SiteScope,
  bookingId: number,
): Promise<BookingDto> {
  const record = await findBooking(deps.db, site.id, bookingId);
  if (record === undefined) {
    throw notFound('such booking');
  }
  return describeBooking(deps, actor, site, record);
}

/** Everything about a booking that the caller may see; for the services that change it, too. */
export async function describeBooking(
  deps: Reading,
  actor: SignedIn,
  site: SiteScope,
  record: BookingRecord,
): Promise<BookingDto> {
  const { id, requestId, loadId, confirmedById } = record.booking;
  const isVisible = isBookingVisible(actor, site, record);
  return presentBooking({
    record,
    isVisible,
    paths: await listBookingPaths(deps.db, [id]),
    phases: await listPhasesOfLoads(deps.db, [loadId]),
    checks: isVisible ? await listConfirmedChecks(deps.db, id) : [],
    deviations: isVisible ? await listDeviationsOf(deps.db, { bookingId: id, requestId }) : [],
    events: isVisible ? await historyOf(deps, site, id) : [],
    confirmedBy: confirmedById === null ? null : await findPersonName(deps.db, confirmedById),
  });
}

async function historyOf(deps: Reading, site: SiteScope, bookingId: number) {
  const { items } = await listAuditEvents(deps, site, {
    subjectKind: 'booking',
    subjectId: bookingId,
    limit: 200,
  });
  return items;
}

/** The bookings in a load as the caller may see them. */
export async function listBookingRowsOfLoad(
  deps: Reading,
  actor: SignedIn,
  site: SiteScope,
  loadId: number,
): Promise<BookingRow[]> {
  const records = await listBookingsOfLoad(deps.db, loadId);
  return records.map((record) => presentBookingRow(record, isBookingVisible(actor, site, record)));
}

/** Bookings by number as the caller may see them, e.g. those a change has touched. */
export async function listBookingRows(
  deps: Reading,
  actor: SignedIn,
  site: SiteScope,
  bookingIds: readonly number[],
): Promise<BookingRow[]> {
  const records = await listBookingsByIds(deps.db, site.id, bookingIds);
  return records.map((record) => presentBookingRow(record, isBookingVisible(actor, site, record)));
}

/** The booking a lot has already; undefined where it can still be booked. */
export function findLiveBookingOfLot(reader: Reader, lotId: number) {
  return findLotBooking(reader, lotId);
}

/** A booking with its lot, for other features; undefined where the site has none of that number. */
export function findBookingRecord(
  reader: Reader,
  site: SiteScope,
  bookingId: number,
): Promise<BookingRecord | undefined> {
  return findBooking(reader, site.id, bookingId);
}

/** Where a booking stands, in the form a caller names a place with. */
export async function findBookedPlacement(
  reader: Reader,
  site: SiteScope,
  bookingId: number,
): Promise<Placement | null> {
  const record = await findBooking(reader, site.id, bookingId);
  if (record === undefined) {
    return null;
  }
  const paths = await listBookingPaths(reader, [bookingId]);
  return {
    chamberTag: record.chamberTag,
    startAt: new Date(record.booking.during.startMs).toISOString(),
    setTemperatureC: record.setTempMdegc / 1000,
    joinsLoadId: record.booking.loadId,
    paths: paths.map(({ panelId, sourceUnitId, meterUnitId, meterRangeId, positionUnitId }) => ({
      panelId,
      sourceUnitId,
      meterUnitId,
      meterRangeId,
      positionUnitId,
    })),
  };
}
