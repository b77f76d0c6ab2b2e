import { layOutGauge, type GaugeInput } from './row-gauge.view.ts';

const middle = 9.5;

function Whisker(props: { at: number; from: number; to: number; isBeyond: boolean }) {
  return (
    <>
      <path
        d={`M${props.from} ${middle}H${props.to}M${props.from} 6.5v6M${props.to} 6.5v6`}
        stroke="var(--ink)"
        strokeWidth="1.3"
      />
      <circle
        cx={props.at}
        cy={middle}
        r="3.2"
        fill={props.isBeyond ? 'var(--paper)' : 'var(--ink)'}
        stroke="var(--ink)"
        strokeWidth={props.isBeyond ? 1.5 : 0}
      />
    </>
  );
}

/** One row of a calibration: the whisker is U, uprights the limits, shaded the guard band. */
export function RowGauge(
  props: GaugeInput & {
    width?: number | undefined;
    /** Left out where the cells of the row say the figures, as in a table of points. */
    label?: string | undefined;
  },
) {
  const width = props.width ?? 148;
  const gauge = layOutGauge(props, width);
  return (
    <svg
      width={width}
      height="18"
      role={props.label === undefined ? undefined : 'img'}
      aria-label={props.label}
      aria-hidden={props.label === undefined ? true : undefined}
    >
      {[gauge.lowLimit, gauge.highLimit - gauge.guardWidth].map((x) => (
        <rect
          key={x}
          x={x}
          y="5"
          width={gauge.guardWidth}
          height="9"
          fill="var(--marigold)"
          opacity=".38"
        />
      ))}
      <path d={`M0 ${middle}H${width}`} stroke="var(--rule-2)" />
      <path d={`M${gauge.zero} 6v7`} stroke="var(--rule-2)" />
      <path
        d={`M${gauge.lowLimit} 2v15M${gauge.highLimit} 2v15`}
        stroke="var(--brick)"
        strokeWidth="1.5"
      />
      <Whisker at={gauge.error} from={gauge.from} to={gauge.to} isBeyond={gauge.isBeyond} />
    </svg>
  );
}

/** Temperature-induced current against its allowance: the whisker decides among three answers. */
export function AllowanceGauge(props: {
  value: number;
  uncertainty: number;
  allowance: number;
  width?: number | undefined;
  label?: string | undefined;
}) {
  const width = props.width ?? 148;
  const upright = width * 0.6;
  const held = (value: number) =>
    Math.min(width - 4, Math.max(2, (value / props.allowance) * upright));
  return (
    <svg
      width={width}
      height="18"
      role={props.label === undefined ? undefined : 'img'}
      aria-label={props.label}
      aria-hidden={props.label === undefined ? true : undefined}
    >
      <path d={`M0 ${middle}H${width}M.5 5v9`} stroke="var(--rule-2)" fill="none" />
      <path d={`M${upright} 2v15`} stroke="var(--brick)" strokeWidth="1.5" />
      <Whisker
        at={held(props.value)}
        from={held(props.value - props.uncertainty)}
        to={held(props.value + props.uncertainty)}
        isBeyond={(props.value / props.allowance) * upright > width - 4}
      />
    </svg>
  );
}
