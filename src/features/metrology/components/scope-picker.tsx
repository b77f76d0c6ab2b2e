import { Button } from '#src/components/ui/button.tsx';
import { TextInput } from '#src/components/ui/input.tsx';
import { Table } from '#src/components/ui/table.tsx';
import { Tick } from '#src/components/ui/tick.tsx';
import { t } from '#src/texts/t.ts';
import type { RecordDraft, ScopeGroup } from '../record-form.view.ts';

const words = t.metrology;

function nameOf(group: ScopeGroup): string {
  return `${words.functions[group.function]}, ${group.rangeLabel ?? words.allRanges}`;
}

/** Channels to tick, a line per function and range, with a limitation where the range has one. */
export function ScopePicker(props: {
  groups: readonly ScopeGroup[];
  draft: RecordDraft;
  onChange: (change: Partial<RecordDraft>) => void;
}) {
  const { groups, draft } = props;
  const all = groups.flatMap((group) => group.scopes.map(({ key }) => key));
  const toggle = (key: string, isTicked: boolean) => {
    const ticked = new Set(draft.ticked);
    if (isTicked) {
      ticked.add(key);
    } else {
      ticked.delete(key);
    }
    props.onChange({ ticked });
  };
  return (
    <>
      <div className="mp-acts mb-2">
        <Button
          size="small"
          onClick={() => {
            props.onChange({ ticked: new Set(all) });
          }}
        >
          {words.all}
        </Button>
        <Button
          size="small"
          onClick={() => {
            props.onChange({ ticked: new Set() });
          }}
        >
          {words.none}
        </Button>
        <span className="mp-note" role="status">
          {words.ticked(draft.ticked.size, all.length)}
        </span>
      </div>
      <Table
        caption={words.pick}
        rows={groups}
        rowKey={(group) => group.key}
        middle
        stack
        columns={[
          {
            key: 'range',
            head: words.scopeColumns.range,
            cell: (group) => (
              <>
                <b className="font-mono">{group.rangeLabel ?? words.allRanges}</b>{' '}
                <span className="mp-note">{words.functions[group.function]}</span>
              </>
            ),
          },
          {
            key: 'channels',
            head: words.scopeColumns.channel,
            cell: (group) => (
              <div className="flex flex-wrap gap-x-4 gap-y-1">
                {group.scopes.map(({ key, scope }) => (
                  <Tick
                    key={key}
                    checked={draft.ticked.has(key)}
                    onChange={(event) => {
                      toggle(key, event.target.checked);
                    }}
                  >
                    {scope.channelLabel ?? words.wholeInstrument}
                  </Tick>
                ))}
              </div>
            ),
          },
          {
            key: 'limitation',
            head: words.limitation,
            cell: (group) => (
              <TextInput
                aria-label={`${words.limitation}: ${nameOf(group)}`}
                value={draft.limitations.get(group.key) ?? ''}
                maxLength={300}
                onChange={(event) => {
                  props.onChange({
                    limitations: new Map(draft.limitations).set(group.key, event.target.value),
                  });
                }}
              />
            ),
          },
        ]}
      />
      <p className="mp-help">{words.limitationHelp}</p>
    </>
  );
}
