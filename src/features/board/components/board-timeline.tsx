import type { EventContentArg } from '@fullcalendar/core';
import luxonPlugin from '@fullcalendar/luxon3';
import FullCalendar from '@fullcalendar/react';
import type { ResourceInput } from '@fullcalendar/resource';
import resourceTimelinePlugin from '@fullcalendar/resource-timeline';
import { useMemo, useState } from 'react';
import { useNavigate } from 'react-router-dom';
import { z } from 'zod';
import type { BoardBlock, BoardWindow } from '#shared/contracts/board.contract.ts';
import { TideLine } from '#src/components/drawing/tide-line.tsx';
import { useElementWidth } from '#src/hooks/use-element-width.ts';
import { useSite } from '#src/hooks/use-site.ts';
import { siteCalendar } from '#src/lib/format-date.ts';
import { t } from '#src/texts/t.ts';
import '#src/styles/board.css';
import { boardEvents, placeInWindow, staffedRowKey } from '../board-events.view.ts';
import { boardLines, saidAbove, tideOf, type BoardLine } from '../board-rows.view.ts';
import { nameBar, nextInRowMs } from '../board-bar.view.ts';
import { wallClockMs, type BoardSpan } from '../board-window.view.ts';
import { useReachableTimeline } from '../use-reachable-timeline.ts';
import { BlockSentence } from './block-sentence.tsx';
import { BoardBar } from './board-bar.tsx';
import { BoardRowLabel } from './board-row-label.tsx';

const thingSchema = z.discriminatedUnion('kind', [
  z.object({ kind: z.literal('bar'), index: z.number() }),
  z.object({ kind: z.literal('block'), index: z.number() }),
  z.object({ kind: z.literal('tide'), rowKey: z.string() }),
  z.object({ kind: z.literal('staffed') }),
]);

const leastTimelineWidth = 620;
/** Where the axis is wider than the screen it begins a little before now. */
const lookBackMs = 4 * 3_600_000;

type Drawing = {
  readonly data: BoardWindow;
  readonly span: BoardSpan;
  readonly zone: string;
  readonly width: number;
  readonly lines: ReadonlyMap<string, BoardLine>;
  readonly said: ReadonlySet<number>;
  /** Blocks whose sentence is written in their row. */
  readonly written: readonly BoardBlock[];
};

/** Draws one calendar event: a booking, the words of a block, or the tide of a row. */
function drawEvent(arg: EventContentArg, drawing: Drawing) {
  const { data, span, zone, width } = drawing;
  const thing = thingSchema.parse(arg.event.extendedProps['thing']);
  if (thing.kind === 'bar') {
    const bar = data.bars[thing.index];
    return bar === undefined ? null : (
      <BoardBar
        bar={bar}
        name={nameBar(bar, data.bars)}
        {...placeInWindow(bar, nextInRowMs(bar, data.bars, drawing.written), drawing)}
      />
    );
  }
  if (thing.kind === 'block') {
    const block = data.blocks[thing.index];
    if (block === undefined) {
      return null;
    }
    const next = nextInRowMs(block, [], data.blocks);
    return (
      <BlockSentence
        text={block.sentence}
        isSaid={drawing.said.has(thing.index)}
        {...placeInWindow(block, next, drawing)}
      />
    );
  }
  if (thing.kind === 'staffed') {
    return arg.event.id === 'staffed-0' ? (
      <span className="mp-board-axis-stop" role="img" aria-label={t.board.staffed} tabIndex={0} />
    ) : null;
  }
  const line = drawing.lines.get(thing.rowKey);
  if (line?.kind !== 'tide') {
    return null;
  }
  const wall = (ms: number) => wallClockMs(ms, zone);
  const tide = tideOf(data, line.row);
  return (
    <TideLine
      window={{ startMs: wall(span.startMs), endMs: wall(span.endMs) }}
      width={width}
      positions={tide.positions}
      steps={tide.steps.map((step) => ({ ...step, atMs: wall(step.atMs) }))}
      levels={tide.levels.map((level) => ({
        ...level,
        startMs: wall(level.startMs),
        endMs: wall(level.endMs),
      }))}
    />
  );
}

