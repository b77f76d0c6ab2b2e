import type { SignedIn, SiteScope } from '#server/actor.ts';
import type { Deps } from '#server/deps.ts';
import { groupBy } from '#server/features/availability/group-by.ts';
import { maySeeRequest } from '#server/features/availability/slot-request.service.ts';
import type { SiteValidity } from '#server/features/availability/validity.service.ts';
import type { BoardBar, BoardBlock } from '#shared/contracts/board.contract.ts';
import type { Span } from '#shared/domain/intervals/types.ts';
import { seesProject } from '#shared/domain/policies/sees-project.ts';
import { drawBlocks } from './blocks.presenter.ts';
import { findRiskStarts } from './risk.service.ts';
import { readUnavailability } from './unavailability.service.ts';
import { listDrawnBookings, listPhases, listTaken } from './board.repository.ts';
import type { DrawnBookingRow, DrawnPhaseRow, TakenRow } from './board.repository.ts';

/** A row to draw: one unit, or an instrument with all of its units. */
export type DrawnRow = {
  readonly key: string;
  readonly instrumentId: number;
  readonly unitIds: readonly number[];
  /** A whole instrument: closed only where all of it is. */
  readonly isWhole: boolean;
  readonly hasBars: boolean;
};

export type Drawing = {
  readonly bars: BoardBar[];
  readonly blocks: BoardBlock[];
  readonly taken: readonly TakenRow[];
};

/** Bars and closed stretches of rows over a window; for the board and an instrument's own week. */
export async function drawRows(
  deps: Pick<Deps, 'clock' | 'db'>,
  actor: SignedIn,
  site: SiteScope,
  input: {
    readonly rows: readonly DrawnRow[];
    readonly window: Span;
    readonly validity: SiteValidity;
  },
): Promise<Drawing> {
  const { rows, window, validity } = input;
  const unitIds = [...new Set(rows.flatMap((row) => row.unitIds))];
  const taken = await listTaken(deps.db, unitIds, window);
  const unavailable = await readUnavailability(deps, { rows, unitIds, window, validity });
  return {
    bars: await drawBars(deps, actor, site, { rows, taken }),
    blocks: drawBlocks({
      seesProject: (projectId) => seesProject(actor, site.code, projectId),
      rows,
      window,
      validity,
      taken,
      unavailable,
      nowMs: deps.clock.now().getTime(),
    }),
    taken,
  };
}

async function drawBars(
  deps: Pick<Deps, 'clock' | 'db'>,
  actor: SignedIn,
  site: SiteScope,
  input: { readonly rows: readonly DrawnRow[]; readonly taken: readonly TakenRow[] },
): Promise<BoardBar[]> {
  const bookingsOf = groupBy(
    input.taken.filter((row) => row.bookingId !== null),
    (row) => row.unitId,
  );
  const wanted = input.rows
    .filter((row) => row.hasBars)
    .flatMap((row) => {
      const ids = row.unitIds.flatMap((unitId) =>
        (bookingsOf.get(unitId) ?? []).map(({ bookingId }) => bookingId),
      );
      return [...new Set(ids)].map((bookingId) => ({ row, bookingId }));
    });
  const bookings = await listDrawnBookings(deps.db, [
    ...new Set(wanted.map(({ bookingId }) => bookingId).filter((id) => id !== null)),
  ]);
  const byId = new Map(bookings.map((booking) => [booking.id, booking] as const));
  const phases = groupBy(
    await listPhases(deps.db, [...new Set(bookings.map(({ loadId }) => loadId))]),
    (row) => row.loadId,
  );
  const riskStarts = await findRiskStarts(
    deps,
    site,
    bookings.filter((booking) => booking.atRisk && maySeeRequest(actor, site.code, booking)),
  );
  return wanted.flatMap(({ row, bookingId }): BoardBar[] => {
    const booking = byId.get(bookingId ?? 0);
    return booking === undefined
      ? []
      : [
          presentBar(row.key, booking, {
            phases: phases.get(booking.loadId) ?? [],
            isVisible: maySeeRequest(actor, site.code, booking),
            riskFromMs: riskStarts.get(booking.id) ?? null,
          }),
        ];
  });
}

function presentBar(
  rowKey: string,
  booking: DrawnBookingRow,
  facts: {
    readonly phases: readonly DrawnPhaseRow[];
    readonly isVisible: boolean;
    readonly riskFromMs: number | null;
  },
): BoardBar {
  const { isVisible, phases, riskFromMs } = facts;
  const hold = phases.find(({ phase }) => phase === 'hold');
  const iso = (ms: number) => new Date(ms).toISOString();
  return {
    bookingId: booking.id,
    rowKey,
    isVisible,
    state: booking.state,
    isAtRisk: booking.atRisk,
    atRiskFrom: riskFromMs === null ? null : iso(riskFromMs),
    atRiskReason: isVisible ? booking.atRiskReason : null,
    title: isVisible
      ? `${booking.id} · ${booking.cellCount ?? 0} × ${booking.cellTypeName ?? ''}`
      : '',
    startAt: iso(booking.during.startMs),
    endAt: iso(booking.during.endMs),
    holdLikelyEndAt:
      hold === undefined || booking.likelyHoldS === null
        ? null
        : iso(Math.min(hold.during.endMs, hold.during.startMs + booking.likelyHoldS * 1000)),
    phases: phases.map((phase) => ({
      phase: phase.phase,
      startAt: iso(phase.during.startMs),
      endAt: iso(phase.during.endMs),
      setTemperatureC: phase.setTempMdegc / 1000,
    })),
  };
}
