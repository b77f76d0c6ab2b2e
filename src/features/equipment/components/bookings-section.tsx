import { Link } from 'react-router-dom';
import type { BookingRow } from '#shared/contracts/bookings.contract.ts';
import { paths } from '#src/app/paths.ts';
import { Section } from '#src/components/layout/page.tsx';
import { BookingStateWord } from '#src/components/ui/booking-state.tsx';
import { Table } from '#src/components/ui/table.tsx';
import { useSite } from '#src/hooks/use-site.ts';
import { formatInstant } from '#src/lib/format-date.ts';
import { formatTemperature } from '#src/lib/format-quantity.ts';
import { t } from '#src/texts/t.ts';

/** Bookings over the instrument; a foreign one shows only that its place is taken. */
export function BookingsSection(props: { title: string; rows: readonly BookingRow[] }) {
  const site = useSite();
  const words = t.equipment;
  const columns = words.bookingColumns;
  const time = (at: string) => formatInstant(at, { zone: site.zone });
  return (
    <Section title={props.title}>
      <Table
        caption={props.title}
        rows={props.rows}
        rowKey={(row) => row.id}
        empty={words.noBookings}
        columns={[
          {
            key: 'id',
            head: columns.id,
            mono: true,
            cell: (row) =>
              row.isVisible ? (
                <Link to={paths.booking.href(site.code, row.id)}>{row.id}</Link>
              ) : (
                words.taken
              ),
          },
          {
            key: 'what',
            head: columns.what,
            cell: (row) =>
              row.isVisible
                ? `${row.cellCount} × ${row.cellTypeName ?? ''}, ${formatTemperature(row.setTemperatureC)}`
                : '',
          },
          { key: 'chamber', head: columns.chamber, mono: true, cell: (row) => row.chamberTag },
          { key: 'start', head: columns.start, mono: true, cell: (row) => time(row.startAt) },
          { key: 'end', head: columns.end, mono: true, cell: (row) => time(row.endAt) },
          {
            key: 'state',
            head: columns.state,
            cell: (row) => (
              <>
                <BookingStateWord state={row.state} isAtRisk={row.isAtRisk} />
                {row.atRiskReason === null ? null : (
                  <span className="mp-note block">{row.atRiskReason}</span>
                )}
              </>
            ),
          },
        ]}
      />
    </Section>
  );
}
