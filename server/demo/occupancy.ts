import { overlaps } from '#shared/domain/intervals/overlaps.ts';
import type { Span } from '#shared/domain/intervals/types.ts';

/** Who is where when, while the demo is being laid. */
export type Occupancy = {
  readonly take: (unitId: number, span: Span) => void;
  readonly isFree: (unitId: number, span: Span) => boolean;
  readonly takeCell: (cellId: number, span: Span) => void;
  readonly isCellFree: (cellId: number, span: Span) => boolean;
  readonly closeChamber: (chamberId: number, span: Span) => void;
  /** The end of what stands in the way of a chamber, or undefined. */
  readonly chamberClosedUntil: (chamberId: number, span: Span) => number | undefined;
};

export function openOccupancy(): Occupancy {
  const units = new Map<number, Span[]>();
  const cells = new Map<number, Span[]>();
  const chambers = new Map<number, Span[]>();
  const add = (map: Map<number, Span[]>, key: number, span: Span): void => {
    const spans = map.get(key);
    if (spans === undefined) {
      map.set(key, [span]);
    } else {
      spans.push(span);
    }
  };
  const find = (map: Map<number, Span[]>, key: number, span: Span): Span | undefined =>
    map.get(key)?.find((taken) => overlaps(taken, span));
  return {
    take: (unitId, span) => {
      add(units, unitId, span);
    },
    isFree: (unitId, span) => find(units, unitId, span) === undefined,
    takeCell: (cellId, span) => {
      add(cells, cellId, span);
    },
    isCellFree: (cellId, span) => find(cells, cellId, span) === undefined,
    closeChamber: (chamberId, span) => {
      add(chambers, chamberId, span);
    },
    chamberClosedUntil: (chamberId, span) => find(chambers, chamberId, span)?.endMs,
  };
}
