import type { Tx } from '#server/db/client.ts';
import type { LotFacts } from '#server/features/availability/to-slot-request.ts';
import { problem } from '#server/problem.ts';
import { formatSiteTime } from '#shared/domain/calendar/format-site-time.ts';
import type { CalendarIndex } from '#shared/domain/calendar/types.ts';
import type { PathChoice } from '#shared/domain/checks/types.ts';
import type { Span } from '#shared/domain/intervals/types.ts';
import { findCellInUse } from './booking-writes.repository.ts';
import type { CellOnPath } from './booking-writes.repository.ts';

/** One cell of the lot on each path, in the order of their numbers. */
export function cellsOnPaths(lot: LotFacts, paths: readonly PathChoice[]): CellOnPath[] {
  return paths.map((path, place) => {
    const cell = lot.cells[place];
    if (cell === undefined) {
      throw problem('request.state', {
        detail: `The lot names ${lot.cells.length} cells for ${paths.length} places. Submit the request so that its cells are announced.`,
      });
    }
    return {
      cellId: cell.id,
      panelId: path.panel.id,
      sourceUnitId: path.source.unitId,
      meterUnitId: path.meter.unitId,
      meterRangeId: path.range.id,
      positionUnitId: path.position.unitId,
    };
  });
}

/** A cell is in one place at a time. The cells are locked when this is asked. */
export async function refuseCellInUse(
  tx: Tx,
  cells: readonly CellOnPath[],
  span: Span,
  ownBookingId: number,
  calendar: CalendarIndex,
): Promise<void> {
  const inUse = await findCellInUse(
    tx,
    cells.map((cell) => cell.cellId),
    span,
    ownBookingId,
  );
  if (inUse !== undefined) {
    const name = inUse.serial ?? `number ${inUse.cellId}`;
    const until = formatSiteTime(calendar, inUse.during.endMs);
    throw problem('booking.clash', {
      detail: `Cell ${name} is in booking ${inUse.bookingId} until ${until}.`,
    });
  }
}
