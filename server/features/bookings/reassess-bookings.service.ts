import type { SignedIn, SiteScope } from '#server/actor.ts';
import type { Tx } from '#server/db/client.ts';
import { lockPlaces } from '#server/db/lock-places.ts';
import type { Deps } from '#server/deps.ts';
import { recordAudit } from '#server/features/audit/audit.service.ts';
import { groupBy } from '#server/features/availability/group-by.ts';
import { loadFacility } from '#server/features/availability/facility.service.ts';
import { loadSlotRequests } from '#server/features/availability/slot-request.service.ts';
import { placeBooking } from '#shared/domain/availability/place-booking.ts';
import type { SlotRequest } from '#shared/domain/availability/types.ts';
import type { CheckResult } from '#shared/domain/checks/types.ts';
import type { FacilityIndex } from '#shared/domain/facility/types.ts';
import { insertCheckResults, updateBooking } from './booking-writes.repository.ts';
import {
  listBookingPaths,
  listLiveBookingsOfRequest,
  listLiveBookingsOver,
  listPhasesOfLoads,
} from './bookings.repository.ts';
import type { BookingPathRow, BookingRecord, LoadPhaseRecord } from './bookings.repository.ts';

/** A booking whose standing changed, for whoever tells its owner. */
export type AffectedBooking = {
  readonly bookingId: number;
  readonly requesterId: number;
  readonly isAtRisk: boolean;
  readonly reason: string | null;
};

/**
 * Checks the bookings over units and chambers again after something about them became worse or better,
 * and sets or clears their risk with the reason. The caller holds the locks of these places (see
 * `lockInstruments`), so that no booking can slip in between.
 *
 * @returns the bookings whose standing or reason changed
 */
export async function reassessBookings(
  deps: Pick<Deps, 'clock' | 'requestId'>,
  tx: Tx,
  site: SiteScope,
  places: { readonly unitIds: readonly number[]; readonly chamberIds: readonly number[] },
  /** Who caused it; null where the system did. */
  actor: SignedIn | null,
): Promise<AffectedBooking[]> {
  const now = deps.clock.now();
  if (places.unitIds.length + places.chamberIds.length === 0) {
    return [];
  }
  const records = await listLiveBookingsOver(tx, site.id, places, now);
  if (records.length === 0) {
    return [];
  }
  const stops = await checkAgain(tx, site, records, now);
  const affected: AffectedBooking[] = [];
  for (const record of records) {
    const found = stops.get(record.booking.id) ?? [];
    const change = riskChange(record, found);
    if (change !== null) {
      await writeRisk(deps, tx, { site, actor, record, change, checks: found });
      affected.push(change);
    }
  }
  return affected;
}

/**
 * The same for the bookings of one request, after something about the request itself changed: when it
 * is needed, or a rule that was lifted for it. The caller holds the lock of the request's row.
 */
export async function reassessRequest(
  deps: Pick<Deps, 'clock' | 'requestId'>,
  tx: Tx,
  site: SiteScope,
  requestId: number,
  actor: SignedIn | null,
): Promise<AffectedBooking[]> {
  const records = await listLiveBookingsOfRequest(tx, requestId);
  const paths = await listBookingPaths(
    tx,
    records.map(({ booking }) => booking.id),
  );
  const places = {
    chamberIds: records.map(({ chamberId }) => chamberId),
    unitIds: paths.flatMap((path) => [path.sourceUnitId, path.meterUnitId, path.positionUnitId]),
  };
  await lockPlaces(tx, places);
  return reassessBookings(deps, tx, site, places, actor);
}

function riskChange(
  { booking, requesterId }: BookingRecord,
  stops: readonly CheckResult[],
): AffectedBooking | null {
  const reason = stops[0]?.sentence ?? null;
  const isAtRisk = reason !== null;
  return reason === booking.atRiskReason && booking.atRisk === isAtRisk
    ? null
    : { bookingId: booking.id, requesterId, isAtRisk, reason };
}

