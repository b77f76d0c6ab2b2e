import { eq } from 'drizzle-orm';
import type { Tx } from '#server/db/client.ts';
import { requestsTable } from '#server/db/tables/request.table.ts';
import { loadSlotRequests } from '#server/features/availability/slot-request.service.ts';
import { search } from '#shared/domain/availability/search.ts';
import type { Offer } from '#shared/domain/availability/types.ts';
import type { Demo } from './build-demo.ts';
import { known } from './demo-context.ts';
import { dayMs, hourMs } from './demo-days.ts';
import type { SiteFacility } from './judge-demo.ts';

/** Looks up the slot that the engineers of some requests would like and notes it; nothing is reserved. */
export async function proposeSlots(
  tx: Tx,
  demo: Demo,
  facilities: readonly SiteFacility[],
): Promise<void> {
  const loadedOf = new Map(facilities.map(({ siteId, loaded }) => [siteId, loaded]));
  for (const { requestId, lotId, siteId } of demo.wished) {
    const { index, policy } = known(loadedOf, siteId);
    const requests = await loadSlotRequests(tx, [{ id: lotId, lotId, requestId }], demo.nowMs);
    const { offers } = search(index, known(requests, lotId), {
      options: 3,
      horizonMs: demo.nowMs + policy.horizonDays * dayMs,
      nowMs: demo.nowMs,
    });
    // On some days a request finds no slot; then there is nothing to wish for.
    const offer = offers.at(-1);
    if (offer !== undefined) {
      await tx
        .update(requestsTable)
        .set({ proposedOffer: toProposal(offer, lotId), proposedAt: new Date(demo.nowMs - hourMs) })
        .where(eq(requestsTable.id, requestId));
    }
  }
}

function toProposal(offer: Offer, lotId: number) {
  const startAt = new Date(offer.startMs).toISOString();
  return {
    lotId,
    startAt,
    endAt: new Date(offer.endMs).toISOString(),
    chamberTag: offer.chamberTag,
    placement: {
      chamberTag: offer.chamberTag,
      startAt,
      setTemperatureC: offer.setTemperatureC,
      joinsLoadId: offer.joinsLoadId,
      paths: offer.paths.map(({ panel, source, meter, range, position }) => ({
        panelId: panel.id,
        sourceUnitId: source.unitId,
        meterUnitId: meter.unitId,
        meterRangeId: range.id,
        positionUnitId: position.unitId,
      })),
    },
  };
}
