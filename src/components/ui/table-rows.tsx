import type { ReactNode } from 'react';
import { cellClass } from './table-cell.view.ts';
import type { Column, RowState } from './table.tsx';

export function TableRows<Row>(props: {
  columns: readonly Column<Row>[];
  rows: readonly Row[];
  rowKey: (row: Row) => string | number;
  rowState: ((row: Row) => RowState | undefined) | undefined;
  foot: readonly ReactNode[] | undefined;
}) {
  return (
    <>
      <tbody role="rowgroup">
        {props.rows.map((row) => (
          <tr key={props.rowKey(row)} role="row" data-state={props.rowState?.(row)}>
            {props.columns.map((column) => (
              <td
                key={column.key}
                role="cell"
                className={cellClass(column, 'body')}
                data-label={column.head === '' ? undefined : column.head}
              >
                {column.cell(row)}
              </td>
            ))}
          </tr>
        ))}
      </tbody>
      {props.foot === undefined ? null : (
        <tfoot role="rowgroup">
          <tr role="row">
            {props.columns.map((column, index) => (
              <td key={column.key} role="cell" className={cellClass(column, 'body')}>
                {props.foot?.[index]}
              </td>
            ))}
          </tr>
        </tfoot>
      )}
    </>
  );
}
