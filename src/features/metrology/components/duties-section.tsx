import { useInfiniteQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import type { DutyRow } from '#shared/contracts/calibrations.contract.ts';
import { calibrationBadges, instrumentKinds } from '#shared/domain/states.ts';
import { paths } from '#src/app/paths.ts';
import { Section } from '#src/components/layout/page.tsx';
import { CalibrationState } from '#src/components/ui/calibration-state.tsx';
import { Filters } from '#src/components/ui/filters.tsx';
import { DateInput, TextInput } from '#src/components/ui/input.tsx';
import { Select } from '#src/components/ui/select.tsx';
import { Table, type Column } from '#src/components/ui/table.tsx';
import { Tick } from '#src/components/ui/tick.tsx';
import { useDebouncedText } from '#src/hooks/use-debounced-text.ts';
import { useNow } from '#src/hooks/use-now.ts';
import { useMay, useSite } from '#src/hooks/use-site.ts';
import { useClearUrlState, useUrlChoice, useUrlState } from '#src/hooks/use-url-state.ts';
import { formatDay, formatRelativeDays, siteCalendar } from '#src/lib/format-date.ts';
import { tableError } from '#src/lib/table-error.ts';
import { t } from '#src/texts/t.ts';
import { dutiesQuery } from '../api/calibration-queries.ts';

const badges = ['', ...calibrationBadges] as const;
const kinds = ['', ...instrumentKinds] as const;
const flags = ['', 'true'] as const;
const words = t.metrology;
const rowsAtOnce = 20;

function useFilters() {
  const [badge, setBadge] = useUrlChoice('badge', badges, '');
  const [kind, setKind] = useUrlChoice('kind', kinds, '');
  const [before, setBefore] = useUrlState('before');
  const [text, setText] = useUrlState('text');
  const [mine, setMine] = useUrlChoice('mine', flags, '');
  const clear = useClearUrlState(['badge', 'kind', 'before', 'text', 'mine']);
  const isSet = [badge, kind, before, text, mine].some((value) => value !== '');
  return {
    values: { badge, kind, before, text, mine },
    set: { setBadge, setKind, setBefore, setText, setMine },
    clear: isSet ? clear : undefined,
  };
}

function FilterRow({ values, set, clear }: ReturnType<typeof useFilters>) {
  return (
    <Filters onClear={clear}>
      <label>
        <span className="mp-note">{words.filters.state}</span>
        <Select
          value={values.badge}
          emptyLabel={words.filters.all}
          options={calibrationBadges.map((value) => ({ value, label: t.ui.badges[value] }))}
          onChange={(event) => {
            set.setBadge(badges.find((each) => each === event.target.value) ?? '');
          }}
        />
      </label>
      <label>
        <span className="mp-note">{words.filters.kind}</span>
        <Select
          value={values.kind}
          emptyLabel={words.filters.all}
          options={instrumentKinds.map((value) => ({ value, label: t.equipment.kinds[value] }))}
          onChange={(event) => {
            set.setKind(kinds.find((each) => each === event.target.value) ?? '');
          }}
        />
      </label>
      <label>
        <span className="mp-note">{words.filters.before}</span>
        <DateInput
          value={values.before}
          onChange={(event) => {
            set.setBefore(event.target.value);
          }}
        />
      </label>
      <label>
        <span className="mp-note">{words.filters.text}</span>
        <TextInput
          type="search"
          value={values.text}
          onChange={(event) => {
            set.setText(event.target.value);
          }}
        />
      </label>
      <Tick
        checked={values.mine === 'true'}
        onChange={(event) => {
          set.setMine(event.target.checked ? 'true' : '');
        }}
      >
        {words.filters.mine}
      </Tick>
    </Filters>
  );
}

function WhatToDo(props: { row: DutyRow }) {
  const { row } = props;
  const site = useSite();
  const may = useMay();
  if (row.awaitingApprovalId !== null) {
    return (
      <Link to={paths.calibration.href(site.code, row.awaitingApprovalId)}>{words.awaiting}</Link>
    );
  }
  return may('calibration.record') ? (
    <Link
      to={paths.newCalibration.href(site.code, row.tag)}
      aria-label={`${words.record}, ${row.tag}`}
    >
      {words.recordShort}
    </Link>
  ) : null;
}

function useColumns(): readonly Column<DutyRow>[] {
  const site = useSite();
  const { today, currentYear } = siteCalendar(useNow(), site.zone);
  const heads = words.dueColumns;
  return [
    {
      key: 'tag',
      head: heads.tag,
      mono: true,
      cell: (row) => (
        <Link to={paths.instrument.href(site.code, row.tag)}>
          <b>{row.tag}</b>
        </Link>
      ),
    },
    {
      key: 'what',
      head: heads.what,
      cell: (row) => (
        <>
          {t.equipment.kinds[row.instrumentKind]} <span className="mp-note">{row.model}</span>
        </>
      ),
    },
    {
      key: 'duty',
      head: heads.duty,
      nowrap: true,
      cell: (row) => (
        <>
          {words.calibration} <span className="mp-note">{row.scope}</span>
        </>
      ),
    },
    { key: 'state', head: heads.state, cell: (row) => <CalibrationState badge={row.badge} /> },
    {
      key: 'due',
      head: heads.due,
      mono: true,
      cell: (row) => (row.dueOn === null ? words.never : formatDay(row.dueOn, { currentYear })),
    },
    {
      key: 'left',
      head: heads.left,
      nowrap: true,
      cell: (row) => (row.dueOn === null ? '' : formatRelativeDays(row.dueOn, today)),
    },
    {
      key: 'interval',
      head: heads.interval,
      nowrap: true,
      cell: (row) => words.months(row.intervalMonths),
    },
    {
      key: 'bookings',
      head: heads.bookings,
      align: 'right',
      cell: (row) => words.riskOf(row.bookingsPastDue, row.atRisk),
    },
    {
      key: 'custodian',
      head: heads.custodian,
      nowrap: true,
      cell: (row) => row.custodian?.name ?? '',
    },
    {
      key: 'act',
      head: '',
      label: words.actions,
      align: 'right',
      nowrap: true,
      cell: (row) => <WhatToDo row={row} />,
    },
  ];
}

/** The due list: what to calibrate next, with what it would cost not to. */
export function DutiesSection() {
  const site = useSite();
  const filters = useFilters();
  const text = useDebouncedText(filters.values.text, 250);
  const { badge, kind, before, mine } = filters.values;
  const list = useInfiniteQuery(
    dutiesQuery(site.code, {
      limit: rowsAtOnce,
      ...(badge === '' ? {} : { badge }),
      ...(kind === '' ? {} : { kind }),
      ...(before === '' ? {} : { dueBefore: before }),
      ...(mine === '' ? {} : { mine }),
      ...(text === '' ? {} : { text }),
    }),
  );
  return (
    <Section title={words.due} note={<p>{words.dueNote}</p>}>
      <FilterRow {...filters} />
      <Table
        caption={words.dueCaption}
        rows={list.data?.pages.flatMap((page) => page.items) ?? []}
        rowKey={(row) => row.dutyId}
        isLoading={list.isPending}
        error={tableError(list)}
        empty={words.noDuties}
        stack
        more={
          list.hasNextPage
            ? { onMore: () => void list.fetchNextPage(), busy: list.isFetchingNextPage }
            : undefined
        }
        columns={useColumns()}
      />
    </Section>
  );
}
