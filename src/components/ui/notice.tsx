import type { ReactNode } from 'react';
import { Mark, type MarkName, type Tone } from './mark.tsx';

type NoticeKind = 'stop' | 'caution' | 'info' | 'pass';

const looks: Record<NoticeKind, { mark: MarkName; tone: Tone; word: string }> = {
  stop: { mark: 'stop', tone: 'brick', word: 'mp-word-brick' },
  caution: { mark: 'caution', tone: 'marigold', word: 'mp-word-marigold' },
  info: { mark: 'to-do', tone: 'heron', word: '' },
  pass: { mark: 'pass', tone: 'reed', word: 'mp-word-reed' },
};

/** One thing to know: mark, the matter in bold, a plain sentence, the ways out. */
export function Notice(props: {
  kind: NoticeKind;
  title?: ReactNode;
  children?: ReactNode;
  ways?: ReactNode;
  ruled?: boolean | undefined;
  /** `alert` for what just went wrong, `status` for what just changed. */
  role?: 'alert' | 'status' | undefined;
}) {
  const look = looks[props.kind];
  return (
    <div className={props.ruled ? 'mp-notice mp-notice-ruled' : 'mp-notice'} role={props.role}>
      <Mark name={look.mark} tone={look.tone} />
      <div className="min-w-0">
        {props.title === undefined ? null : <b className={look.word}>{props.title}</b>}{' '}
        {props.children}
        {props.ways === undefined ? null : <div className="mp-notice-foot">{props.ways}</div>}
      </div>
    </div>
  );
}
