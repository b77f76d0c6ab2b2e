import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { Link, useParams } from 'react-router-dom';
import type { LotDto, RequestDto } from '#shared/contracts/requests.contract.ts';
import { paths } from '#src/app/paths.ts';
import { Page, Section } from '#src/components/layout/page.tsx';
import { FactList } from '#src/components/ui/fact-list.tsx';
import { ErrorState, Loading } from '#src/components/ui/feedback.tsx';
import { Notice } from '#src/components/ui/notice.tsx';
import { State } from '#src/components/ui/state.tsx';
import { useNow } from '#src/hooks/use-now.ts';
import { useMay, useSite } from '#src/hooks/use-site.ts';
import { formatInstant, siteCalendar } from '#src/lib/format-date.ts';
import { formatCurrentA, formatPercent, formatTemperature } from '#src/lib/format-quantity.ts';
import { thinSpace } from '#src/lib/format-number.ts';
import { tableError } from '#src/lib/table-error.ts';
import { t } from '#src/texts/t.ts';
import { requestQuery } from '../api/request-queries.ts';
import { BookByForm } from './book-by-form.tsx';
import { DeviationsSection } from './deviations-section.tsx';
import { OffersSection } from './offers-section.tsx';
import { RequestActions } from './request-actions.tsx';

const words = t.request;

function useTime() {
  const site = useSite();
  const { currentYear } = siteCalendar(useNow(), site.zone);
  return (at: string | null) =>
    at === null ? words.none : formatInstant(at, { zone: site.zone, currentYear });
}

const marks = {
  draft: { mark: 'draft', tone: 'ink' },
  submitted: { mark: 'asked', tone: 'heron' },
  'partly-booked': { mark: 'offered', tone: 'heron' },
  booked: { mark: 'booked', tone: 'reed' },
  done: { mark: 'answered', tone: 'ink' },
  withdrawn: { mark: 'withdrawn', tone: 'ink' },
} as const;

function Matter(props: { request: RequestDto }) {
  const { request } = props;
  const time = useTime();
  const { proposal } = request;
  const look = marks[request.state];
  return (
    <>
      <p>
        <State mark={look.mark} tone={look.tone}>
          {words.states[request.state]}
        </State>{' '}
        <span className="mp-note ml-2">{words.stateSays[request.state]}</span>
      </p>
      {request.declineReason === null || request.state !== 'draft' ? null : (
        <Notice kind="caution" title={words.declined}>
          {request.declineReason}
        </Notice>
      )}
      {proposal === null ? null : (
        <Notice kind="info" title={words.proposal}>
          {words.proposalText(proposal.chamberTag, time(proposal.startAt), time(proposal.endAt))}
        </Notice>
      )}
    </>
  );
}

function toleranceText(request: RequestDto): string {
  if (request.kind === 'screening') {
    return `1 : ${request.badToGoodRatio}`;
  }
  return request.tolerance.kind === 'relative'
    ? words.ofCurrent(`±${thinSpace}${formatPercent(request.tolerance.fraction, 1)}`)
    : `±${thinSpace}${formatCurrentA(request.tolerance.currentA)}`;
}

function Facts(props: { request: RequestDto }) {
  const { request } = props;
  const time = useTime();
  const { facts } = words;
  const temperature =
    request.setTemperatureC === null
      ? words.none
      : words.plusMinus(
          formatTemperature(request.setTemperatureC),
          `${request.setToleranceK}${thinSpace}K`,
        );
  return (
    <>
      <FactList
        facts={[
          { name: facts.requester, value: request.requester.name },
          { name: facts.project, value: request.project?.name ?? words.none },
          { name: facts.kind, value: words.kinds[request.kind] },
          { name: facts.tolerance, value: toleranceText(request) },
          { name: facts.temperature, value: temperature },
          { name: facts.grade, value: words.grades[request.grade] },
          { name: facts.earliest, value: time(request.earliestStartAt) },
          { name: facts.neededBy, value: time(request.neededByAt) },
          { name: facts.submitted, value: time(request.submittedAt) },
          { name: facts.split, value: request.maySplit ? words.yes : words.no },
        ]}
      />
      {request.note === '' ? null : <p className="whitespace-pre-line">{request.note}</p>}
    </>
  );
}

function LotSection(props: { lot: LotDto; place: number }) {
  const { lot } = props;
  const site = useSite();
  const time = useTime();
  const serials = lot.cells.map(({ serial }) => serial).filter((serial) => serial !== null);
  return (
    <Section
      title={words.lot(props.place)}
      note={lot.isDamaged ? <p>{words.damagedCaution}</p> : undefined}
    >
      <p>
        <b>
          {lot.cellCount === null || lot.cellTypeName === null
            ? words.lotIncomplete
            : words.lotFacts(lot.cellCount, lot.cellTypeName)}
        </b>
        ,{' '}
        {lot.stateOfChargePct === null
          ? words.chargeUnknown
          : words.charge(formatPercent(lot.stateOfChargePct / 100))}
        {lot.restedSinceAt === null ? null : `, ${words.restedSince(time(lot.restedSinceAt))}`}
        {lot.bookingId === null ? null : (
          <>
            {'. '}
            <Link to={paths.booking.href(site.code, lot.bookingId)}>
              {words.bookedAs(lot.bookingId)}
            </Link>
          </>
        )}
      </p>
      {serials.length === 0 ? null : (
        <p className="mp-note">
          {words.serials}: <span className="font-mono">{serials.join(', ')}</span>
        </p>
      )}
    </Section>
  );
}

/** A lot with its slots, as long as it can still be booked. */
function LotWithSlots(props: { request: RequestDto; lot: LotDto; place: number }) {
  const { request, lot } = props;
  const may = useMay();
  const [isProposed, setIsProposed] = useState(false);
  const isComplete =
    lot.cellTypeId !== null && lot.cellCount !== null && request.setTemperatureC !== null;
  const isOpen = request.state !== 'withdrawn' && request.state !== 'done';
  const canBook = isComplete && isOpen && lot.bookingId === null;
  const title =
    request.lots.length === 1 ? words.slots : `${words.slots}, ${words.lot(props.place)}`;
  return (
    <>
      <LotSection lot={lot} place={props.place} />
      {canBook ? (
        <OffersSection
          request={request}
          lotId={lot.id}
          title={title}
          isProposed={isProposed}
          onProposed={() => {
            setIsProposed(true);
          }}
        />
      ) : null}
      {canBook && request.state !== 'draft' && may('booking.move') ? (
        <BookByForm request={request} lotId={lot.id} />
      ) : null}
    </>
  );
}

/** One request: what is asked, the slots it could have, and what can be done with it. */
export function RequestPage() {
  const site = useSite();
  const { id = '' } = useParams();
  const query = useQuery(requestQuery(site.code, Number(id)));
  const failure = tableError(query);
  const title = words.request(Number(id));
  const request = query.data;
  if (request === undefined) {
    return (
      <Page title={title}>
        {failure === undefined ? <Loading what={title} /> : <ErrorState {...failure} />}
      </Page>
    );
  }
  return (
    <Page
      title={title}
      subtitle={request.project?.name}
      intro={<Matter request={request} />}
      actions={<RequestActions key={request.version} request={request} />}
      lead={<Facts request={request} />}
    >
      {request.lots.map((lot, index) => (
        <LotWithSlots key={lot.id} request={request} lot={lot} place={index + 1} />
      ))}
      <DeviationsSection request={request} />
    </Page>
  );
}
