import type { CellStock } from './cells.ts';
import type { DemoContext } from './demo-context.ts';

/** One request has its first lot booked while the second still waits for a slot. */
export function addSecondLot(context: DemoContext, stock: CellStock): void {
  const { rows } = context;
  const booking = rows.bookings.find(
    (row) => row.state === 'confirmed' && !row.atRisk && row.grade === 'reported',
  );
  const index = rows.requests.findIndex((row) => row.id === booking?.requestId);
  const request = rows.requests[index];
  const firstLot = rows.lots.find((row) => row.id === booking?.lotId);
  const cells = new Set(
    rows.lotCells.filter((row) => row.lotId === firstLot?.id).map((row) => row.cellId),
  );
  const batch = stock.batches.find((candidate) => candidate.cellIds.some((id) => cells.has(id)));
  const others = (batch?.cellIds ?? []).filter((id) => !cells.has(id)).slice(0, 3);
  if (request?.id === undefined || firstLot === undefined || others.length === 0) {
    throw new RangeError('The demo has no booked request to which a second lot could be added.');
  }
  rows.requests[index] = { ...request, state: 'partly-booked' };
  const id = context.number('lots');
  rows.lots.push({ ...firstLot, id, seq: 2, cellCount: others.length });
  rows.lotCells.push(...others.map((cellId) => ({ lotId: id, cellId })));
}
