import { useId } from 'react';
import { useElementWidth } from '#src/hooks/use-element-width.ts';
import { t } from '#src/texts/t.ts';
import { linePath } from './chart-scale.ts';
import { dayHours, placeDoors, type DoorEvent, type PlacedDoor } from './day-tide.view.ts';
import { tidePoints, timeScale, type TideStep, type TimeWindow } from './tide-line.view.ts';

export type { DoorEvent } from './day-tide.view.ts';

const base = 82;
const top = 26;

function Door(props: { door: PlacedDoor }) {
  const { x, label, side } = props.door;
  return (
    <g>
      <path d={`M${x} 22V${base}M${x - 3} 22.5h6`} stroke="var(--ink)" strokeWidth="1.6" />
      {side === 'none' ? (
        <title>{label}</title>
      ) : (
        <text
          x={side === 'left' ? x - 6 : x + 6}
          y="28"
          textAnchor={side === 'left' ? 'end' : 'start'}
          className="mp-axis-word mp-halo"
        >
          {label}
        </text>
      )}
    </g>
  );
}

function Now(props: { x: number }) {
  return (
    <>
      <path d={`M${props.x} 4V88`} stroke="var(--ink)" strokeWidth="1.5" />
      <rect x={props.x - 17} y="0" width="34" height="15" fill="var(--ink)" />
      <text x={props.x} y="11.5" textAnchor="middle" className="mp-now">
        {t.drawings.now}
      </text>
    </>
  );
}

function HourFoot(props: {
  window: TimeWindow;
  zone: string;
  width: number;
  staffed: readonly TimeWindow[];
}) {
  const x = timeScale(props.window, props.width);
  const cut = (ms: number) => Math.min(props.width, Math.max(0, x(ms)));
  return (
    <>
      {props.staffed.map((span) => (
        <rect
          key={span.startMs}
          x={cut(span.startMs)}
          y="83"
          width={Math.max(0, cut(span.endMs) - cut(span.startMs))}
          height="5"
          fill="var(--ink-3)"
        />
      ))}
      {dayHours(props.window, props.zone, props.width).map((hour) => (
        <g key={hour.text}>
          <path d={`M${hour.x} 83v8`} stroke="var(--ink)" />
          <text x={hour.x + 3} y="103" className="mp-axis">
            {hour.text}
          </text>
        </g>
      ))}
    </>
  );
}

/** Whether the first step is long enough to carry its words. */
function startRoom(points: readonly { x: number }[], needed: number): boolean {
  const next = points.find((point) => point.x > 0);
  return next !== undefined && next.x > needed;
}

function countAt(steps: readonly TideStep[], ms: number): number {
  return steps.filter((step) => step.atMs <= ms).at(-1)?.taken ?? 0;
}

/** The day at a site: positions taken (dashed after now), doors, staffed hours below. */
export function DayTide(props: {
  window: TimeWindow;
  zone: string;
  nowMs: number;
  steps: readonly TideStep[];
  positions: number;
  doors: readonly DoorEvent[];
  staffed: readonly TimeWindow[];
  /** The finding: how many are taken now, which doors are still to open. */
  label: string;
}) {
  const [ref, width] = useElementWidth<HTMLDivElement>(1180);
  const clipId = useId();
  const y = (taken: number) =>
    base - (base - top) * (props.positions === 0 ? 0 : taken / props.positions);
  const points = tidePoints(props.steps, props.window, width, y);
  const line = linePath(points);
  const now = Math.min(width, Math.max(0, timeScale(props.window, width)(props.nowMs)));
  const first = points[0];
  const last = points.at(-1);
  const startCount = countAt(props.steps, props.window.startMs);
  const longText = t.drawings.positionsTaken(startCount, props.positions);
  const startText = startRoom(points, 12 + longText.length * 5.9) ? longText : `${startCount}`;
  const endCount = countAt(props.steps, props.window.endMs);
  const isLevelWithDoors = first !== undefined && Math.abs(first.y - 6 - 28) < 11;
  const reserved = [
    [now - 2, now + 2] as const,
    ...(isLevelWithDoors ? [[0, 12 + startText.length * 5.9] as const] : []),
  ];
  return (
    <div className="mp-drawing" ref={ref}>
      <svg width={width} height="112" role="img" aria-label={props.label}>
        <clipPath id={clipId}>
          <rect x="-2" y="0" width={now + 2} height="112" />
        </clipPath>
        <path d={`${line}V${base}H0z`} fill="var(--heron-wash)" />
        <path d={line} fill="none" stroke="var(--heron)" strokeWidth="1.4" strokeDasharray="4 3" />
        <g clipPath={`url(#${clipId})`}>
          <path d={line} fill="none" stroke="var(--heron)" strokeWidth="2" />
        </g>
        <path d={`M0 ${base}H${width}`} stroke="var(--ink)" strokeWidth="1.5" />
        <HourFoot window={props.window} zone={props.zone} width={width} staffed={props.staffed} />
        {placeDoors(props.doors, props.window, width, reserved).map((door) => (
          <Door key={door.x} door={door} />
        ))}
        <Now x={now} />
        {first === undefined || last === undefined ? null : (
          <>
            <text x="6" y={first.y - 6} className="mp-axis-word mp-halo">
              {startText}
            </text>
            <text x={width - 6} y={last.y - 6} textAnchor="end" className="mp-axis-word mp-halo">
              {endCount}
            </text>
          </>
        )}
      </svg>
    </div>
  );
}
