import { DateTime } from 'luxon';
import { Link } from 'react-router-dom';
import type { Today } from '#shared/contracts/board.contract.ts';
import { paths } from '#src/app/paths.ts';
import { DueStrip, DueStripHead } from '#src/components/drawing/due-strip.tsx';
import { Section } from '#src/components/layout/page.tsx';
import { CalibrationMark } from '#src/components/ui/calibration-state.tsx';
import { Table } from '#src/components/ui/table.tsx';
import { useElementWidth } from '#src/hooks/use-element-width.ts';
import { useNow } from '#src/hooks/use-now.ts';
import { useSite } from '#src/hooks/use-site.ts';
import { formatDay, siteCalendar } from '#src/lib/format-date.ts';
import { t } from '#src/texts/t.ts';
import { dueWindow } from '../day-window.view.ts';

const words = t.today;
/** Below this the table is a list and each strip has the whole width. */
const listWidth = 600;
const share = 0.46;

/** What falls due in the next weeks, drawn against the bookings it would cut off. */
export function DueSection(props: { rows: Today['fallsDue'] }) {
  const site = useSite();
  const nowMs = useNow();
  const { currentYear } = siteCalendar(nowMs, site.zone);
  const [ref, sheet] = useElementWidth<HTMLDivElement>(1180);
  const width = sheet < listWidth ? sheet : Math.round(sheet * share);
  const window = dueWindow(nowMs);
  const heads = words.dueColumns;
  const dueMs = (day: string) =>
    DateTime.fromISO(day, { zone: site.zone }).plus({ days: 1 }).startOf('day').toMillis();
  return (
    <Section title={words.due} note={<p>{words.dueNote}</p>}>
      <div ref={ref}>
        <Table
          caption={words.due}
          rows={props.rows}
          rowKey={(row) => row.tag}
          empty={words.noDue}
          stack
          middle
          columns={[
            {
              key: 'instrument',
              head: heads.instrument,
              cell: (row) => (
                <span className="inline-flex items-center gap-2">
                  <CalibrationMark badge={row.badge} />
                  <Link className="font-mono" to={paths.instrument.href(site.code, row.tag)}>
                    <b>{row.tag}</b>
                  </Link>
                  <span className="mp-note">{row.name}</span>
                </span>
              ),
            },
            {
              key: 'due',
              head: heads.due,
              mono: true,
              align: 'right',
              cell: (row) => formatDay(row.dueOn, { currentYear }),
            },
            {
              key: 'weeks',
              head: heads.weeks,
              scale: <DueStripHead window={window} zone={site.zone} width={width} />,
              width: width + 16,
              cell: (row) => (
                <DueStrip
                  window={window}
                  zone={site.zone}
                  width={width}
                  nowMs={nowMs}
                  dueMs={dueMs(row.dueOn)}
                  bookings={row.bookings.map((span) => ({
                    startMs: Date.parse(span.startAt),
                    endMs: Date.parse(span.endAt),
                  }))}
                  label={words.weeksOf(row.tag, formatDay(row.dueOn, { currentYear }))}
                />
              ),
            },
            {
              key: 'past',
              head: heads.past,
              align: 'right',
              cell: (row) => (
                <span className={row.atRisk > 0 ? 'mp-word-marigold' : undefined}>
                  {words.past(row.bookingsPastDue, row.atRisk)}
                </span>
              ),
            },
          ]}
        />
      </div>
    </Section>
  );
}
