import type {
  BoardBar,
  BoardBlock,
  BoardRow,
  BoardWindow,
  Tide,
} from '#shared/contracts/board.contract.ts';
import type { TideStep } from '#src/components/drawing/tide-line.view.ts';

/** A line of the drawn board: a heading, an instrument folded or open, or one channel or position. */
export type BoardLine =
  | {
      readonly kind: 'heading';
      readonly key: string;
      readonly group: BoardRow['group'];
      readonly count: number;
      readonly openCount: number;
    }
  | {
      readonly kind: 'tide';
      readonly key: string;
      readonly row: BoardRow;
      readonly isOpen: boolean;
    }
  | { readonly kind: 'bars'; readonly key: string; readonly row: BoardRow };

/** Headings stand where a group begins; chambers and folded instruments are drawn as tides. */
export function boardLines(
  rows: readonly BoardRow[],
  open: ReadonlySet<string>,
): readonly BoardLine[] {
  const lines: BoardLine[] = [];
  let group: BoardRow['group'] | null = null;
  for (const row of rows) {
    if (row.group !== group) {
      group = row.group;
      const parents = rows.filter((each) => each.group === row.group && each.parentKey === null);
      lines.push({
        kind: 'heading',
        key: `heading-${row.group}`,
        group: row.group,
        count: parents.length,
        openCount: parents.filter((each) => open.has(each.key)).length,
      });
    }
    const isParent = row.parentKey === null && row.childCount > 0;
    lines.push(
      isParent
        ? { kind: 'tide', key: row.key, row, isOpen: open.has(row.key) }
        : { kind: 'bars', key: row.key, row },
    );
  }
  return lines;
}

/** How many bookings stand on a folded instrument over time, where the server sent no tide for it. */
export function tideOfBars(bars: readonly BoardBar[]): readonly TideStep[] {
  const changes = bars.flatMap((bar) => [
    { atMs: Date.parse(bar.startAt), change: 1 },
    { atMs: Date.parse(bar.endAt), change: -1 },
  ]);
  changes.sort((a, b) => a.atMs - b.atMs || a.change - b.change);
  let taken = 0;
  return changes.map(({ atMs, change }) => {
    taken += change;
    return { atMs, taken };
  });
}

export type DrawnTide = {
  readonly steps: readonly TideStep[];
  readonly positions: number;
  readonly levels: readonly { startMs: number; endMs: number; temperatureC: number }[];
};

/** The tide of a folded row: the server's for a chamber, else counted from its bookings. */
export function tideOf(window: BoardWindow, row: BoardRow): DrawnTide {
  const sent = window.tides.find((tide) => tide.rowKey === row.key);
  if (sent === undefined) {
    const steps = tideOfBars(window.bars.filter((bar) => bar.rowKey === row.key));
    const highest = Math.max(0, ...steps.map((step) => step.taken));
    return { steps, positions: Math.max(row.childCount, highest), levels: [] };
  }
  return {
    steps: sent.taken.map((step) => ({ atMs: Date.parse(step.at), taken: step.count })),
    positions: sent.positions,
    levels: levelsOf(sent.temperature),
  };
}

/** The level stretches of a line of corners; between two of them it slants. */
export function levelsOf(corners: Tide['temperature']): DrawnTide['levels'] {
  return corners.flatMap((corner, index) => {
    const next = corners[index + 1];
    return next?.setTemperatureC === corner.setTemperatureC
      ? [
          {
            startMs: Date.parse(corner.at),
            endMs: Date.parse(next.at),
            temperatureC: corner.setTemperatureC,
          },
        ]
      : [];
  });
}

/** Blocks whose sentence stands already on the row they fold under: said once, drawn on each. */
export function saidAbove(
  rows: readonly BoardRow[],
  blocks: readonly BoardBlock[],
): ReadonlySet<number> {
  const parentOf = new Map(rows.map((row) => [row.key, row.parentKey]));
  const said = new Set(blocks.map((block) => nameBlock(block, block.rowKey)));
  return new Set(
    blocks.flatMap((block, index) => {
      const parentKey = parentOf.get(block.rowKey) ?? null;
      return parentKey !== null && said.has(nameBlock(block, parentKey)) ? [index] : [];
    }),
  );
}

function nameBlock({ kind, startAt, sentence }: BoardBlock, rowKey: string): string {
  return JSON.stringify([rowKey, kind, startAt, sentence]);
}
