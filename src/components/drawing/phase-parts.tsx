import type { ReactNode } from 'react';
import type { BarInks } from './bar-tones.ts';
import type { BarPart, PartName } from './phase-bar.view.ts';

type Ground = { readonly top: number; readonly foot: number; readonly inks: BarInks };
type Draw = (part: BarPart, ground: Ground) => ReactNode;

const footLine: Draw = ({ x, width }, { foot, inks }) => (
  <path d={`M${x} ${foot - 1}h${width}`} stroke={inks.edge} strokeWidth="2" />
);

const solid: Draw = ({ x, width }, { top, foot, inks }) => (
  <rect x={x} y={top} width={width} height={foot - top} fill={inks.solid} />
);

/** The drawing of each part; the words for them are the table of the notebook's key. */
const drawings: Record<PartName, Draw> = {
  connect: footLine,
  unload: footLine,
  ramp: ({ x, width }, { top, foot, inks }) => (
    <path
      d={`M${x} ${foot}L${x + width} ${top}V${foot}z`}
      fill={inks.mid}
      stroke={inks.edge}
      strokeWidth="1"
    />
  ),
  soak: ({ x, width }, { top, foot, inks }) => (
    <>
      <rect x={x} y={top} width={width} height={foot - top} fill={inks.mid} />
      <path d={`M${x} ${top + 0.5}h${width}`} stroke={inks.edge} strokeWidth="1" />
    </>
  ),
  match: ({ x, width }, { top, foot, inks }) => (
    <rect
      x={x + 0.5}
      y={top + 0.5}
      width={Math.max(0.5, width - 1)}
      height={foot - top - 1}
      fill="var(--sheet)"
      stroke={inks.edge}
      strokeWidth="1"
    />
  ),
  hold: solid,
  measure: (part, ground) => (
    <>
      {solid(part, ground)}
      <rect x={part.x} y={ground.foot - 3} width={part.width} height="3" fill={ground.inks.deep} />
      <path d={`M${part.x} ${ground.foot - 3.5}h${part.width}`} stroke="var(--sheet)" />
    </>
  ),
  margin: ({ x, width }, { top, foot, inks }) => (
    <rect
      x={x + 0.5}
      y={top + 0.5}
      width={Math.max(0.5, width - 1)}
      height={foot - top - 1}
      fill={inks.wash}
      stroke={inks.edge}
      strokeWidth="1"
      strokeDasharray="2 2"
    />
  ),
  wait: ({ x, width }, { foot, inks }) => (
    <path
      d={`M${x} ${foot - 1}h${width}`}
      stroke={inks.mid}
      strokeWidth="1.4"
      strokeDasharray="1.5 4"
    />
  ),
  return: ({ x, width }, { foot, inks }) => (
    <path d={`M${x} ${foot - 1.25}h${width}`} stroke={inks.mid} strokeWidth="2.5" />
  ),
};

export function PhaseParts(props: { parts: readonly BarPart[] } & Ground) {
  const ground = { top: props.top, foot: props.foot, inks: props.inks };
  return props.parts.map((part) => (
    <g key={part.x} data-part={part.part}>
      {drawings[part.part](part, ground)}
    </g>
  ));
}

/** An upright with a cross-bar: the door opens. */
export function DoorUpright(props: { x: number; height: number; ink: string }) {
  return (
    <path
      d={`M${props.x} 0v${props.height}M${props.x - 2.5} .8h5`}
      stroke={props.ink}
      strokeWidth="1.6"
      fill="none"
    />
  );
}

/** A V cut where the trouble begins and a marigold line from there on. */
export function RiskNotch(props: { x: number; end: number; top: number; ground: string }) {
  const { top } = props;
  const left = props.x - 6;
  const right = props.x + 6;
  return (
    <g data-part="notch">
      <path
        d={`M${left} ${top - 1}L${props.x} ${top + 9}L${right} ${top - 1}z`}
        fill={props.ground}
      />
      <path
        d={`M${left} ${top - 0.5}L${props.x} ${top + 9}L${right} ${top - 0.5}H${Math.max(right, props.end)}`}
        stroke="var(--marigold)"
        strokeWidth="2"
        fill="none"
        strokeLinejoin="round"
      />
    </g>
  );
}
