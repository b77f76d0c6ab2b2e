import { Disclosure } from '#src/components/ui/disclosure.tsx';
import { Table } from '#src/components/ui/table.tsx';
import { useElementWidth } from '#src/hooks/use-element-width.ts';
import { formatHours } from '#src/lib/format-duration.ts';
import { t } from '#src/texts/t.ts';
import { bandPath, linePath } from './chart-scale.ts';
import { SettlingUprights } from './settling-uprights.tsx';
import {
  layOutSettling,
  tableCurrent,
  thinPoints,
  type SettlingCurve,
  type SettlingData,
  type SettlingLayout,
} from './settling-chart.view.ts';

export type { SettlingCurve, SettlingData } from './settling-chart.view.ts';

export type SettlingChartProps = SettlingData & {
  likelySeconds?: number | undefined;
  safeSeconds?: number | undefined;
  /** The finding in one sentence, for a screen reader: `Settled after 2 h 46 min, ...`. */
  summary: string;
};

function Axes(props: { layout: SettlingLayout; height: number }) {
  const { frame, timeTicks, currentTicks, unit } = props.layout;
  return (
    <>
      {currentTicks.map((tick) => (
        <g key={tick.text}>
          <path d={`M${frame.left} ${tick.y}H${frame.right}`} stroke="var(--rule)" />
          <text x={frame.left - 7} y={tick.y + 4} textAnchor="end" className="mp-axis">
            {tick.text}
          </text>
        </g>
      ))}
      <text x="8" y="10" className="mp-axis-word">
        {t.drawings.currentAxis(unit)}
      </text>
      {timeTicks.map((tick) => (
        <g key={tick.hours}>
          <path d={`M${tick.x} ${frame.base}v5`} stroke="var(--ink)" />
          <text x={tick.x} y={frame.base + 17} textAnchor="middle" className="mp-axis">
            {t.drawings.hours(tick.hours)}
          </text>
        </g>
      ))}
      <path
        d={`M${frame.left} ${frame.base}H${frame.right}`}
        stroke="var(--ink)"
        strokeWidth="1.5"
      />
      <text x={frame.right} y={props.height - 1} textAnchor="end" className="mp-axis-word">
        {t.drawings.timeAxis}
      </text>
    </>
  );
}

function Grounds(props: { data: SettlingData; layout: SettlingLayout }) {
  const { data, layout } = props;
  const { x, y, frame } = layout;
  const band = data.band ?? [];
  return (
    <>
      {data.target === undefined ? null : (
        <>
          <rect
            x={frame.left}
            y={y(data.target.highA)}
            width={frame.right - frame.left}
            height={y(data.target.lowA) - y(data.target.highA)}
            fill="var(--reed-wash)"
          />
          <path
            d={`M${frame.left} ${y(data.target.highA)}H${frame.right}M${frame.left} ${y(data.target.lowA)}H${frame.right}`}
            stroke="var(--reed)"
          />
        </>
      )}
      <path
        d={bandPath(
          band.map((point) => ({ x: x(point.seconds), y: y(point.highA) })),
          band.map((point) => ({ x: x(point.seconds), y: y(point.lowA) })),
        )}
        fill="var(--heron-wash)"
      />
      {(data.limits ?? []).map((limit) => (
        <g key={limit.label}>
          <path
            d={`M${frame.left} ${y(limit.currentA)}H${frame.right}`}
            stroke="var(--brick)"
            strokeWidth="1.5"
          />
          <text
            x={frame.left + 4}
            y={y(limit.currentA) - 4}
            className="mp-axis-word"
            fill="var(--brick)"
          >
            {limit.label}
          </text>
        </g>
      ))}
    </>
  );
}

function Curve(props: { curve: SettlingCurve; layout: SettlingLayout; labelShare: number }) {
  const { curve, layout } = props;
  const points = curve.points.map((point) => ({
    x: layout.x(point.seconds),
    y: layout.y(point.currentA),
  }));
  const isMeasured = curve.kind === 'measured';
  const anchor = points[Math.floor((points.length - 1) * props.labelShare)];
  const isRising = (points.at(-1)?.y ?? 0) < (points[0]?.y ?? 0);
  return (
    <>
      <path
        d={linePath(points)}
        fill="none"
        stroke="var(--heron)"
        strokeWidth={isMeasured ? 2 : 1.5}
        strokeDasharray={isMeasured ? undefined : '5 3'}
      />
      {curve.label === undefined || anchor === undefined ? null : (
        <text
          x={anchor.x + 10}
          y={anchor.y + (isRising ? 16 : -8)}
          className="mp-axis-word mp-halo"
        >
          {curve.label}
        </text>
      )}
    </>
  );
}

function Figures(props: { curves: readonly SettlingCurve[] }) {
  const first = props.curves[0];
  const rows = first === undefined ? [] : thinPoints(first.points, 13);
  return (
    <Disclosure summary={t.drawings.figures}>
      <Table
        caption={first?.label ?? t.drawings.figures}
        columns={[
          {
            key: 'time',
            head: t.drawings.time,
            mono: true,
            cell: (row) => formatHours(row.seconds),
          },
          {
            key: 'current',
            head: first?.label ?? '',
            label: t.drawings.figures,
            mono: true,
            align: 'right',
            cell: (row) => tableCurrent(row.currentA),
          },
        ]}
        rows={rows}
        rowKey={(row) => row.seconds}
      />
    </Disclosure>
  );
}

/** Current against time since the voltage match: lines named where they run, no legend. */
export function SettlingChart(props: SettlingChartProps) {
  const [ref, width] = useElementWidth<HTMLDivElement>(700);
  const height = 262;
  const layout = layOutSettling(props, width, height);
  const { target } = props;
  return (
    <figure className="mp-drawing" ref={ref}>
      <svg width={width} height={height} role="img" aria-label={props.summary}>
        <Grounds data={props} layout={layout} />
        <Axes layout={layout} height={height} />
        {props.curves.map((curve) => (
          <Curve
            key={curve.key}
            curve={curve}
            layout={layout}
            labelShare={curve.kind === 'measured' ? 0.12 : 0.04}
          />
        ))}
        {target === undefined ? null : (
          <text
            x={layout.frame.right}
            y={layout.y(target.lowA) + 13}
            textAnchor="end"
            className="mp-axis-word mp-halo"
            fill="var(--reed)"
            style={{ fill: 'var(--reed)' }}
          >
            {target.label}
          </text>
        )}
        <SettlingUprights
          layout={layout}
          target={target}
          likelySeconds={props.likelySeconds}
          safeSeconds={props.safeSeconds}
        />
      </svg>
      <Figures curves={props.curves} />
    </figure>
  );
}
