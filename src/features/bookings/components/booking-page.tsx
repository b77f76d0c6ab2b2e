import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { Link, useParams } from 'react-router-dom';
import type { BookingDto } from '#shared/contracts/bookings.contract.ts';
import { paths } from '#src/app/paths.ts';
import { Page } from '#src/components/layout/page.tsx';
import { BookingStateWord } from '#src/components/ui/booking-state.tsx';
import { Button } from '#src/components/ui/button.tsx';
import { FactList } from '#src/components/ui/fact-list.tsx';
import { ErrorState, Loading } from '#src/components/ui/feedback.tsx';
import { Notice } from '#src/components/ui/notice.tsx';
import { useMay, useSite } from '#src/hooks/use-site.ts';
import { useNow } from '#src/hooks/use-now.ts';
import { formatDuration } from '#src/lib/format-duration.ts';
import { formatInstant, siteCalendar } from '#src/lib/format-date.ts';
import { formatTemperature } from '#src/lib/format-quantity.ts';
import { tableError } from '#src/lib/table-error.ts';
import { t } from '#src/texts/t.ts';
import { bookingQuery } from '../api/bookings-queries.ts';
import { ChecksSection, HistorySection, PathsSection, PhasesSection } from './booking-sections.tsx';
import { CancelBooking } from './cancel-booking.tsx';
import { MoveSection } from './move-section.tsx';

function useTime(): (at: string) => string {
  const site = useSite();
  const { currentYear } = siteCalendar(useNow(), site.zone);
  return (at) => formatInstant(at, { zone: site.zone, currentYear });
}

function visibleFacts(booking: BookingDto, site: string, time: (at: string) => string) {
  const words = t.bookings;
  const { facts } = words;
  return [
    {
      name: facts.request,
      value:
        booking.requestId === null ? (
          '–'
        ) : (
          <Link to={paths.request.href(site, booking.requestId)}>
            {words.requestNumber(booking.requestId)}
          </Link>
        ),
    },
    { name: facts.project, value: booking.projectName ?? '–' },
    { name: facts.owner, value: booking.requester?.name ?? '–' },
    { name: facts.cells, value: words.cells(booking.cellCount, booking.cellTypeName ?? '') },
    { name: facts.grade, value: words.grades[booking.grade] },
    ...(booking.confirmedBy === null || booking.confirmedAt === null
      ? []
      : [
          {
            name: facts.confirmed,
            value: words.confirmedBy(booking.confirmedBy.name, time(booking.confirmedAt)),
          },
        ]),
    ...(booking.likelyS === null
      ? []
      : [{ name: facts.likely, value: formatDuration(booking.likelyS) }]),
    ...(booking.safeS === null ? [] : [{ name: facts.safe, value: formatDuration(booking.safeS) }]),
    ...(booking.noShowAt === null || booking.state !== 'tentative'
      ? []
      : [{ name: facts.noShow, value: time(booking.noShowAt) }]),
  ];
}

function Lead(props: { booking: BookingDto }) {
  const { booking } = props;
  const site = useSite();
  const time = useTime();
  const words = t.bookings;
  const place = [
    { name: words.facts.from, value: time(booking.startAt) },
    { name: words.facts.to, value: time(booking.endAt) },
    {
      name: words.facts.chamber,
      value: (
        <Link className="font-mono" to={paths.instrument.href(site.code, booking.chamberTag)}>
          {booking.chamberTag}
        </Link>
      ),
    },
    {
      name: words.facts.load,
      value: (
        <Link to={paths.load.href(site.code, booking.loadId)}>
          {words.loadNumber(booking.loadId)}
        </Link>
      ),
    },
    { name: words.facts.temperature, value: formatTemperature(booking.setTemperatureC) },
  ];
  return (
    <>
      <FactList
        facts={booking.isVisible ? [...place, ...visibleFacts(booking, site.code, time)] : place}
      />
      <p className="mp-note">
        {words.timesIn(site.zone)} {words.planned}
      </p>
    </>
  );
}

function Matter(props: { booking: BookingDto }) {
  const { booking } = props;
  const words = t.bookings;
  return (
    <>
      <BookingStateWord state={booking.state} isAtRisk={booking.isAtRisk} />
      {booking.isVisible ? null : <p>{words.foreign}</p>}
      {booking.isAtRisk && booking.atRiskReason !== null ? (
        <Notice kind="caution" title={words.atRisk}>
          {booking.atRiskReason}
        </Notice>
      ) : null}
      {booking.cancelReason === null ? null : (
        <Notice kind="info" title={words.cancelled}>
          {booking.cancelReason}
        </Notice>
      )}
      {booking.grade === 'indicative' && booking.isVisible ? (
        <p className="mp-note">{words.indicativeNote}</p>
      ) : null}
    </>
  );
}

function useActs(booking: BookingDto) {
  const may = useMay();
  const isAhead = booking.state === 'tentative' || booking.state === 'confirmed';
  const owner = booking.requester === null ? {} : { ownerId: booking.requester.id };
  return {
    mayMove: isAhead && booking.isVisible && may('booking.move'),
    mayCancel: isAhead && booking.isVisible && may('booking.cancel', owner),
  };
}

function Loaded(props: { booking: BookingDto }) {
  const { booking } = props;
  const { mayMove, mayCancel } = useActs(booking);
  const [isMoving, setIsMoving] = useState(false);
  const [hasMoved, setHasMoved] = useState(false);
  const words = t.bookings;
  return (
    <Page
      title={words.booking(booking.id)}
      subtitle={
        booking.isVisible ? words.cells(booking.cellCount, booking.cellTypeName ?? '') : words.taken
      }
      intro={<Matter booking={booking} />}
      actions={
        <>
          {mayMove && !isMoving ? (
            <Button
              onClick={() => {
                setIsMoving(true);
                setHasMoved(false);
              }}
            >
              {words.move}
            </Button>
          ) : null}
          {mayCancel ? <CancelBooking booking={booking} /> : null}
        </>
      }
      notice={
        hasMoved ? (
          <Notice kind="pass" role="status">
            {words.moved}
          </Notice>
        ) : null
      }
      lead={<Lead booking={booking} />}
    >
      {isMoving ? (
        <MoveSection
          booking={booking}
          onClose={(isDone) => {
            setIsMoving(false);
            setHasMoved(isDone);
          }}
        />
      ) : null}
      <PhasesSection booking={booking} />
      <PathsSection booking={booking} />
      {booking.isVisible ? (
        <>
          <ChecksSection booking={booking} />
          <HistorySection booking={booking} />
        </>
      ) : null}
    </Page>
  );
}

/** One booking: its place, its phases, the checks as they stood, and what happened to it. */
export function BookingPage() {
  const site = useSite();
  const { id = '' } = useParams();
  const query = useQuery(bookingQuery(site.code, Number(id)));
  const failure = tableError(query);
  if (query.data === undefined) {
    const title = t.bookings.booking(Number(id));
    return (
      <Page title={title}>
        {failure === undefined ? <Loading what={title} /> : <ErrorState {...failure} />}
      </Page>
    );
  }
  return <Loaded key={query.data.id} booking={query.data} />;
}
