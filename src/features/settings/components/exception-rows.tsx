import { Button } from '#src/components/ui/button.tsx';
import { DateInput, TextInput } from '#src/components/ui/input.tsx';
import { Table } from '#src/components/ui/table.tsx';
import { t } from '#src/texts/t.ts';

export type ExceptionDraft = {
  readonly day: string;
  readonly hours: string;
  readonly reason: string;
};
type Row = ExceptionDraft & { readonly index: number };

const words = t.settings;

/** Days that differ from the week: holidays, short days, extra Saturdays. */
export function ExceptionRows(props: {
  rows: readonly ExceptionDraft[];
  onChange: (rows: readonly ExceptionDraft[]) => void;
}) {
  const { rows, onChange } = props;
  const heads = words.exceptionColumns;
  const set = (index: number, change: Partial<ExceptionDraft>) => {
    onChange(rows.map((row, place) => (place === index ? { ...row, ...change } : row)));
  };
  const name = (row: Row, head: string) => `${head}, ${row.day === '' ? row.index + 1 : row.day}`;
  return (
    <>
      <Table
        caption={words.exceptions}
        rows={rows.map((row, index): Row => ({ ...row, index }))}
        rowKey={(row) => row.index}
        empty={words.noExceptions}
        middle
        stack
        columns={[
          {
            key: 'day',
            head: heads.day,
            width: 170,
            cell: (row) => (
              <DateInput
                aria-label={name(row, heads.day)}
                value={row.day}
                onChange={(event) => {
                  set(row.index, { day: event.target.value });
                }}
              />
            ),
          },
          {
            key: 'hours',
            head: heads.hours,
            cell: (row) => (
              <TextInput
                aria-label={name(row, heads.hours)}
                value={row.hours}
                onChange={(event) => {
                  set(row.index, { hours: event.target.value });
                }}
              />
            ),
          },
          {
            key: 'reason',
            head: heads.reason,
            cell: (row) => (
              <TextInput
                aria-label={name(row, heads.reason)}
                value={row.reason}
                onChange={(event) => {
                  set(row.index, { reason: event.target.value });
                }}
              />
            ),
          },
          {
            key: 'act',
            head: '',
            label: words.actions,
            align: 'right',
            cell: (row) => (
              <Button
                kind="link"
                aria-label={name(row, words.removeException)}
                onClick={() => {
                  onChange(rows.filter((_, index) => index !== row.index));
                }}
              >
                {words.removeException}
              </Button>
            ),
          },
        ]}
      />
      <div className="mp-acts mt-2">
        <Button
          size="small"
          onClick={() => {
            onChange([...rows, { day: '', hours: '', reason: '' }]);
          }}
        >
          {words.addException}
        </Button>
      </div>
    </>
  );
}
