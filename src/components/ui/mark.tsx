import { markShapes, markWidth, type MarkName } from './mark-shapes.tsx';

export type { MarkName } from './mark-shapes.tsx';
export type Tone = 'reed' | 'heron' | 'marigold' | 'brick' | 'ink';

/** A mark alone. It says nothing to a screen reader: its word stands beside it. */
export function Mark(props: {
  name: MarkName;
  tone?: Tone | undefined;
  /** Height in px; the width follows. */
  size?: number | undefined;
}) {
  const width = markWidth(props.name);
  const height = props.size ?? 14;
  return (
    <svg
      className={`mp-mark mp-tone-${props.tone ?? 'ink'}`}
      width={(width * height) / 14}
      height={height}
      viewBox={`0 0 ${width} 14`}
      aria-hidden="true"
    >
      {markShapes[props.name]}
    </svg>
  );
}
