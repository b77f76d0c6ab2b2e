import type { Figure } from '#shared/domain/hold-estimate/types.ts';
import { Table } from '#src/components/ui/table.tsx';
import { t } from '#src/texts/t.ts';
import { figureText } from '../figure-text.view.ts';

const words = t.request;

/** Each figure of an estimate: value, formula with inputs, where it comes from. */
export function FigureTable(props: { figures: readonly Figure[] }) {
  const heads = words.figureColumns;
  return (
    <Table
      caption={words.figures}
      rows={props.figures}
      rowKey={(row) => row.key}
      stack
      columns={[
        { key: 'figure', head: heads.figure, cell: (row) => row.label },
        {
          key: 'value',
          head: heads.value,
          mono: true,
          align: 'right',
          cell: (row) => figureText(row.value, row.unit),
        },
        {
          key: 'formula',
          head: heads.formula,
          cell: (row) => (
            <>
              <span className="font-mono">{row.formula}</span>
              {row.inputs.map((input) => (
                <span key={input.label} className="mp-note block">
                  {input.label} = {figureText(input.value, input.unit)}
                </span>
              ))}
            </>
          ),
        },
        {
          key: 'source',
          head: heads.source,
          cell: (row) => (
            <>
              {row.source} <span className="mp-note block">{words.origins[row.origin]}</span>
            </>
          ),
        },
      ]}
    />
  );
}
