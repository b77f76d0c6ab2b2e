import type { Load } from '#shared/domain/facility/types.ts';
import type { Span } from '#shared/domain/intervals/types.ts';

export type Contents = { readonly cells: number; readonly energyWh: number };

/**
 * The most cells and the most energy that loads bring together at one moment of a span. Loads change
 * only at their starts, so the start of the span and the starts inside it are enough.
 *
 * @param ignoreBookingId a booking whose cells are not counted
 * @example sumContents([], { startMs: 0, endMs: 1 }, null) // { cells: 0, energyWh: 0 }
 */
export function sumContents(
  loads: readonly Load[],
  span: Span,
  ignoreBookingId: number | null,
): Contents {
  const present = loads.flatMap((load) => {
    const startMs = load.phases[0]?.startMs ?? Infinity;
    const endMs = load.phases.at(-1)?.endMs ?? -Infinity;
    if (startMs >= span.endMs || endMs <= span.startMs) {
      return [];
    }
    const members = load.members.filter((member) => member.bookingId !== ignoreBookingId);
    return [
      {
        startMs,
        endMs,
        cells: members.reduce((sum, member) => sum + member.cells, 0),
        energyWh: members.reduce((sum, member) => sum + member.energyWh, 0),
      },
    ];
  });
  const moments = [span.startMs, ...present.map((load) => Math.max(load.startMs, span.startMs))];
  let cells = 0;
  let energyWh = 0;
  for (const atMs of moments) {
    const inside = present.filter((load) => load.startMs <= atMs && atMs < load.endMs);
    cells = Math.max(
      cells,
      inside.reduce((sum, load) => sum + load.cells, 0),
    );
    energyWh = Math.max(
      energyWh,
      inside.reduce((sum, load) => sum + load.energyWh, 0),
    );
  }
  return { cells, energyWh };
}
