import { eq } from 'drizzle-orm';
import type { Tx } from '#server/db/client.ts';
import { bookingsTable } from '#server/db/tables/booking.table.ts';
import { checkResultsTable } from '#server/db/tables/check-result.table.ts';
import { sitesTable } from '#server/db/tables/site.table.ts';
import {
  loadFacility,
  type LoadedFacility,
} from '#server/features/availability/facility.service.ts';
import { loadSlotRequests } from '#server/features/availability/slot-request.service.ts';
import type { SlotRequest } from '#shared/domain/availability/types.ts';
import { evaluatePlacement } from '#shared/domain/checks/evaluate-placement.ts';
import type { CheckResult, PathChoice } from '#shared/domain/checks/types.ts';
import type { FacilityIndex, ServiceState } from '#shared/domain/facility/types.ts';
import type { BookingState, CheckStage } from '#shared/domain/states.ts';
import type { Demo } from './build-demo.ts';
import { known } from './demo-context.ts';
import { dayMs } from './demo-days.ts';
import type { DemoRows } from './demo-rows.ts';
import { insertRows } from './insert-rows.ts';

type BookingRow = DemoRows['bookings'][number] & { readonly id: number };
export type SiteFacility = { readonly siteId: number; readonly loaded: LoadedFacility };

/** Reads both sites as search and checks see them. */
export async function loadDemoSites(tx: Tx, nowMs: number): Promise<SiteFacility[]> {
  const sites = await tx.select().from(sitesTable).orderBy(sitesTable.id);
  const window = { startMs: nowMs - 4 * dayMs, endMs: nowMs + 140 * dayMs };
  const facilities: SiteFacility[] = [];
  for (const site of sites) {
    facilities.push({ siteId: site.id, loaded: await loadFacility(tx, site, { window }) });
  }
  return facilities;
}

/** Runs the real checks on everything that is still to come and keeps what they say. */
export async function judgeDemo(
  tx: Tx,
  demo: Demo,
  facilities: readonly SiteFacility[],
): Promise<void> {
  const results: (typeof checkResultsTable.$inferInsert)[] = [];
  for (const { siteId, loaded } of facilities) {
    const bookings = demo.rows.bookings.filter(
      (row): row is BookingRow =>
        row.id !== undefined && row.siteId === siteId && upcoming.has(row.state),
    );
    const requests = await loadSlotRequests(tx, bookings, demo.nowMs);
    for (const booking of bookings) {
      const request = known(requests, booking.id);
      const checks = checkBooking(demo, { booking, request, loaded });
      const confirmedAt = booking.confirmedAt ?? booking.createdAt;
      const before = checkBooking(demo, { booking, request, loaded: beforeTrouble(loaded) });
      results.push(...toRows(booking.id, 'confirm', before, confirmedAt));
      const stop = checks.find((check) => check.outcome === 'stop');
      if (stop !== undefined) {
        results.push(...toRows(booking.id, 'recheck', checks, new Date(demo.nowMs)));
        await tx
          .update(bookingsTable)
          .set({ atRisk: true, atRiskReason: stop.sentence })
          .where(eq(bookingsTable.id, booking.id));
      }
    }
  }
  await insertRows(tx, checkResultsTable, results);
}

const upcoming: ReadonlySet<BookingState> = new Set(['tentative', 'confirmed', 'running']);

function toRows(
  bookingId: number,
  stage: CheckStage,
  checks: readonly CheckResult[],
  runAt: Date,
): (typeof checkResultsTable.$inferInsert)[] {
  return checks.map(({ code, outcome, sentence, ...evidence }) => ({
    bookingId,
    runAt,
    stage,
    code,
    outcome,
    sentence,
    evidence,
  }));
}

/** The site as it was when nothing had broken yet: that is how bookings were confirmed. */
function beforeTrouble(loaded: LoadedFacility): LoadedFacility {
  const { index } = loaded;
  const inService = <Thing extends { readonly state: ServiceState }>(
    things: ReadonlyMap<number, Thing>,
  ): Map<number, Thing> =>
    new Map([...things].map(([id, thing]) => [id, { ...thing, state: 'in-service' }]));
  return {
    ...loaded,
    index: {
      ...index,
      chambers: inService(index.chambers),
      sources: inService(index.sources),
      meters: inService(index.meters),
      positions: inService(index.positions),
      unavailable: new Map(),
    },
  };
}

/** The checks of a booking where it stands. */
export function checkBooking(
  demo: Demo,
  of: {
    readonly booking: BookingRow;
    readonly request: SlotRequest;
    readonly loaded: LoadedFacility;
  },
): readonly CheckResult[] {
  const { booking, request, loaded } = of;
  const { index } = loaded;
  const load = demo.rows.loads.find((row) => row.id === booking.loadId);
  const chamber = load === undefined ? undefined : index.chambers.get(load.chamberId);
  if (load === undefined || chamber === undefined) {
    throw new RangeError(`Booking ${booking.id} of the demo has no chamber.`);
  }
  const joins = chamber.loads.find(({ id }) => id === booking.loadId) ?? null;
  return evaluatePlacement({
    facility: index.facility,
    index,
    request,
    chamber,
    joins,
    paths: demo.rows.bookingCells
      .filter((row) => row.bookingId === booking.id)
      .map((row) => namePath(index, row)),
    phases: joins?.phases ?? [],
    span: booking.during,
    setTemperatureC: load.setTempMdegc / 1000,
    estimate: known(demo.estimates, booking.id),
    nowMs: demo.nowMs,
    ignoreBookingId: booking.id,
  });
}

function namePath(index: FacilityIndex, row: DemoRows['bookingCells'][number]): PathChoice {
  const panel = index.facility.panels.find(({ id }) => id === row.panelId);
  const source = index.sources.get(row.sourceUnitId);
  const meter = index.meters.get(row.meterUnitId);
  const range = meter?.ranges.find(({ id }) => id === row.meterRangeId);
  const position = index.positions.get(row.positionUnitId);
  if (!panel || !source || !meter || !range || !position) {
    throw new RangeError(`Booking ${row.bookingId} of the demo has a path that is not wired.`);
  }
  return { panel, source, meter, range, position };
}
