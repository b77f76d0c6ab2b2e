import { Link } from 'react-router-dom';
import { CalibrationMark } from '#src/components/ui/calibration-state.tsx';
import { useSite } from '#src/hooks/use-site.ts';
import { t } from '#src/texts/t.ts';
import type { BoardLine } from '../board-rows.view.ts';

function Opener(props: { tag: string; isOpen: boolean; onToggle: () => void }) {
  const words = t.board;
  return (
    <button
      type="button"
      className="mp-board-opener"
      aria-expanded={props.isOpen}
      aria-label={props.isOpen ? words.fold(props.tag) : words.unfold(props.tag)}
      onClick={props.onToggle}
    >
      <svg width="9" height="9" viewBox="0 0 9 9" aria-hidden="true">
        <path d={props.isOpen ? 'M0 2h9L4.5 7.5z' : 'M2 0v9L7.5 4.5z'} fill="currentColor" />
      </svg>
    </button>
  );
}

/** The left end of a row: what it is, its calibration state, a few words. */
export function BoardRowLabel(props: { line: BoardLine; onToggle: (key: string) => void }) {
  const site = useSite();
  const { line } = props;
  if (line.kind === 'heading') {
    return (
      <span className="mp-board-heading">
        <b>{t.board.groups[line.group]}</b>{' '}
        <span className="mp-note">{t.board.groupCount(line.count, line.openCount)}</span>
      </span>
    );
  }
  const { row } = line;
  return (
    <span className={row.parentKey === null ? 'mp-board-label' : 'mp-board-label mp-board-child'}>
      {line.kind === 'tide' ? (
        <Opener
          tag={row.key}
          isOpen={line.isOpen}
          onToggle={() => {
            props.onToggle(row.key);
          }}
        />
      ) : null}
      {row.badge === null ? null : <CalibrationMark badge={row.badge} />}
      <Link to={`/${site.code}${row.href}`} className="mp-board-tag">
        {row.label}
      </Link>
      <span className="mp-note mp-board-note" title={row.note}>
        {row.note}
      </span>
    </span>
  );
}