/** The time axis with its rows. The server hands over only the rows and hours that are shown. */
export function BoardTimeline(props: {
  data: BoardWindow;
  span: BoardSpan;
  nowMs: number;
  open: ReadonlySet<string>;
  onToggle: (key: string) => void;
}) {
  const { data, span } = props;
  const site = useSite();
  const navigate = useNavigate();
  const { nowMs } = props;
  const { currentYear } = siteCalendar(nowMs, site.zone);
  const [frame, frameWidth] = useElementWidth<HTMLDivElement>(1392);
  const labelWidth = frameWidth < 720 ? 108 : 184;
  useReachableTimeline(frame);
  const slotCount = (span.dayCount * 24) / span.slotHours;
  const slotWidth = Math.max(
    Math.floor(Math.max(leastTimelineWidth, frameWidth - labelWidth - 1) / slotCount),
    12,
  );
  const timelineWidth = Math.max(slotWidth * slotCount, frameWidth - labelWidth - 1);
  const lines = useMemo(() => boardLines(data.rows, props.open), [data.rows, props.open]);
  const events = useMemo(
    () => boardEvents(data, lines, { zone: site.zone, currentYear }),
    [data, lines, site.zone, currentYear],
  );
  const byKey = useMemo(() => new Map(lines.map((line) => [line.key, line])), [lines]);
  const resources = useMemo<ResourceInput[]>(
    () => [
      { id: staffedRowKey, title: t.board.staffed, order: -1 },
      ...lines.map((line, order) => ({ id: line.key, title: line.key, order })),
    ],
    [lines],
  );
  const [openedAtMs] = useState(nowMs);
  const scrollTime = useMemo(
    () => ({ milliseconds: Math.max(0, openedAtMs - span.startMs - lookBackMs) }),
    [openedAtMs, span.startMs],
  );
  const said = useMemo(() => saidAbove(data.rows, data.blocks), [data]);
  const written = useMemo(
    () => data.blocks.filter((_block, index) => !said.has(index)),
    [data, said],
  );
  const drawing = {
    data,
    span,
    zone: site.zone,
    width: timelineWidth,
    lines: byKey,
    said,
    written,
  };
  return (
    <div ref={frame} className={`mp-board mp-board-${span.view}`}>
      <FullCalendar
        key={`${span.view}-${span.firstDay}-${labelWidth}`}
        plugins={[resourceTimelinePlugin, luxonPlugin]}
        schedulerLicenseKey="GPL-My-Project-Is-Open-Source"
        initialView="board"
        views={{ board: { type: 'resourceTimeline', duration: { days: span.dayCount } } }}
        initialDate={span.firstDay}
        timeZone={site.zone}
        locale="en-gb"
        firstDay={1}
        headerToolbar={false}
        height="auto"
        slotDuration={{ hours: span.slotHours }}
        slotLabelInterval={{ hours: span.labelHours }}
        slotLabelFormat={[
          { weekday: 'short', day: 'numeric' },
          { hour: '2-digit', hour12: false },
        ]}
        slotMinWidth={slotWidth}
        slotLaneClassNames={(arg) =>
          [0, 6].includes(arg.date?.getUTCDay() ?? 1) ? ['mp-board-weekend'] : []
        }
        resourceAreaWidth={labelWidth}
        resourceAreaHeaderContent={t.board.siteTime(site.name)}
        resourceOrder="order"
        resources={resources}
        resourceLabelContent={(arg) => {
          const line = byKey.get(arg.resource.id);
          return line === undefined ? (
            <span className="mp-note">{t.board.staffed}</span>
          ) : (
            <BoardRowLabel line={line} onToggle={props.onToggle} />
          );
        }}
        resourceLaneClassNames={(arg) => [
          `mp-board-lane-${byKey.get(arg.resource.id)?.kind ?? 'staffed'}`,
        ]}
        resourceLabelClassNames={(arg) => [
          `mp-board-lane-${byKey.get(arg.resource.id)?.kind ?? 'staffed'}`,
        ]}
        events={events}
        eventContent={(arg) => drawEvent(arg, drawing)}
        eventDidMount={(arg) => {
          arg.el.setAttribute('aria-label', arg.event.title);
          arg.el.title = arg.event.title;
        }}
        eventInteractive
        eventClick={(arg) => {
          const thing = thingSchema.parse(arg.event.extendedProps['thing']);
          const bar = thing.kind === 'bar' ? data.bars[thing.index] : undefined;
          if (bar?.isVisible === true) {
            void navigate(`/${site.code}/bookings/${bar.bookingId}`);
          }
        }}
        nowIndicator
        nowIndicatorContent={(arg) =>
          arg.isAxis ? null : <span className="mp-board-now">{t.board.now}</span>
        }
        scrollTime={scrollTime}
        scrollTimeReset={false}
        expandRows={false}
        stickyFooterScrollbar={false}
      />
    </div>
  );
}
