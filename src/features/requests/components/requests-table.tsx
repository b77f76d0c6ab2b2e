import { Link } from 'react-router-dom';
import type { RequestRow } from '#shared/contracts/requests.contract.ts';
import { paths } from '#src/app/paths.ts';
import { Table, type TableProps } from '#src/components/ui/table.tsx';
import { useNow } from '#src/hooks/use-now.ts';
import { useSite } from '#src/hooks/use-site.ts';
import { formatInstant, siteCalendar } from '#src/lib/format-date.ts';
import { formatTemperature } from '#src/lib/format-quantity.ts';
import { t } from '#src/texts/t.ts';
import { cellsWords } from '../list-filters.view.ts';
import { RequestStateWord } from './request-state.tsx';

type Rest = Pick<TableProps<RequestRow>, 'rows' | 'isLoading' | 'error' | 'empty' | 'more'>;

/** Late only while somebody still waits for it. */
function isLate(row: RequestRow, nowMs: number): boolean {
  return (
    row.neededByAt !== null &&
    Date.parse(row.neededByAt) < nowMs &&
    row.state !== 'done' &&
    row.state !== 'withdrawn'
  );
}

function StateCell(props: { row: RequestRow }) {
  const { row } = props;
  const words = t.requests.list;
  const isWished = row.hasProposal && row.bookingIds.length === 0;
  return (
    <>
      <RequestStateWord state={row.state} />
      {isWished ? <span className="mp-note block">{words.slotWished}</span> : null}
      {row.priority === 'normal' ? null : (
        <span className="mp-note block">{words[row.priority]}</span>
      )}
    </>
  );
}

function BookingLinks(props: { row: RequestRow }) {
  const site = useSite();
  return props.row.bookingIds.map((id, index) => (
    <span key={id}>
      {index === 0 ? '' : ', '}
      <Link to={paths.booking.href(site.code, id)}>{id}</Link>
    </span>
  ));
}

export function RequestsTable(props: Rest & { caption: string }) {
  const site = useSite();
  const nowMs = useNow();
  const { currentYear } = siteCalendar(nowMs, site.zone);
  const words = t.requests.list;
  const { columns } = words;
  return (
    <Table
      {...props}
      stack
      rowKey={(row) => row.id}
      rowState={(row) => (row.state === 'done' || row.state === 'withdrawn' ? 'past' : undefined)}
      columns={[
        {
          key: 'id',
          head: columns.id,
          mono: true,
          cell: (row) => (
            <Link to={paths.request.href(site.code, row.id)}>
              <b>{row.id}</b>
            </Link>
          ),
        },
        { key: 'cells', head: columns.cells, cell: (row) => cellsWords(row) },
        {
          key: 'kind',
          head: columns.kind,
          cell: (row) => (
            <>
              {t.requests.kinds[row.kind]}
              {row.grade === 'indicative' ? (
                <span className="mp-note block">{t.requests.grades.indicative}</span>
              ) : null}
            </>
          ),
        },
        {
          key: 'temperature',
          head: columns.temperature,
          align: 'right',
          mono: true,
          cell: (row) =>
            row.setTemperatureC === null ? '' : formatTemperature(row.setTemperatureC),
        },
        { key: 'project', head: columns.project, cell: (row) => row.projectName ?? '' },
        { key: 'requester', head: columns.requester, cell: (row) => row.requester.name },
        {
          key: 'neededBy',
          head: columns.neededBy,
          mono: true,
          cell: (row) =>
            row.neededByAt === null ? null : (
              <>
                {formatInstant(row.neededByAt, { zone: site.zone, currentYear })}
                {isLate(row, nowMs) ? (
                  <span className="mp-word-brick"> {words.overdue}</span>
                ) : null}
              </>
            ),
        },
        { key: 'state', head: columns.state, cell: (row) => <StateCell row={row} /> },
        {
          key: 'bookings',
          head: columns.bookings,
          align: 'right',
          mono: true,
          cell: (row) => <BookingLinks row={row} />,
        },
      ]}
    />
  );
}
