import type { ReactNode } from 'react';
import { Kbd } from './kbd.tsx';
import { Mark, type MarkName, type Tone } from './mark.tsx';

export type SlipLine = {
  readonly key: string;
  readonly kind: 'stop' | 'caution' | 'pass';
  readonly title?: string | undefined;
  readonly text: ReactNode;
  /** The name of the rule, in mono. */
  readonly code?: string | undefined;
  readonly ways?: ReactNode;
};

const looks: Record<SlipLine['kind'], { mark: MarkName; tone: Tone; word: string }> = {
  stop: { mark: 'stop', tone: 'brick', word: 'mp-word-brick' },
  caution: { mark: 'caution', tone: 'marigold', word: 'mp-word-marigold' },
  pass: { mark: 'pass', tone: 'reed', word: 'mp-word-reed' },
};

/** What a placement would mean: stops, cautions, one line for the passes, keys in the foot. */
export function Slip(props: {
  title: ReactNode;
  subtitle?: ReactNode;
  lines: readonly SlipLine[];
  keys?: readonly { keys: string; does: string }[] | undefined;
  label: string;
  actions?: ReactNode;
}) {
  return (
    <section className="mp-slip" aria-label={props.label}>
      <div className="mp-slip-head">
        <b>{props.title}</b>
        {props.subtitle === undefined ? null : <p>{props.subtitle}</p>}
      </div>
      <ul>
        {props.lines.map((line) => (
          <li key={line.key}>
            <Mark name={looks[line.kind].mark} tone={looks[line.kind].tone} />
            <div className="min-w-0">
              {line.title === undefined ? null : (
                <b className={looks[line.kind].word}>{line.title} </b>
              )}
              {line.text}
              {line.code === undefined ? null : <span className="mp-slip-code"> {line.code}</span>}
              {line.ways === undefined ? null : <div className="mp-slip-ways">{line.ways}</div>}
            </div>
          </li>
        ))}
      </ul>
      {props.actions === undefined ? null : <div className="mp-acts p-3">{props.actions}</div>}
      {props.keys === undefined ? null : (
        <div className="mp-slip-foot">
          {props.keys.map((entry) => (
            <span key={entry.keys}>
              <Kbd>{entry.keys}</Kbd> {entry.does}
            </span>
          ))}
        </div>
      )}
    </section>
  );
}
