import { useInfiniteQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import { calibrationStates } from '#shared/domain/states.ts';
import { paths } from '#src/app/paths.ts';
import { Section } from '#src/components/layout/page.tsx';
import { Filters } from '#src/components/ui/filters.tsx';
import { TextInput } from '#src/components/ui/input.tsx';
import { Select } from '#src/components/ui/select.tsx';
import { Table } from '#src/components/ui/table.tsx';
import { useDebouncedText } from '#src/hooks/use-debounced-text.ts';
import { useSite } from '#src/hooks/use-site.ts';
import { useClearUrlState, useUrlChoice, useUrlState } from '#src/hooks/use-url-state.ts';
import { formatDay } from '#src/lib/format-date.ts';
import { tableError } from '#src/lib/table-error.ts';
import { t } from '#src/texts/t.ts';
import { calibrationsQuery } from '../api/calibration-queries.ts';
import { ConformityWord, RecordStateWord } from './calibration-record-state.tsx';

const shownStates = calibrationStates.filter((state) => state !== 'draft');
const choices = ['', ...shownStates] as const;
const words = t.metrology;
const rowsAtOnce = 20;

/** Calibration records, to find one by tag, certificate or state. */
export function RecordsSection() {
  const site = useSite();
  const [state, setState] = useUrlChoice('record', choices, '');
  const [text, setText] = useUrlState('find');
  const clear = useClearUrlState(['record', 'find']);
  const settled = useDebouncedText(text, 250);
  const list = useInfiniteQuery(
    calibrationsQuery(site.code, {
      limit: rowsAtOnce,
      ...(state === '' ? {} : { state }),
      ...(settled === '' ? {} : { text: settled }),
    }),
  );
  const heads = words.recordColumns;
  return (
    <Section title={words.records} note={<p>{words.recordsNote}</p>}>
      <Filters onClear={state === '' && text === '' ? undefined : clear}>
        <label>
          <span className="mp-note">{words.filters.recordState}</span>
          <Select
            value={state}
            emptyLabel={words.filters.all}
            options={shownStates.map((value) => ({ value, label: words.states[value] }))}
            onChange={(event) => {
              setState(choices.find((each) => each === event.target.value) ?? '');
            }}
          />
        </label>
        <label>
          <span className="mp-note">{words.filters.text}</span>
          <TextInput
            type="search"
            value={text}
            onChange={(event) => {
              setText(event.target.value);
            }}
          />
        </label>
      </Filters>
      <Table
        caption={words.recordsCaption}
        rows={list.data?.pages.flatMap((page) => page.items) ?? []}
        rowKey={(row) => row.id}
        isLoading={list.isPending}
        error={tableError(list)}
        empty={words.noRecords}
        stack
        more={
          list.hasNextPage
            ? { onMore: () => void list.fetchNextPage(), busy: list.isFetchingNextPage }
            : undefined
        }
        columns={[
          {
            key: 'id',
            head: heads.id,
            mono: true,
            cell: (row) => (
              <Link to={paths.calibration.href(site.code, row.id)}>
                <b>{row.id}</b>
              </Link>
            ),
          },
          {
            key: 'tag',
            head: heads.tag,
            cell: (row) => (
              <>
                <Link className="font-mono" to={paths.instrument.href(site.code, row.tag)}>
                  {row.tag}
                </Link>{' '}
                <span className="mp-note">{row.model}</span>
              </>
            ),
          },
          {
            key: 'performed',
            head: heads.performed,
            mono: true,
            cell: (row) => formatDay(row.performedOn),
          },
          { key: 'due', head: heads.due, mono: true, cell: (row) => formatDay(row.dueOn) },
          { key: 'certificate', head: heads.certificate, cell: (row) => row.certificateNumber },
          { key: 'provider', head: heads.provider, cell: (row) => row.provider },
          {
            key: 'left',
            head: heads.left,
            cell: (row) => <ConformityWord conformity={row.conformityAsLeft} />,
          },
          { key: 'state', head: heads.state, cell: (row) => <RecordStateWord state={row.state} /> },
        ]}
      />
    </Section>
  );
}
