import { useId } from 'react';
import { cutSpan, weekTicks } from './due-strip.view.ts';
import { timeScale, type TimeWindow } from './tide-line.view.ts';

type StripFrame = { window: TimeWindow; zone: string; width: number };

/** The dates over a column of strips. */
export function DueStripHead(props: StripFrame) {
  return (
    <svg width={props.width} height="15" aria-hidden="true">
      {weekTicks(props.window, props.zone, props.width).map((tick) => (
        <text key={tick.x} x={tick.x + 3} y="12" className="mp-axis">
          {tick.text}
        </text>
      ))}
    </svg>
  );
}

/** One instrument's weeks: bookings, the due upright, shut after it, the window that moves least. */
export function DueStrip(
  props: StripFrame & {
    nowMs: number;
    dueMs: number;
    bookings: readonly TimeWindow[];
    best?: TimeWindow | undefined;
    /** Left out where the row says it already. */
    label?: string | undefined;
  },
) {
  const hatchId = useId();
  const { width, window } = props;
  const x = timeScale(window, width);
  const shut = cutSpan({ startMs: props.dueMs, endMs: window.endMs }, window, width);
  const best = props.best === undefined ? undefined : cutSpan(props.best, window, width);
  const bookings = props.bookings.flatMap((booking) => cutSpan(booking, window, width) ?? []);
  return (
    <svg
      width={width}
      height="22"
      role={props.label === undefined ? undefined : 'img'}
      aria-label={props.label}
      aria-hidden={props.label === undefined ? true : undefined}
    >
      <pattern
        id={hatchId}
        width="6"
        height="6"
        patternUnits="userSpaceOnUse"
        patternTransform="rotate(45)"
      >
        <path d="M0 0v6" stroke="var(--hatch)" strokeWidth="1.3" />
      </pattern>
      {weekTicks(window, props.zone, width).map((tick) => (
        <path key={tick.x} d={`M${tick.x + 0.5} -5V27`} stroke="var(--rule)" />
      ))}
      {shut === undefined ? null : (
        <rect x={shut.x} y="-4" width={shut.width} height="30" fill="var(--shut)" />
      )}
      {bookings.map((span) => (
        <path
          key={span.x}
          d={`M${span.x} 19L${span.x + Math.min(3, span.width / 2)} 10H${span.x + span.width}V19z`}
          fill="var(--heron)"
        />
      ))}
      {best === undefined ? null : (
        <>
          <rect x={best.x} y="2.5" width={best.width} height="18" fill="var(--paper)" />
          <rect
            x={best.x}
            y="2.5"
            width={best.width}
            height="18"
            fill={`url(#${hatchId})`}
            stroke="var(--reed)"
            strokeWidth="1.5"
          />
        </>
      )}
      {props.dueMs >= window.startMs && props.dueMs < window.endMs ? (
        <path d={`M${x(props.dueMs)} -4V26`} stroke="var(--marigold)" strokeWidth="2" />
      ) : null}
      <path d={`M${x(props.nowMs)} -5V27`} stroke="var(--ink)" strokeWidth="1.2" />
    </svg>
  );
}
