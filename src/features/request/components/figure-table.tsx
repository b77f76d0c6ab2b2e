import type { Figure } from '#shared/domain/hold-estimate/types.ts';
import { Table } from '#src/components/ui/table.tsx';
import { formatNumber, thinSpace } from '#src/lib/format-number.ts';
import { t } from '#src/texts/t.ts';

const words = t.request;

const exponentFrom = 1e5;
const exponentBelow = 1e-3;

/** Three digits, with a power of ten where the figure is very large or small. */
function figureText(value: number, unit: string): string {
  const size = Math.abs(value);
  const isPlain = size === 0 || (size >= exponentBelow && size < exponentFrom);
  const decimals = size >= 100 ? 0 : size >= 10 ? 1 : size >= 1 ? 2 : 4;
  const figure = isPlain ? formatNumber(value, { decimals }) : powerText(value);
  return unit === '' ? figure : `${figure}${thinSpace}${unit}`;
}

const raised: Readonly<Record<string, string>> = {
  '-': '⁻',
  '0': '⁰',
  '1': '¹',
  '2': '²',
  '3': '³',
  '4': '⁴',
  '5': '⁵',
  '6': '⁶',
  '7': '⁷',
  '8': '⁸',
  '9': '⁹',
};

function powerText(value: number): string {
  const [mantissa = '', exponent = '0'] = value.toExponential(2).split('e');
  const power = String(Number(exponent)).replaceAll(/[-\d]/g, (sign) => raised[sign] ?? sign);
  return `${formatNumber(Number(mantissa), { decimals: 2 })} × 10${power}`;
}

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
