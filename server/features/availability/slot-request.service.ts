import type { SignedIn, SiteScope } from '#server/actor.ts';
import type { Reader } from '#server/db/client.ts';
import { notFound, problem } from '#server/problem.ts';
import type { SlotRequest } from '#shared/domain/availability/types.ts';
import { seesProject } from '#shared/domain/policies/sees-project.ts';
import { groupBy } from './group-by.ts';
import {
  findLotRow,
  listGrantedDeviations,
  listLotCells,
  listLotRows,
} from './slot-request.repository.ts';
import type { LotRow } from './slot-request.repository.ts';
import { listMissing, toSlotRequest } from './to-slot-request.ts';
import type { LotFacts } from './to-slot-request.ts';

/** May this person look into a request? Its requester always may, others where they see its project. */
export function maySeeRequest(
  actor: SignedIn,
  siteCode: string,
  request: { readonly requesterId: number; readonly projectId: number | null },
): boolean {
  return (
    request.requesterId === actor.personId ||
    (request.projectId !== null && seesProject(actor, siteCode, request.projectId))
  );
}

/** A lot of a request the caller may see, with its cells and the deviations granted for it. */
export async function getLotFacts(
  reader: Reader,
  actor: SignedIn,
  site: SiteScope,
  of: { readonly requestId: number; readonly lotId: number; readonly bookingId?: number },
): Promise<LotFacts> {
  const row = await findLotRow(reader, site.id, of.requestId, of.lotId);
  if (row === undefined || !maySeeRequest(actor, site.code, row.request)) {
    throw notFound('such lot');
  }
  const cells = await listLotCells(reader, [of.lotId]);
  const deviations = await listGrantedDeviations(reader, {
    requestIds: [of.requestId],
    bookingIds: of.bookingId === undefined ? [] : [of.bookingId],
  });
  return { row, cells: cells.map(({ cell }) => cell), deviations };
}

/** The lot as the search sees it, or a refusal that names what is missing. */
export function requireSlotRequest(facts: LotFacts, nowMs: number): SlotRequest {
  const slotRequest = toSlotRequest(facts, nowMs);
  if (slotRequest === null) {
    const missing = listMissing(facts.row);
    throw problem('request.incomplete', {
      detail: `Request ${facts.row.request.id} lacks ${missing.join(' and ')}. Add it, then look again.`,
      missing,
    });
  }
  return slotRequest;
}

/** Lots of bookings as the search sees them, by booking; for checking bookings again. */
export async function loadSlotRequests(
  reader: Reader,
  bookings: readonly { readonly id: number; readonly lotId: number; readonly requestId: number }[],
  nowMs: number,
): Promise<ReadonlyMap<number, SlotRequest>> {
  const lotIds = [...new Set(bookings.map((booking) => booking.lotId))];
  const lots = new Map<number, LotRow>(
    (await listLotRows(reader, lotIds)).map((row) => [row.lot.id, row]),
  );
  const cells = groupBy(await listLotCells(reader, lotIds), (row) => row.lotId);
  const deviations = await listGrantedDeviations(reader, {
    requestIds: [...new Set(bookings.map((booking) => booking.requestId))],
    bookingIds: bookings.map((booking) => booking.id),
  });
  return new Map(
    bookings.flatMap((booking) => {
      const row = lots.get(booking.lotId);
      const slotRequest =
        row === undefined
          ? null
          : toSlotRequest(
              {
                row,
                cells: (cells.get(booking.lotId) ?? []).map(({ cell }) => cell),
                deviations: deviations.filter(
                  (deviation) =>
                    deviation.requestId === booking.requestId || deviation.bookingId === booking.id,
                ),
              },
              nowMs,
            );
      return slotRequest === null ? [] : [[booking.id, slotRequest] as const];
    }),
  );
}
