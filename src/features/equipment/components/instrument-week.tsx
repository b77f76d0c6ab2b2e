import type { EventInput } from '@fullcalendar/core';
import luxonPlugin from '@fullcalendar/luxon3';
import FullCalendar from '@fullcalendar/react';
import timeGridPlugin from '@fullcalendar/timegrid';
import { useQuery } from '@tanstack/react-query';
import { useNavigate } from 'react-router-dom';
import { Button } from '#src/components/ui/button.tsx';
import { ErrorState } from '#src/components/ui/feedback.tsx';
import { useNow } from '#src/hooks/use-now.ts';
import { useSite } from '#src/hooks/use-site.ts';
import { useUrlState } from '#src/hooks/use-url-state.ts';
import { siteCalendar } from '#src/lib/format-date.ts';
import { tableError } from '#src/lib/table-error.ts';
import { t } from '#src/texts/t.ts';
import '#src/styles/week.css';
import { instrumentWeekQuery } from '../api/get-instrument.ts';
import { shiftWeek, weekRange } from '../week-range.view.ts';
import type { getInstrumentWeek } from '#shared/contracts/equipment.contract.ts';
import type { z } from 'zod';

type Week = z.output<typeof getInstrumentWeek.response>;

function weekEvents(week: Week): EventInput[] {
  const bars = week.bars.map((bar): EventInput => ({
    id: `bar-${bar.bookingId}-${bar.rowKey}`,
    start: bar.startAt,
    end: bar.endAt,
    title: bar.isVisible ? `${bar.rowKey}  ${bar.title}` : `${bar.rowKey}  ${t.equipment.taken}`,
    classNames: [
      'mp-week-booking',
      bar.isAtRisk ? 'mp-week-risk' : '',
      bar.state === 'done' ? 'mp-week-done' : '',
    ].filter((name) => name !== ''),
    extendedProps: { bookingId: bar.isVisible ? bar.bookingId : null },
  }));
  const blocks = week.blocks.map((block, index): EventInput => ({
    id: `block-${index}`,
    start: block.startAt,
    end: block.endAt,
    title: block.sentence,
    display: 'background',
    classNames: [`mp-week-${block.kind}`],
  }));
  return [...blocks, ...bars];
}

/** One instrument's own week as a time grid. */
export function InstrumentWeek(props: { tag: string }) {
  const site = useSite();
  const navigate = useNavigate();
  const { today } = siteCalendar(useNow(), site.zone);
  const [day, setDay] = useUrlState('week', today);
  const range = weekRange(day, site.zone);
  const week = useQuery(instrumentWeekQuery(site.code, props.tag, range.from, range.to));
  const failure = tableError(week);
  return (
    <>
      <div className="mp-acts mb-2">
        <Button
          size="small"
          onClick={() => {
            setDay(shiftWeek(range.firstDay, -1));
          }}
        >
          ← {t.equipment.weekEarlier}
        </Button>
        <Button
          size="small"
          onClick={() => {
            setDay(shiftWeek(range.firstDay, 1));
          }}
        >
          {t.equipment.weekLater} →
        </Button>
      </div>
      {failure === undefined ? null : <ErrorState {...failure} />}
      {/* On a phone it scrolls sideways, which the keyboard must be able to do as well. */}
      <div className="mp-week" role="region" aria-label={t.equipment.week} tabIndex={0}>
        <FullCalendar
          key={range.firstDay}
          plugins={[timeGridPlugin, luxonPlugin]}
          schedulerLicenseKey="GPL-My-Project-Is-Open-Source"
          initialView="timeGridWeek"
          initialDate={range.firstDay}
          timeZone={site.zone}
          locale="en-gb"
          firstDay={1}
          headerToolbar={false}
          allDaySlot={false}
          height="auto"
          slotDuration="02:00:00"
          slotLabelInterval="04:00:00"
          slotLabelFormat={{ hour: '2-digit', minute: '2-digit', hour12: false }}
          dayHeaderFormat={{ weekday: 'short', day: 'numeric', month: 'short' }}
          eventTimeFormat={{ hour: '2-digit', minute: '2-digit', hour12: false }}
          nowIndicator
          slotEventOverlap={false}
          events={week.data === undefined ? [] : weekEvents(week.data)}
          eventInteractive
          eventClick={(arg) => {
            const bookingId: unknown = arg.event.extendedProps['bookingId'];
            if (typeof bookingId === 'number') {
              void navigate(`/${site.code}/bookings/${bookingId}`);
            }
          }}
        />
      </div>
    </>
  );
}
