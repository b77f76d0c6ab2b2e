import type { SignedIn, SiteScope } from '#server/actor.ts';
import type { Deps } from '#server/deps.ts';
import { loadSiteValidity } from '#server/features/availability/validity.service.ts';
import { drawRows } from '#server/features/board/drawing.service.ts';
import { requireWindow } from '#server/features/board/board.service.ts';
import type { BoardBar, BoardBlock } from '#shared/contracts/board.contract.ts';
import { requireInstrument } from './equipment.service.ts';
import { listUnitIds } from './equipment.repository.ts';

/** Bookings and closed stretches of one instrument, each booking once, named by what it holds of it. */
export async function getInstrumentWeek(
  deps: Pick<Deps, 'clock' | 'db'>,
  actor: SignedIn,
  site: SiteScope,
  query: { readonly tag: string; readonly from: string; readonly to: string },
): Promise<{ bars: BoardBar[]; blocks: BoardBlock[] }> {
  const { instrument } = await requireInstrument(deps, site, query.tag);
  const window = requireWindow(query);
  const { id, tag } = instrument;
  const units = await listUnitIds(deps.db, id);
  const validity = await loadSiteValidity(deps.db, site, deps.clock.now().getTime(), [id]);
  const unitIds = units.map(({ unitId }) => unitId);
  const row = { key: tag, instrumentId: id, unitIds, isWhole: true, hasBars: true };
  const { bars, blocks, taken } = await drawRows(deps, actor, site, {
    rows: [row],
    window,
    validity,
  });
  const labelOf = new Map(units.map((unit) => [unit.unitId, unit.label] as const));
  return {
    bars: bars.map((bar) => {
      const held = taken
        .filter(({ bookingId }) => bookingId === bar.bookingId)
        .map(({ unitId }) => (labelOf.get(unitId) ?? '').replace(`${tag}/`, ''));
      return { ...bar, rowKey: `${tag}/${held.join(', ')}` };
    }),
    blocks,
  };
}
