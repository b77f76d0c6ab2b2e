import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { ErrorState, Loading } from '#src/components/ui/feedback.tsx';
import { TextInput } from '#src/components/ui/input.tsx';
import { Tick } from '#src/components/ui/tick.tsx';
import { useDebouncedText } from '#src/hooks/use-debounced-text.ts';
import { useSite } from '#src/hooks/use-site.ts';
import { tableError } from '#src/lib/table-error.ts';
import { t } from '#src/texts/t.ts';
import { freeCellsQuery } from '../api/request-queries.ts';

const words = t.request;

/** Registered cells to tick, by serial. */
export function CellPicker(props: {
  cellTypeId: number | null;
  projectId: number | null;
  chosen: readonly number[];
  onChange: (cellIds: number[]) => void;
}) {
  const site = useSite();
  const [text, setText] = useState('');
  const wish = {
    cellTypeId: props.cellTypeId,
    projectId: props.projectId,
    text: useDebouncedText(text, 250),
  };
  const cells = useQuery(freeCellsQuery(site.code, wish));
  const failure = tableError(cells);
  return (
    <div className="mt-2">
      <TextInput
        type="search"
        aria-label={words.findCells}
        value={text}
        onChange={(event) => {
          setText(event.target.value);
        }}
      />
      <p className="mp-help" role="status">
        {words.chosen(props.chosen.length)}
      </p>
      {failure === undefined ? null : <ErrorState {...failure} />}
      {cells.isLoading ? <Loading /> : null}
      {cells.data?.items.length === 0 ? <p className="mp-note">{words.noCells}</p> : null}
      <div className="mt-1 grid max-h-[220px] grid-cols-2 gap-x-3 gap-y-1 overflow-y-auto">
        {cells.data?.items.map((cell) => (
          <Tick
            key={cell.id}
            checked={props.chosen.includes(cell.id)}
            onChange={(event) => {
              props.onChange(
                event.target.checked
                  ? [...props.chosen, cell.id]
                  : props.chosen.filter((id) => id !== cell.id),
              );
            }}
          >
            <span className="font-mono">{cell.serial}</span>
          </Tick>
        ))}
      </div>
      {cells.data?.nextCursor === null || cells.data === undefined ? null : (
        <p className="mp-help">{words.moreCells}</p>
      )}
    </div>
  );
}
