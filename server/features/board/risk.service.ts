import type { SiteScope } from '#server/actor.ts';
import type { Deps } from '#server/deps.ts';
import { groupBy } from '#server/features/availability/group-by.ts';
import {
  findUnavailabilities,
  loadSiteValidity,
} from '#server/features/availability/validity.service.ts';
import type {
  SiteValidity,
  UnavailableSpan,
} from '#server/features/availability/validity.service.ts';
import type { Span } from '#shared/domain/intervals/types.ts';
import { listHeldUnits } from './board.repository.ts';
import type { HeldUnitRow } from './board.repository.ts';

type AtRisk = { readonly id: number; readonly during: Span };

/** From when on each booking at risk can no longer go as planned; none where that is not a moment. */
export async function findRiskStarts(
  deps: Pick<Deps, 'clock' | 'db'>,
  site: SiteScope,
  bookings: readonly AtRisk[],
): Promise<ReadonlyMap<number, number>> {
  if (bookings.length === 0) {
    return new Map();
  }
  const nowMs = deps.clock.now().getTime();
  const held = await listHeldUnits(
    deps.db,
    bookings.map(({ id }) => id),
  );
  const instrumentIds = [...new Set(held.map(({ instrumentId }) => instrumentId))];
  const validity = await loadSiteValidity(deps.db, site, nowMs, instrumentIds);
  const reported = await findUnavailabilities(deps.db, {
    instrumentIds: instrumentIds.flatMap((id) => validity.chainOf(id)),
    unitIds: held.map(({ unitId }) => unitId),
    window: {
      startMs: Math.min(...bookings.map(({ during }) => during.startMs)),
      endMs: Math.max(...bookings.map(({ during }) => during.endMs)),
    },
  });
  const byBooking = groupBy(held, ({ bookingId }) => bookingId);
  return new Map(
    bookings.flatMap(({ id, during }) => {
      const moments = (byBooking.get(id) ?? []).flatMap((unit) => [
        ...reportedMoments(unit, during, validity, reported),
        ...lapseMoments(unit, validity, nowMs),
      ]);
      const inside = moments
        .map((moment) => Math.max(moment, during.startMs))
        .filter((moment) => moment < during.endMs);
      return inside.length === 0 ? [] : [[id, Math.min(...inside)] as const];
    }),
  );
}

function reportedMoments(
  unit: HeldUnitRow,
  during: Span,
  validity: SiteValidity,
  reported: readonly UnavailableSpan[],
): number[] {
  const chain = validity.chainOf(unit.instrumentId);
  return reported
    .filter(
      (span) =>
        (span.unitId === unit.unitId || chain.includes(span.instrumentId ?? 0)) &&
        span.startMs < during.endMs &&
        (span.endMs === null || span.endMs > during.startMs),
    )
    .map(({ startMs }) => startMs);
}

/** When the instrument leaves service or the last of its ranges falls due. */
function lapseMoments(unit: HeldUnitRow, validity: SiteValidity, nowMs: number): number[] {
  if (validity.stateOf(unit.instrumentId) !== 'in-service') {
    return [nowMs];
  }
  const ends = validity
    .scopesOf(unit.instrumentId)
    .filter(({ unitId }) => unitId === null || unitId === unit.unitId)
    .map(({ badge }) => badge.validUntilMs ?? nowMs);
  return ends.length === 0 ? [] : [Math.max(...ends)];
}