async function writeRisk(
  deps: Pick<Deps, 'clock' | 'requestId'>,
  tx: Tx,
  risk: {
    readonly site: SiteScope;
    readonly actor: SignedIn | null;
    readonly record: BookingRecord;
    readonly change: AffectedBooking;
    readonly checks: readonly CheckResult[];
  },
): Promise<void> {
  const { booking } = risk.record;
  const { isAtRisk, reason } = risk.change;
  const now = deps.clock.now();
  if (!(await updateBooking(tx, booking, { atRisk: isAtRisk, atRiskReason: reason }, now))) {
    throw new Error(`Booking ${booking.id} changed while its places were locked.`);
  }
  if (risk.checks.length > 0) {
    await insertCheckResults(tx, booking.id, 'recheck', risk.checks, now);
  }
  await recordAudit(deps, tx, {
    actor: risk.actor,
    site: risk.site,
    action: isAtRisk ? 'booking.at-risk' : 'booking.risk-cleared',
    subjectKind: 'booking',
    subjectId: booking.id,
    before: { atRisk: booking.atRisk, reason: booking.atRiskReason },
    after: { atRisk: isAtRisk, reason },
  });
}

/** The stops of each booking as things stand now. */
async function checkAgain(
  tx: Tx,
  site: SiteScope,
  records: readonly BookingRecord[],
  now: Date,
): Promise<ReadonlyMap<number, readonly CheckResult[]>> {
  const ids = records.map(({ booking }) => booking.id);
  const { index } = await loadFacility(tx, site, {
    window: {
      startMs: Math.min(...records.map(({ booking }) => booking.during.startMs)),
      endMs: Math.max(...records.map(({ booking }) => booking.during.endMs)),
    },
    chamberIds: [...new Set(records.map(({ chamberId }) => chamberId))],
  });
  const paths = groupBy(await listBookingPaths(tx, ids), (row) => row.bookingId);
  const phases = groupBy(
    await listPhasesOfLoads(tx, [...new Set(records.map(({ booking }) => booking.loadId))]),
    (row) => row.loadId,
  );
  const requests = await loadSlotRequests(
    tx,
    records.map(({ booking }) => booking),
    now.getTime(),
  );
  return new Map(
    records.map((record) => {
      const { id, loadId } = record.booking;
      const slotRequest = requests.get(id);
      const stops =
        slotRequest === undefined
          ? []
          : stopsOf(index, slotRequest, {
              record,
              paths: paths.get(id) ?? [],
              phases: phases.get(loadId) ?? [],
              now,
            });
      return [id, stops] as const;
    }),
  );
}

function stopsOf(
  index: FacilityIndex,
  request: SlotRequest,
  booked: {
    readonly record: BookingRecord;
    readonly paths: readonly BookingPathRow[];
    readonly phases: readonly LoadPhaseRecord[];
    readonly now: Date;
  },
): readonly CheckResult[] {
  const { booking, chamberId, setTempMdegc } = booked.record;
  const placed = placeBooking(index, request, {
    chamberId,
    startMs: booking.during.startMs,
    joinsLoadId: booking.loadId,
    setTemperatureC: setTempMdegc / 1000,
    paths: booked.paths.map(({ meterRangeId, ...path }) => ({ ...path, rangeId: meterRangeId })),
    holdS: null,
    bookedPhases: booked.phases.map((phase) => ({
      ...phase.during,
      phase: phase.phase,
      setTemperatureC: phase.setTempMdegc / 1000,
    })),
    nowMs: booked.now.getTime(),
    ignoreBookingId: booking.id,
  });
  if (placed.outcome === 'placed') {
    return placed.checks.filter(({ outcome }) => outcome === 'stop');
  }
  return [
    {
      code: placed.reason === 'unknown' ? 'path-connects' : 'slot-length',
      outcome: 'stop',
      sentence: placed.sentence,
      evidence: [],
      waysOut: [],
      used: null,
      liftedByDeviationId: null,
    },
  ];
}
