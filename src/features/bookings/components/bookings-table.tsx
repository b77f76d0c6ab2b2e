import { Link } from 'react-router-dom';
import type { BookingRow } from '#shared/contracts/bookings.contract.ts';
import { paths } from '#src/app/paths.ts';
import { BookingStateWord } from '#src/components/ui/booking-state.tsx';
import { Table, type TableProps } from '#src/components/ui/table.tsx';
import { useNow } from '#src/hooks/use-now.ts';
import { useSite } from '#src/hooks/use-site.ts';
import { formatInstant, siteCalendar } from '#src/lib/format-date.ts';
import { formatTemperature } from '#src/lib/format-quantity.ts';
import { t } from '#src/texts/t.ts';

type Rest = Pick<TableProps<BookingRow>, 'rows' | 'isLoading' | 'error' | 'empty' | 'more'>;

/** Bookings as rows, here and in a load; a foreign one shows only its place and time. */
export function BookingsTable(props: Rest & { caption: string }) {
  const site = useSite();
  const { currentYear } = siteCalendar(useNow(), site.zone);
  const words = t.bookings;
  const time = (at: string) => formatInstant(at, { zone: site.zone, currentYear });
  return (
    <Table
      {...props}
      stack
      rowKey={(row) => row.id}
      rowState={(row) => (row.state === 'cancelled' || row.state === 'done' ? 'past' : undefined)}
      columns={[
        {
          key: 'id',
          head: words.columns.id,
          mono: true,
          cell: (row) => (
            <Link to={paths.booking.href(site.code, row.id)}>
              <b>{row.id}</b>
            </Link>
          ),
        },
        {
          key: 'what',
          head: words.columns.what,
          cell: (row) =>
            row.isVisible
              ? words.cellsAt(
                  row.cellCount,
                  row.cellTypeName ?? '',
                  formatTemperature(row.setTemperatureC),
                )
              : words.taken,
        },
        { key: 'project', head: words.columns.project, cell: (row) => row.projectName ?? '' },
        {
          key: 'chamber',
          head: words.columns.chamber,
          mono: true,
          cell: (row) => (
            <Link to={paths.instrument.href(site.code, row.chamberTag)}>{row.chamberTag}</Link>
          ),
        },
        { key: 'start', head: words.columns.start, mono: true, cell: (row) => time(row.startAt) },
        { key: 'end', head: words.columns.end, mono: true, cell: (row) => time(row.endAt) },
        {
          key: 'state',
          head: words.columns.state,
          cell: (row) => (
            <>
              <BookingStateWord state={row.state} isAtRisk={row.isAtRisk} />
              {row.atRiskReason === null ? null : (
                <span className="mp-note block max-w-[34ch] whitespace-normal">
                  {row.atRiskReason}
                </span>
              )}
            </>
          ),
        },
      ]}
    />
  );
}
