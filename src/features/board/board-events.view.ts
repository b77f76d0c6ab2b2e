import type { EventInput } from '@fullcalendar/core';
import type { BoardBar, BoardWindow } from '#shared/contracts/board.contract.ts';
import { formatSpan } from '#src/lib/format-date.ts';
import { t } from '#src/texts/t.ts';
import type { BoardLine } from './board-rows.view.ts';
import { wallClockMs, type BoardSpan } from './board-window.view.ts';

/** What the calendar is handed for one thing drawn in one row; the drawing finds its facts by `key`. */
export type DrawnThing =
  | { readonly kind: 'bar'; readonly index: number }
  | { readonly kind: 'block'; readonly index: number }
  | { readonly kind: 'tide'; readonly rowKey: string }
  | { readonly kind: 'staffed' };

export const staffedRowKey = 'staffed';

type Words = { readonly zone: string; readonly currentYear: number };

function nameOfBar(bar: BoardWindow['bars'][number], words: Words): string {
  const number = bar.isVisible ? bar.title : `${bar.bookingId} (${t.board.taken})`;
  const span = t.board.booking(number, formatSpan(bar.startAt, bar.endAt, words));
  return bar.atRiskReason === null ? span : `${span}. ${t.board.atRisk(bar.atRiskReason)}`;
}

/** Everything in the window as calendar events; rows drawn as tides show no bars. */
export function boardEvents(
  window: BoardWindow,
  lines: readonly BoardLine[],
  words: Words,
): EventInput[] {
  const barRows = new Set(lines.filter((line) => line.kind === 'bars').map((line) => line.key));
  const allRows = new Set(lines.map((line) => line.key));
  const bars = window.bars.flatMap((bar, index): EventInput[] =>
    barRows.has(bar.rowKey)
      ? [
          {
            id: `bar-${bar.rowKey}-${bar.bookingId}`,
            resourceId: bar.rowKey,
            start: bar.startAt,
            end: bar.endAt,
            title: nameOfBar(bar, words),
            classNames: bar.isVisible ? [] : ['mp-board-foreign'],
            extendedProps: { thing: { kind: 'bar', index } satisfies DrawnThing },
          },
        ]
      : [],
  );
  const blocks = window.blocks.flatMap((block, index): EventInput[] =>
    allRows.has(block.rowKey)
      ? [
          {
            id: `block-${block.rowKey}-${index}`,
            resourceId: block.rowKey,
            start: block.startAt,
            end: block.endAt,
            title: block.sentence,
            display: 'background',
            classNames: [`mp-board-${block.kind}`],
            extendedProps: { thing: { kind: 'block', index } satisfies DrawnThing },
          },
        ]
      : [],
  );
  const tides = lines.flatMap((line): EventInput[] =>
    line.kind === 'tide'
      ? [
          {
            id: `tide-${line.key}`,
            resourceId: line.key,
            start: window.from,
            end: window.to,
            display: 'background',
            classNames: ['mp-board-tide'],
            extendedProps: { thing: { kind: 'tide', rowKey: line.key } satisfies DrawnThing },
          },
        ]
      : [],
  );
  const staffed = window.staffed.map((span, index): EventInput => ({
    id: `staffed-${index}`,
    resourceId: staffedRowKey,
    start: span.startAt,
    end: span.endAt,
    display: 'background',
    classNames: ['mp-board-staffed'],
    extendedProps: { thing: { kind: 'staffed' } satisfies DrawnThing },
  }));
  return [...tides, ...blocks, ...bars, ...staffed];
}

export type Ruling = {
  readonly span: Pick<BoardSpan, 'startMs' | 'endMs'>;
  readonly zone: string;
  /** Pixels of the whole time axis. */
  readonly width: number;
};
export type Placed = {
  readonly width: number;
  readonly hiddenLeft: number;
  /** Pixels free behind it, to the next thing in its row or to the edge of the window. */
  readonly room: number;
};

/** Pixel width of a bar from door to door, how much lies before the window, what is free behind. */
export function placeInWindow(
  bar: Pick<BoardBar, 'startAt' | 'endAt'>,
  nextMs: number | null,
  { span, zone, width: timelineWidth }: Ruling,
): Placed {
  const wall = (ms: number) => wallClockMs(ms, zone);
  const perMs = timelineWidth / (wall(span.endMs) - wall(span.startMs));
  const start = wall(Date.parse(bar.startAt));
  const end = wall(Date.parse(bar.endAt));
  const freeUntil = wall(Math.min(nextMs ?? span.endMs, span.endMs));
  return {
    width: Math.max(2, (end - start) * perMs),
    hiddenLeft: Math.max(0, (wall(span.startMs) - start) * perMs),
    room: Math.max(0, (freeUntil - end) * perMs),
  };
}
