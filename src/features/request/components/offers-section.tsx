import type { UseQueryResult } from '@tanstack/react-query';
import { useState } from 'react';
import type { OffersDto } from '#shared/contracts/offers.contract.ts';
import type { RequestDto } from '#shared/contracts/requests.contract.ts';
import type { CheckCode } from '#shared/domain/checks/types.ts';
import { Section } from '#src/components/layout/page.tsx';
import { Button } from '#src/components/ui/button.tsx';
import { ErrorState, Loading } from '#src/components/ui/feedback.tsx';
import { Notice } from '#src/components/ui/notice.tsx';
import { useNow } from '#src/hooks/use-now.ts';
import { useMay } from '#src/hooks/use-site.ts';
import { tableError } from '#src/lib/table-error.ts';
import { t } from '#src/texts/t.ts';
import { isExpired, offerRows, shownAtFirst, slotAct } from '../offers.view.ts';
import { OffersTable } from './offers-table.tsx';
import type { Taking } from './slot-dialog.tsx';

const words = t.request;

function Reasons(props: { found: OffersDto }) {
  return (
    <Notice kind="stop" title={words.noSlots}>
      <ul className="mt-1">
        {props.found.reasons.map((reason) => (
          <li key={`${reason.code}-${reason.sentence}`}>
            {reason.sentence}{' '}
            {reason.chambers.length === 0 ? null : (
              <span className="mp-note">{words.reasonsIn(reason.chambers.join(', '))}</span>
            )}
          </li>
        ))}
      </ul>
    </Notice>
  );
}

type FoundProps = {
  request: RequestDto;
  found: OffersDto;
  receivedMs: number;
  isSearching: boolean;
  isProposed: boolean;
  onAgain: () => void;
  onTake: (taking: Taking) => void;
  onAskDeviation: ((code: CheckCode) => void) | undefined;
};

function Found(props: FoundProps) {
  const { request, found } = props;
  const may = useMay();
  const isOld = isExpired(found, props.receivedMs, useNow(15_000));
  const [count, setCount] = useState(shownAtFirst);
  const act = slotAct(request.state, {
    mayConfirm: found.mayConfirm,
    mayPropose: may('request.propose', { ownerId: request.requester.id }),
  });
  const rows = offerRows(found, count, request);
  return (
    <>
      {props.isProposed ? (
        <Notice kind="pass" role="status">
          {words.proposed}
        </Notice>
      ) : null}
      {isOld ? <Notice kind="caution">{words.expired}</Notice> : null}
      {found.offers.length === 0 ? <Reasons found={found} /> : null}
      {rows.length === 0 ? null : (
        <OffersTable
          rows={rows}
          requestId={request.id}
          act={act}
          why={isOld ? words.again : undefined}
          onAskDeviation={props.onAskDeviation}
          onTake={(offer) => {
            if (act !== null) {
              props.onTake({ act, offer, offeredAt: found.offeredAt });
            }
          }}
        />
      )}
      <div className="mp-acts mt-3">
        {found.offers.length > count ? (
          <Button
            kind="link"
            onClick={() => {
              setCount(found.offers.length);
            }}
          >
            {words.later}
          </Button>
        ) : null}
        <Button kind="link" busy={props.isSearching} onClick={props.onAgain}>
          {words.again}
        </Button>
        {props.isSearching ? <span className="mp-note">{words.searching}</span> : null}
      </div>
    </>
  );
}

/** The three earliest valid slots of a lot, and the earlier one that a single rule blocks. */
export function OffersSection(props: {
  request: RequestDto;
  offers: UseQueryResult<OffersDto>;
  title: string;
  isProposed: boolean;
  onTake: (taking: Taking) => void;
  onAskDeviation: ((code: CheckCode) => void) | undefined;
}) {
  const { offers } = props;
  const failure = tableError(offers);
  const found = offers.data;
  return (
    <Section
      title={props.title}
      note={found === undefined ? undefined : <p>{words.slotsNote(found.startsLookedAt)}</p>}
    >
      {failure === undefined ? null : <ErrorState {...failure} />}
      {found === undefined && failure === undefined ? (
        <Loading what={words.slotsSearching} />
      ) : null}
      {found === undefined ? null : (
        <Found
          request={props.request}
          found={found}
          receivedMs={offers.dataUpdatedAt}
          isSearching={offers.isFetching}
          isProposed={props.isProposed}
          onTake={props.onTake}
          onAskDeviation={props.onAskDeviation}
          onAgain={() => {
            void offers.refetch();
          }}
        />
      )}
    </Section>
  );
}
