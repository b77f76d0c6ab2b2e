import type { ReactNode } from 'react';
import { useOverflows } from '#src/hooks/use-overflows.ts';
import { t } from '#src/texts/t.ts';
import { Button } from './button.tsx';
import { EmptyState, ErrorState, Loading } from './feedback.tsx';
import { TableHead, type Sort } from './table-head.tsx';
import { TableRows } from './table-rows.tsx';

export type { Sort, SortDirection } from './table-head.tsx';
export type RowState = 'act' | 'inform' | 'blocked' | 'past';

export type Column<Row> = {
  readonly key: string;
  /** Empty for a column of actions; give it `label` then. */
  readonly head: string;
  readonly label?: string | undefined;
  /** Drawn in the head instead of its words, which are then read out only: the scale of a drawing. */
  readonly scale?: ReactNode;
  readonly cell: (row: Row) => ReactNode;
  readonly align?: 'left' | 'right' | undefined;
  /** Measured values: mono, tabular, never wrapped. */
  readonly mono?: boolean | undefined;
  readonly nowrap?: boolean | undefined;
  readonly width?: string | number | undefined;
  readonly sortable?: boolean | undefined;
};

export type TableProps<Row> = {
  /** Read out, not shown: the section head above says it to the eye. */
  caption: string;
  columns: readonly Column<Row>[];
  rows: readonly Row[];
  rowKey: (row: Row) => string | number;
  rowState?: ((row: Row) => RowState | undefined) | undefined;
  sort?: Sort | undefined;
  onSort?: ((sort: Sort) => void) | undefined;
  isLoading?: boolean | undefined;
  error?:
    | { detail: string; requestId?: string | undefined; onRetry?: (() => void) | undefined }
    | undefined;
  empty?: ReactNode;
  /** The total line, one node per column. */
  foot?: readonly ReactNode[] | undefined;
  more?: { onMore: () => void; busy?: boolean | undefined; total?: number | undefined } | undefined;
  /** On the phone: rows become short lists; without it the first column stays and the rest scrolls. */
  stack?: boolean | undefined;
  /** Cells with controls sit better on their middle than on their baseline. */
  middle?: boolean | undefined;
};

function TableFoot(props: { shown: number; more: NonNullable<TableProps<never>['more']> }) {
  const { more, shown } = props;
  return (
    <div className="mp-table-foot">
      <Button kind="link" onClick={more.onMore} busy={more.busy}>
        {t.ui.showMore}
      </Button>
      <span>
        {more.total === undefined ? t.ui.showing(shown) : t.ui.showingOf(shown, more.total)}
      </span>
    </div>
  );
}

function Frame(props: { caption: string; children: ReactNode }) {
  const [frame, overflows] = useOverflows();
  return (
    <div
      className="mp-table-frame"
      ref={frame}
      role={overflows ? 'region' : undefined}
      aria-label={overflows ? t.ui.scrollable(props.caption) : undefined}
      tabIndex={overflows ? 0 : undefined}
    >
      {props.children}
    </div>
  );
}

/** The main form of the product: ruled, no zebra, the last column flush right. */
export function Table<Row>(props: TableProps<Row>) {
  if (props.error !== undefined && props.rows.length === 0) {
    return <ErrorState {...props.error} />;
  }
  if (props.isLoading && props.rows.length === 0) {
    return <Loading what={props.caption} />;
  }
  if (props.rows.length === 0) {
    return <EmptyState>{props.empty}</EmptyState>;
  }
  const names = ['mp-table', props.stack ? 'mp-table-stacked' : 'mp-table-scrolls'];
  if (props.middle) {
    names.push('mp-table-middle');
  }
  return (
    <>
      <Frame caption={props.caption}>
        <table className={names.join(' ')} role="table" aria-busy={props.isLoading}>
          <caption className="mp-hidden">{props.caption}</caption>
          <TableHead columns={props.columns} sort={props.sort} onSort={props.onSort} />
          <TableRows
            columns={props.columns}
            rows={props.rows}
            rowKey={props.rowKey}
            rowState={props.rowState}
            foot={props.foot}
          />
        </table>
      </Frame>
      {props.error === undefined ? null : <ErrorState {...props.error} />}
      {props.more === undefined ? null : <TableFoot shown={props.rows.length} more={props.more} />}
    </>
  );
}
