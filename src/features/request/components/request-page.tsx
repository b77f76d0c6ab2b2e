import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { useParams } from 'react-router-dom';
import type { RequestDto } from '#shared/contracts/requests.contract.ts';
import type { CheckCode } from '#shared/domain/checks/types.ts';
import { Page } from '#src/components/layout/page.tsx';
import { FactList } from '#src/components/ui/fact-list.tsx';
import { ErrorState, Loading } from '#src/components/ui/feedback.tsx';
import { Notice } from '#src/components/ui/notice.tsx';
import { State } from '#src/components/ui/state.tsx';
import { useMay, useSite } from '#src/hooks/use-site.ts';
import { tableError } from '#src/lib/table-error.ts';
import { t } from '#src/texts/t.ts';
import { requestQuery } from '../api/request-queries.ts';
import { aimText, temperatureText } from '../request-facts.view.ts';
import { useTime } from '../use-time.ts';
import { DeviationsSection } from './deviations-section.tsx';
import { LotSection } from './lot-section.tsx';
import { RequestActions } from './request-actions.tsx';

const words = t.request;

const marks = {
  draft: { mark: 'draft', tone: 'ink' },
  submitted: { mark: 'asked', tone: 'heron' },
  'partly-booked': { mark: 'offered', tone: 'heron' },
  booked: { mark: 'booked', tone: 'reed' },
  done: { mark: 'answered', tone: 'reed' },
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
      {request.withdrawReason === null ? null : (
        <Notice kind="info" title={words.withdrawn}>
          {request.withdrawReason}
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

function Facts(props: { request: RequestDto }) {
  const { request } = props;
  const site = useSite();
  const time = useTime();
  const { facts } = words;
  return (
    <>
      <FactList
        facts={[
          { name: facts.requester, value: request.requester.name },
          { name: facts.project, value: request.project?.name ?? words.none },
          { name: facts.kind, value: words.kinds[request.kind] },
          { name: facts.tolerance, value: aimText(request) },
          { name: facts.temperature, value: temperatureText(request) },
          { name: facts.grade, value: words.grades[request.grade] },
          { name: facts.earliest, value: time(request.earliestStartAt) },
          { name: facts.neededBy, value: time(request.neededByAt) },
          { name: facts.submitted, value: time(request.submittedAt) },
          { name: facts.split, value: request.maySplit ? words.yes : words.no },
          { name: facts.priority, value: words.priorities[request.priority] },
        ]}
      />
      <p className="mp-note">{words.timesIn(site.zone)}</p>
      {request.note === '' ? null : (
        <p className="max-w-[80ch] text-[13px] whitespace-pre-line">{request.note}</p>
      )}
    </>
  );
}

function Loaded(props: { request: RequestDto }) {
  const { request } = props;
  const may = useMay();
  const [asking, setAsking] = useState<CheckCode | 'any' | null>(null);
  const isLive = request.state !== 'done' && request.state !== 'withdrawn';
  const mayAsk = isLive && may('request.edit', { ownerId: request.requester.id });
  return (
    <Page
      title={words.request(request.id)}
      subtitle={request.project?.name}
      intro={<Matter request={request} />}
      actions={<RequestActions request={request} />}
      lead={<Facts request={request} />}
    >
      {request.lots.map((lot, index) => (
        <LotSection
          key={lot.id}
          request={request}
          lot={lot}
          place={index + 1}
          onAskDeviation={mayAsk ? setAsking : undefined}
        />
      ))}
      <DeviationsSection
        request={request}
        asking={asking}
        onAsk={mayAsk ? setAsking : undefined}
        onClose={() => {
          setAsking(null);
        }}
      />
    </Page>
  );
}

/** One request: what is asked, the slots it could have, and what can be done with it. */
export function RequestPage() {
  const site = useSite();
  const { id = '' } = useParams();
  const query = useQuery(requestQuery(site.code, Number(id)));
  const failure = tableError(query);
  const title = words.request(Number(id));
  if (query.data === undefined) {
    return (
      <Page title={title}>
        {failure === undefined ? <Loading what={title} /> : <ErrorState {...failure} />}
      </Page>
    );
  }
  return <Loaded key={query.data.id} request={query.data} />;
}
