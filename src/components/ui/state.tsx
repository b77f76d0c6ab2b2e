import type { ReactNode } from 'react';
import { Mark, type MarkName, type Tone } from './mark.tsx';

/** Shape first, then word, then colour: the form of every result and state. */
export function State(props: {
  mark: MarkName;
  tone?: Tone | undefined;
  children: ReactNode;
  /** A sentence instead of a word: the mark stays at its first line. */
  wrap?: boolean | undefined;
}) {
  const tone = props.tone ?? 'ink';
  const word = tone === 'marigold' || tone === 'brick' ? `mp-word-${tone}` : undefined;
  return (
    <span className={props.wrap ? 'mp-state mp-state-wrap' : 'mp-state whitespace-nowrap'}>
      <Mark name={props.mark} tone={tone} />
      <span className={word}>{props.children}</span>
    </span>
  );
}
