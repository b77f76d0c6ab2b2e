import { useQuery } from '@tanstack/react-query';
import { Button } from '#src/components/ui/button.tsx';
import { EmptyState, ErrorState, Loading } from '#src/components/ui/feedback.tsx';
import { useNow } from '#src/hooks/use-now.ts';
import { useSite } from '#src/hooks/use-site.ts';
import { siteCalendar } from '#src/lib/format-date.ts';
import { tableError } from '#src/lib/table-error.ts';
import { t } from '#src/texts/t.ts';
import { boardQuery } from '../api/get-board.ts';
import { boardSpan } from '../board-window.view.ts';
import { useBoardState, type BoardState } from '../use-board-state.ts';
import { BoardKey } from './board-key.tsx';
import { BoardTimeline } from './board-timeline.tsx';
import { BoardToolbar } from './board-toolbar.tsx';

const rowsAtOnce = 40;

function RowPaging(props: { state: BoardState; shown: number; rowCount: number }) {
  const { state, shown, rowCount } = props;
  if (rowCount <= rowsAtOnce && state.offset === 0) {
    return null;
  }
  return (
    <div className="mp-acts mp-board-paging">
      {state.offset > 0 ? (
        <Button
          kind="link"
          onClick={() => {
            state.setOffset(Math.max(0, state.offset - rowsAtOnce));
          }}
        >
          {t.board.earlierRows}
        </Button>
      ) : null}
      <span className="mp-note">
        {t.board.rowsShown(state.offset + 1, state.offset + shown, rowCount)}
      </span>
      {state.offset + shown < rowCount ? (
        <Button
          kind="link"
          onClick={() => {
            state.setOffset(state.offset + rowsAtOnce);
          }}
        >
          {t.board.laterRows}
        </Button>
      ) : null}
    </div>
  );
}

/** The resource timeline: to read. Bookings are made and moved by form. */
export function BoardPage() {
  const site = useSite();
  const nowMs = useNow(60_000);
  const { today } = siteCalendar(nowMs, site.zone);
  const state = useBoardState(today);
  const span = boardSpan(state.view, state.day, site.zone);
  const board = useQuery(
    boardQuery(site.code, {
      from: new Date(span.startMs).toISOString(),
      to: new Date(span.endMs).toISOString(),
      groups: state.groups.join(','),
      open: [...state.open].join(','),
      text: state.text,
      offset: state.offset,
      limit: rowsAtOnce,
    }),
  );
  const failure = tableError(board);
  return (
    <div className="mp-page mp-board-page">
      <title>{`${t.board.title} · ${t.layout.product}`}</title>
      <div className="mp-board-head">
        <h1>{t.board.title}</h1>
        <BoardToolbar span={span} state={state} today={today} />
      </div>
      {failure === undefined ? null : <ErrorState {...failure} />}
      {board.data === undefined ? (
        failure === undefined ? (
          <Loading what={t.board.loading} />
        ) : null
      ) : board.data.rows.length === 0 ? (
        <EmptyState>{t.board.nothing}</EmptyState>
      ) : (
        <>
          <BoardTimeline
            data={board.data}
            span={span}
            nowMs={nowMs}
            open={state.open}
            onToggle={state.toggle}
          />
          <RowPaging state={state} shown={board.data.rows.length} rowCount={board.data.rowCount} />
        </>
      )}
      <BoardKey />
    </div>
  );
}
