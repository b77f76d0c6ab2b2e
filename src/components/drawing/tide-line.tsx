import { formatTemperature } from '#src/lib/format-quantity.ts';
import { linePath } from './chart-scale.ts';
import {
  levelStrokes,
  placeLevelNames,
  tidePoints,
  type LevelStroke,
  type SetLevel,
  type TideStep,
  type TimeWindow,
} from './tide-line.view.ts';

export type { SetLevel, TideStep, TimeWindow } from './tide-line.view.ts';

const foot = 32;
const full = 16;

function Level({ stroke }: { stroke: LevelStroke }) {
  if (stroke.kind === 'slant') {
    const [from, to] = stroke.isRising ? [10, 3] : [3, 10];
    return <path d={`M${stroke.x1} ${from}L${stroke.x2} ${to}`} stroke="var(--ink-2)" />;
  }
  return <path d={`M${stroke.x1} 3H${stroke.x2}`} stroke="var(--ink-2)" />;
}

/** A chamber's row: the tide of positions taken under the level of its set temperature. */
export function TideLine(props: {
  window: TimeWindow;
  width: number;
  steps: readonly TideStep[];
  positions: number;
  levels: readonly SetLevel[];
  /** The chamber's week in a sentence; left out where the row says it already. */
  label?: string | undefined;
}) {
  const { width, window } = props;
  const y = (taken: number) =>
    props.positions === 0 ? foot : foot - (foot - full) * Math.min(1, taken / props.positions);
  const line = linePath(tidePoints(props.steps, window, width, y));
  const strokes = levelStrokes(props.levels, window, width, (value) => formatTemperature(value, 0));
  return (
    <svg
      width={width}
      height="34"
      role={props.label === undefined ? undefined : 'img'}
      aria-label={props.label}
      aria-hidden={props.label === undefined ? true : undefined}
    >
      <path d={`${line}V${foot}H0z`} fill="var(--heron-wash)" />
      <path d={line} fill="none" stroke="var(--heron)" strokeWidth="1.5" />
      {strokes.map((stroke) => (
        <Level key={`${stroke.kind}-${stroke.x1}`} stroke={stroke} />
      ))}
      {placeLevelNames(strokes, width).map((name) => (
        <text key={name.x} x={name.x} y="13.5" className="mp-axis-strong mp-halo">
          {name.text}
        </text>
      ))}
    </svg>
  );
}
