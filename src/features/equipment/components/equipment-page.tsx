import { useInfiniteQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import { calibrationBadges, instrumentKinds } from '#shared/domain/states.ts';
import { paths } from '#src/app/paths.ts';
import { Page, Section } from '#src/components/layout/page.tsx';
import { CalibrationState } from '#src/components/ui/calibration-state.tsx';
import { Filters } from '#src/components/ui/filters.tsx';
import { TextInput } from '#src/components/ui/input.tsx';
import { Select } from '#src/components/ui/select.tsx';
import { Table, type Sort } from '#src/components/ui/table.tsx';
import { useDebouncedText } from '#src/hooks/use-debounced-text.ts';
import { useNow } from '#src/hooks/use-now.ts';
import { useSite } from '#src/hooks/use-site.ts';
import { useClearUrlState, useUrlChoice, useUrlState } from '#src/hooks/use-url-state.ts';
import { formatDay, siteCalendar } from '#src/lib/format-date.ts';
import { tableError } from '#src/lib/table-error.ts';
import { t } from '#src/texts/t.ts';
import { instrumentsQuery } from '../api/list-instruments.ts';

const kindChoices = ['', ...instrumentKinds] as const;
const badgeChoices = ['', ...calibrationBadges] as const;
const sorts = ['tag', 'due', 'kind'] as const;

/** The equipment register, to read. */
export function EquipmentPage() {
  const site = useSite();
  const { currentYear } = siteCalendar(useNow(), site.zone);
  const [kind, setKind] = useUrlChoice('kind', kindChoices, '');
  const [badge, setBadge] = useUrlChoice('badge', badgeChoices, '');
  const [sort, setSort] = useUrlChoice('sort', sorts, 'tag');
  const [text, setText] = useUrlState('text');
  const settled = useDebouncedText(text, 250);
  const clear = useClearUrlState(['kind', 'badge', 'text']);
  const list = useInfiniteQuery(instrumentsQuery(site.code, { sort, kind, badge, text: settled }));
  const rows = list.data?.pages.flatMap((page) => page.items) ?? [];
  const words = t.equipment;
  const tableSort: Sort = { key: sort, direction: 'ascending' };
  return (
    <Page title={words.title} intro={<p>{words.intro}</p>}>
      <Section title={words.caption}>
        <Filters onClear={kind === '' && badge === '' && text === '' ? undefined : clear}>
          <label>
            <span className="mp-note">{words.filters.kind}</span>
            <Select
              value={kind}
              emptyLabel={words.filters.all}
              options={instrumentKinds.map((value) => ({ value, label: words.kinds[value] }))}
              onChange={(event) => {
                setKind(instrumentKinds.find((each) => each === event.target.value) ?? '');
              }}
            />
          </label>
          <label>
            <span className="mp-note">{words.filters.state}</span>
            <Select
              value={badge}
              emptyLabel={words.filters.all}
              options={calibrationBadges.map((value) => ({ value, label: t.ui.badges[value] }))}
              onChange={(event) => {
                setBadge(calibrationBadges.find((each) => each === event.target.value) ?? '');
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
          caption={words.caption}
          rows={rows}
          rowKey={(row) => row.tag}
          isLoading={list.isPending}
          error={tableError(list)}
          empty={words.empty}
          sort={tableSort}
          onSort={(next) => {
            setSort(sorts.find((each) => each === next.key) ?? 'tag');
          }}
          more={
            list.hasNextPage
              ? { onMore: () => void list.fetchNextPage(), busy: list.isFetchingNextPage }
              : undefined
          }
          columns={[
            {
              key: 'tag',
              head: words.columns.tag,
              sortable: true,
              mono: true,
              cell: (row) => (
                <Link to={paths.instrument.href(site.code, row.tag)}>
                  <b>{row.tag}</b>
                </Link>
              ),
            },
            {
              key: 'kind',
              head: words.columns.kind,
              sortable: true,
              cell: (row) => words.kinds[row.kind],
            },
            {
              key: 'model',
              head: words.columns.model,
              cell: (row) => (
                <>
                  {row.model} <span className="mp-note">{row.serial}</span>
                </>
              ),
            },
            { key: 'room', head: words.columns.room, cell: (row) => row.roomName ?? '' },
            {
              key: 'calibration',
              head: words.columns.calibration,
              cell: (row) => <CalibrationState badge={row.badge} />,
            },
            {
              key: 'due',
              head: words.columns.due,
              sortable: true,
              mono: true,
              cell: (row) =>
                row.dueOn === null ? words.noDue : formatDay(row.dueOn, { currentYear }),
            },
            {
              key: 'channels',
              head: words.columns.channels,
              align: 'right',
              mono: true,
              cell: (row) => row.channelCount,
            },
            {
              key: 'custodian',
              head: words.columns.custodian,
              cell: (row) => row.custodian?.name ?? '',
            },
          ]}
        />
      </Section>
    </Page>
  );
}
