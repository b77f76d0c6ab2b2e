import { useInfiniteQuery } from '@tanstack/react-query';
import { bookingStates } from '#shared/domain/states.ts';
import { Page, Section } from '#src/components/layout/page.tsx';
import { Filters } from '#src/components/ui/filters.tsx';
import { DateInput, TextInput } from '#src/components/ui/input.tsx';
import { Select } from '#src/components/ui/select.tsx';
import { Tick } from '#src/components/ui/tick.tsx';
import { useDebouncedText } from '#src/hooks/use-debounced-text.ts';
import { useSite } from '#src/hooks/use-site.ts';
import { useClearUrlState, useUrlChoice, useUrlState } from '#src/hooks/use-url-state.ts';
import { tableError } from '#src/lib/table-error.ts';
import { t } from '#src/texts/t.ts';
import { bookingsQuery } from '../api/bookings-queries.ts';
import { listQuery, stateChoices } from '../list-filters.view.ts';
import { BookingsTable } from './bookings-table.tsx';

const flags = ['', 'true'] as const;
const sorts = ['start', 'newest'] as const;

function useFilters() {
  const [state, setState] = useUrlChoice('state', stateChoices, 'live');
  const [from, setFrom] = useUrlState('from');
  const [to, setTo] = useUrlState('to');
  const [tag, setTag] = useUrlState('tag');
  const [atRisk, setAtRisk] = useUrlChoice('atRisk', flags, '');
  const [mine, setMine] = useUrlChoice('mine', flags, '');
  const [sort, setSort] = useUrlChoice('sort', sorts, 'start');
  const clear = useClearUrlState(['state', 'from', 'to', 'tag', 'atRisk', 'mine']);
  const isSet = state !== 'live' || [from, to, tag, atRisk, mine].some((value) => value !== '');
  return {
    values: { state, from, to, tag, atRisk, mine, sort },
    set: { setState, setFrom, setTo, setTag, setAtRisk, setMine, setSort },
    clear: isSet ? clear : undefined,
  };
}

type FilterState = ReturnType<typeof useFilters>;

function DayFilter(props: { label: string; value: string; onChange: (value: string) => void }) {
  return (
    <label>
      <span className="mp-note">{props.label}</span>
      <DateInput
        value={props.value}
        onChange={(event) => {
          props.onChange(event.target.value);
        }}
      />
    </label>
  );
}

function FilterRow({ values, set, clear }: FilterState) {
  const words = t.bookings.filters;
  return (
    <Filters onClear={clear}>
      <label>
        <span className="mp-note">{words.state}</span>
        <Select
          value={values.state}
          emptyLabel={null}
          options={[
            { value: 'live', label: t.bookings.live },
            ...bookingStates.map((value) => ({ value, label: t.ui.bookingStates[value] })),
            { value: 'all', label: words.all },
          ]}
          onChange={(event) => {
            set.setState(stateChoices.find((each) => each === event.target.value) ?? 'live');
          }}
        />
      </label>
      <DayFilter label={words.from} value={values.from} onChange={set.setFrom} />
      <DayFilter label={words.to} value={values.to} onChange={set.setTo} />
      <label>
        <span className="mp-note">{words.tag}</span>
        <TextInput
          type="search"
          value={values.tag}
          onChange={(event) => {
            set.setTag(event.target.value);
          }}
        />
      </label>
      <label>
        <span className="mp-note">{t.ui.order}</span>
        <Select
          value={values.sort}
          emptyLabel={null}
          options={[
            { value: 'start', label: t.bookings.sortStart },
            { value: 'newest', label: t.bookings.sortNewest },
          ]}
          onChange={(event) => {
            set.setSort(sorts.find((each) => each === event.target.value) ?? 'start');
          }}
        />
      </label>
      <Tick
        checked={values.atRisk === 'true'}
        onChange={(event) => {
          set.setAtRisk(event.target.checked ? 'true' : '');
        }}
      >
        {words.atRisk}
      </Tick>
      <Tick
        checked={values.mine === 'true'}
        onChange={(event) => {
          set.setMine(event.target.checked ? 'true' : '');
        }}
      >
        {words.mine}
      </Tick>
    </Filters>
  );
}

/** All bookings of the site, to find one or to see what is at risk. */
export function BookingsPage() {
  const site = useSite();
  const filters = useFilters();
  const tag = useDebouncedText(filters.values.tag, 250);
  const query = listQuery({ ...filters.values, tag }, site.zone);
  const list = useInfiniteQuery(bookingsQuery(site.code, query));
  const words = t.bookings;
  return (
    <Page title={words.title} intro={<p>{words.intro}</p>}>
      <Section title={words.caption} note={<p>{words.timesIn(site.zone)}</p>}>
        <FilterRow {...filters} />
        <BookingsTable
          caption={words.caption}
          rows={list.data?.pages.flatMap((page) => page.items) ?? []}
          isLoading={list.isPending}
          error={tableError(list)}
          empty={words.empty}
          more={
            list.hasNextPage
              ? { onMore: () => void list.fetchNextPage(), busy: list.isFetchingNextPage }
              : undefined
          }
        />
      </Section>
    </Page>
  );
}
