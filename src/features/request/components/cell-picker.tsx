import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { Button } from '#src/components/ui/button.tsx';
import { ErrorState, Loading } from '#src/components/ui/feedback.tsx';
import { TextInput } from '#src/components/ui/input.tsx';
import { Tick } from '#src/components/ui/tick.tsx';
import { useDebouncedText } from '#src/hooks/use-debounced-text.ts';
import { useSite } from '#src/hooks/use-site.ts';
import { tableError } from '#src/lib/table-error.ts';
import { t } from '#src/texts/t.ts';
import { freeCellsQuery } from '../api/request-queries.ts';
import type { LotDraft } from '../request-draft.view.ts';

const words = t.request;
type Chosen = LotDraft['cells'];

type PickerProps = {
  cellTypeId: number | null;
  projectId: number | null;
  chosen: Chosen;
  onChange: (cells: Chosen) => void;
};

/** Chosen cells stay in sight whatever the search shows, each with its way out. */
function ChosenCells(props: Pick<PickerProps, 'chosen' | 'onChange'>) {
  return (
    <>
      <p className="mp-help" role="status">
        {words.chosen(props.chosen.length)}
      </p>
      <ul className="mb-2 flex flex-wrap gap-x-3 gap-y-1">
        {props.chosen.map((cell) => {
          const name = cell.serial ?? words.cellNumber(cell.id);
          return (
            <li key={cell.id} className="font-mono text-[12px]">
              {name}{' '}
              <Button
                kind="link"
                aria-label={words.takeOut(name)}
                onClick={() => {
                  props.onChange(props.chosen.filter(({ id }) => id !== cell.id));
                }}
              >
                {words.out}
              </Button>
            </li>
          );
        })}
      </ul>
    </>
  );
}

/** Registered cells to tick, by serial. */
export function CellPicker(props: PickerProps) {
  const site = useSite();
  const [text, setText] = useState('');
  const wish = {
    cellTypeId: props.cellTypeId,
    projectId: props.projectId,
    text: useDebouncedText(text, 250),
  };
  const cells = useQuery(freeCellsQuery(site.code, wish));
  const failure = tableError(cells);
  if (props.cellTypeId === null) {
    return <p className="mp-help">{words.typeFirst}</p>;
  }
  const chosenIds = new Set(props.chosen.map(({ id }) => id));
  return (
    <div>
      <ChosenCells chosen={props.chosen} onChange={props.onChange} />
      <label>
        <span className="mp-help">{words.findCells}</span>
        <TextInput
          type="search"
          value={text}
          onChange={(event) => {
            setText(event.target.value);
          }}
        />
      </label>
      {failure === undefined ? null : <ErrorState {...failure} />}
      {cells.isLoading ? <Loading /> : null}
      {cells.data?.items.length === 0 ? <p className="mp-help">{words.noCells}</p> : null}
      <div className="mt-2 grid max-h-[220px] grid-cols-2 gap-x-3 gap-y-1 overflow-y-auto p-1">
        {cells.data?.items.map((cell) => (
          <Tick
            key={cell.id}
            checked={chosenIds.has(cell.id)}
            onChange={(event) => {
              const others = props.chosen.filter(({ id }) => id !== cell.id);
              props.onChange(
                event.target.checked ? [...others, { id: cell.id, serial: cell.serial }] : others,
              );
            }}
          >
            <span className="font-mono">{cell.serial ?? words.cellNumber(cell.id)}</span>
          </Tick>
        ))}
      </div>
      {cells.data === undefined || cells.data.nextCursor === null ? null : (
        <p className="mp-help">{words.moreCells}</p>
      )}
    </div>
  );
}
