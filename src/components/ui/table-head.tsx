import { t } from '#src/texts/t.ts';
import { cellClass } from './table-cell.view.ts';
import type { Column } from './table.tsx';

export type SortDirection = 'ascending' | 'descending';
export type Sort = { readonly key: string; readonly direction: SortDirection };

function SortHead(props: {
  head: string;
  direction: SortDirection | undefined;
  onSort: (direction: SortDirection) => void;
}) {
  const { direction } = props;
  return (
    <button
      type="button"
      className="mp-sort"
      title={t.ui.sortBy(props.head)}
      onClick={() => {
        props.onSort(direction === 'ascending' ? 'descending' : 'ascending');
      }}
    >
      {props.head}
      {direction === undefined ? null : (
        <svg className="mp-sort-arrow" viewBox="0 0 7 8" aria-hidden="true">
          <path
            d={direction === 'ascending' ? 'M3.5 1 6.5 7H.5z' : 'M3.5 7 6.5 1H.5z'}
            fill="currentColor"
          />
        </svg>
      )}
    </button>
  );
}

function HeadWords<Row>(props: { column: Column<Row> }) {
  const { head, label, scale } = props.column;
  if (scale !== undefined) {
    return (
      <>
        {scale}
        <span className="mp-hidden">{head}</span>
      </>
    );
  }
  return head === '' ? <span className="mp-hidden">{label}</span> : head;
}

/** Roles are written out because the stacked phone form takes the table display away. */
export function TableHead<Row>(props: {
  columns: readonly Column<Row>[];
  sort: Sort | undefined;
  onSort: ((sort: Sort) => void) | undefined;
}) {
  const { onSort, sort } = props;
  return (
    <thead role="rowgroup">
      <tr role="row">
        {props.columns.map((column) => {
          const direction = sort?.key === column.key ? sort.direction : undefined;
          const canSort = column.sortable === true && onSort !== undefined;
          return (
            <th
              key={column.key}
              role="columnheader"
              scope="col"
              className={cellClass(column, 'head')}
              style={column.width === undefined ? undefined : { width: column.width }}
              aria-sort={canSort ? (direction ?? 'none') : undefined}
            >
              {canSort ? (
                <SortHead
                  head={column.head}
                  direction={direction}
                  onSort={(next) => {
                    onSort({ key: column.key, direction: next });
                  }}
                />
              ) : (
                <HeadWords column={column} />
              )}
            </th>
          );
        })}
      </tr>
    </thead>
  );
}
