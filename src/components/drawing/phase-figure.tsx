import { useElementWidth } from '#src/hooks/use-element-width.ts';
import { t } from '#src/texts/t.ts';
import { barInks, type BarTone } from './bar-tones.ts';
import {
  hourTicks,
  layOutPhases,
  placeCaptions,
  type BarPhase,
  type PartName,
} from './phase-bar.view.ts';
import { DoorUpright, PhaseParts } from './phase-parts.tsx';

function nameOf(part: PartName, isNarrow: boolean): string {
  const short = t.drawings.shortPhases;
  if (isNarrow && (part === 'hold' || part === 'margin' || part === 'wait')) {
    return short[part];
  }
  return t.drawings.phases[part];
}

/** The same bar as large as a page wants it, with the parts named and an hour axis. */
export function PhaseFigure(props: {
  phases: readonly BarPhase[];
  /** The whole drawing in one sentence: the slot with its longest parts. */
  label: string;
  tone?: BarTone | undefined;
  /** `false` for the key, which explains parts and no lengths. */
  hasAxis?: boolean | undefined;
}) {
  const [ref, width] = useElementWidth<HTMLDivElement>(754);
  const hasAxis = props.hasAxis ?? true;
  const inks = barInks[props.tone ?? 'heron'];
  const inner = width - 6;
  const parts = layOutPhases(props.phases, inner);
  const total = props.phases.reduce((sum, phase) => sum + phase.seconds, 0);
  const named = (part: PartName) => nameOf(part, inner < 900);
  return (
    <div className="mp-drawing" ref={ref}>
      <svg width={width} height={hasAxis ? 68 : 50} role="img" aria-label={props.label}>
        <g transform="translate(3 0)">
          <PhaseParts parts={parts} top={3} foot={28} inks={inks} />
          <DoorUpright x={0.8} height={30} ink={inks.door} />
          <DoorUpright x={inner - 0.8} height={30} ink={inks.door} />
          {placeCaptions(parts, inner, named).map((caption) => (
            <text key={caption.part} x={caption.x} y="44" className="mp-axis-word">
              {named(caption.part)}
            </text>
          ))}
          {hasAxis && total > 0 ? <HourAxis total={total} width={inner} /> : null}
        </g>
      </svg>
    </div>
  );
}

function HourAxis(props: { total: number; width: number }) {
  return (
    <>
      <path d={`M0 52.5H${props.width}`} stroke="var(--rule-2)" />
      {hourTicks(props.total, props.width).map((tick) => (
        <g key={tick.hours}>
          <path d={`M${tick.x + 0.5} 52v4`} stroke="var(--rule-2)" />
          {tick.isNamed && tick.x + 30 < props.width ? (
            <text x={tick.x + 4} y="65" className="mp-axis">
              {t.drawings.hours(tick.hours)}
            </text>
          ) : null}
        </g>
      ))}
    </>
  );
}
