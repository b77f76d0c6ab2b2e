import { barInks, type BarTone } from './bar-tones.ts';
import { layOutPhases, placeBarWords, type BarPart, type BarPhase } from './phase-bar.view.ts';
import { DoorUpright, PhaseParts, RiskNotch } from './phase-parts.tsx';

export type { BarTone } from './bar-tones.ts';
export type { BarPhase, PhaseName } from './phase-bar.view.ts';

export type PhaseBarProps = {
  phases: readonly BarPhase[];
  width: number;
  /** Of the whole drawing with its uprights; 21 in a board row of 22, where the bar is 16. */
  height?: number | undefined;
  tone?: BarTone | undefined;
  /** The booking number, then the cells if there is room. */
  number?: string | undefined;
  words?: string | undefined;
  /** Seconds from the start at which the trouble begins; drawn for tone `at-risk`. */
  riskFromSeconds?: number | undefined;
  /** The own move: lifted by a small shadow. */
  isLifted?: boolean | undefined;
  /** Lies on sheet instead of paper (the notch shows what is behind). */
  onSheet?: boolean | undefined;
  /** The sentence of the drawing; left out where the row says it already. */
  label?: string | undefined;
};

function riskX(phases: readonly BarPhase[], width: number, fromSeconds: number): number {
  const total = phases.reduce((sum, phase) => sum + phase.seconds, 0);
  return total === 0 ? 0 : Math.min(width, Math.max(0, (fromSeconds / total) * width));
}

function Words(props: {
  parts: readonly BarPart[];
  number: string;
  words: string;
  y: number;
  ink: string;
}) {
  const placed = placeBarWords(props.parts, props.number, props.words);
  if (placed === undefined) {
    return null;
  }
  return (
    <text x={placed.x} y={props.y} className="mp-bar-number" fill={props.ink}>
      {placed.number}
      {placed.words === '' ? null : (
        <tspan dx="7" className="mp-bar-words">
          {placed.words}
        </tspan>
      )}
    </text>
  );
}

/** A booking, phase by phase, as one drawing. */
export function PhaseBar(props: PhaseBarProps) {
  const height = props.height ?? 21;
  const tone = props.tone ?? 'heron';
  const inks = barInks[tone];
  const parts = layOutPhases(props.phases, props.width);
  const top = 3;
  const foot = height - 2;
  return (
    <svg
      className={props.isLifted ? 'mp-bar-lifted' : undefined}
      width={props.width}
      height={height}
      role={props.label === undefined ? undefined : 'img'}
      aria-label={props.label}
      aria-hidden={props.label === undefined ? true : undefined}
    >
      <PhaseParts parts={parts} top={top} foot={foot} inks={inks} />
      <DoorUpright x={0.8} height={height} ink={inks.door} />
      <DoorUpright x={props.width - 0.8} height={height} ink={inks.door} />
      {props.number === undefined ? null : (
        <Words
          parts={parts}
          number={props.number}
          words={props.words ?? ''}
          y={(top + foot) / 2 + 2}
          ink={inks.number}
        />
      )}
      {tone === 'at-risk' && props.riskFromSeconds !== undefined ? (
        <RiskNotch
          x={riskX(props.phases, props.width, props.riskFromSeconds)}
          end={props.width}
          top={top}
          ground={props.onSheet ? 'var(--sheet)' : 'var(--paper)'}
        />
      ) : null}
    </svg>
  );
}

/** Where a dragged booking came from: its silhouette, dashed. */
export function PhaseOutline(props: {
  phases: readonly BarPhase[];
  width: number;
  height?: number | undefined;
}) {
  const foot = (props.height ?? 21) - 2;
  const parts = layOutPhases(props.phases, props.width);
  const raised = parts.filter(
    (part) => !['connect', 'unload', 'wait', 'return'].includes(part.part),
  );
  const from = raised[0];
  const to = raised.at(-1);
  if (from === undefined || to === undefined) {
    return null;
  }
  const rampEnd = from.part === 'ramp' ? from.x + from.width : from.x;
  return (
    <svg width={props.width} height={foot + 2} aria-hidden="true">
      <path
        d={`M0 ${foot}H${from.x}L${rampEnd} 3H${to.x + to.width}V${foot}H${props.width}`}
        fill="none"
        stroke="var(--edge)"
        strokeDasharray="3 2.5"
      />
    </svg>
  );
}
