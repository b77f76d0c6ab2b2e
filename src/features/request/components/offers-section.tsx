import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import type { OfferDto, OffersDto } from '#shared/contracts/offers.contract.ts';
import type { RequestDto } from '#shared/contracts/requests.contract.ts';
import { checkRules } from '#shared/domain/checks/check-rules.ts';
import { Section } from '#src/components/layout/page.tsx';
import { Button } from '#src/components/ui/button.tsx';
import { Disclosure } from '#src/components/ui/disclosure.tsx';
import { ErrorState, Loading } from '#src/components/ui/feedback.tsx';
import { Mark } from '#src/components/ui/mark.tsx';
import { Notice } from '#src/components/ui/notice.tsx';
import { Table } from '#src/components/ui/table.tsx';
import { useNow } from '#src/hooks/use-now.ts';
import { useMay, useSite } from '#src/hooks/use-site.ts';
import { formatInstant, siteCalendar } from '#src/lib/format-date.ts';
import { formatDuration } from '#src/lib/format-duration.ts';
import { formatTemperature } from '#src/lib/format-quantity.ts';
import { tableError } from '#src/lib/table-error.ts';
import { t } from '#src/texts/t.ts';
import { offersQuery } from '../api/request-queries.ts';
import { describePaths } from '../offer-path.view.ts';
import { BookOffer, OfferSlip, ProposeOffer } from './offer-actions.tsx';
import { EstimatePanel } from './estimate-panel.tsx';

const words = t.request;

type Row = {
  readonly key: string;
  readonly place: number | null;
  readonly offer: OfferDto;
  readonly blockedBy: NonNullable<OffersDto['blockedEarlier']>['blockedBy'] | null;
};

const shownAtFirst = 3;

function rowsOf(found: OffersDto, count: number): readonly Row[] {
  const { blockedEarlier } = found;
  return [
    ...(blockedEarlier === null
      ? []
      : [
          {
            key: 'blocked',
            place: null,
            offer: blockedEarlier.offer,
            blockedBy: blockedEarlier.blockedBy,
          },
        ]),
    ...found.offers.slice(0, count).map((offer, index) => ({
      key: `${offer.chamberTag}-${offer.startAt}`,
      place: index + 1,
      offer,
      blockedBy: null,
    })),
  ];
}

function Know(props: { row: Row }) {
  const { blockedBy, offer } = props.row;
  if (blockedBy === null) {
    return (
      <>
        {offer.joinsLoadId === null ? null : <b>{words.joins(offer.joinsLoadId)}. </b>}
        {offer.remark}
        <Disclosure summary={words.checks}>
          <OfferSlip offer={offer} />
        </Disclosure>
      </>
    );
  }
  return (
    <>
      <b className="mp-word-brick">{words.blocked}</b> {checkRules[blockedBy.code].title}.{' '}
      {blockedBy.sentence} {blockedBy.waysOut.map((way) => way.sentence).join(' ')}
    </>
  );
}

function PathText(props: { offer: OfferDto }) {
  const { positions, sources, meters } = describePaths(props.offer.paths);
  return (
    <span className="font-mono text-[12px]">
      {positions}
      <span className="mp-note block">
        {sources} · {meters}
      </span>
    </span>
  );
}

function Acts(props: {
  row: Row;
  request: RequestDto;
  found: OffersDto;
  why: string | undefined;
  onProposed: () => void;
}) {
  const { row, request, found, why } = props;
  const may = useMay();
  if (row.blockedBy !== null) {
    return <span className="mp-note">{words.notValid}</span>;
  }
  const kind = row.place === 1 ? 'primary' : 'secondary';
  const shared = { request, lotId: found.lotId, offer: row.offer, offeredAt: found.offeredAt, why };
  if (found.mayConfirm) {
    return <BookOffer {...shared} kind={kind} label={words.book} />;
  }
  return may('request.propose', { ownerId: request.requester.id }) ? (
    <ProposeOffer {...shared} kind={kind} onDone={props.onProposed} />
  ) : null;
}

function useExpiry(found: OffersDto): boolean {
  return useNow(15_000) >= Date.parse(found.expiresAt);
}

function Reasons(props: { found: OffersDto }) {
  return (
    <Notice kind="stop" title={words.noSlots}>
      <ul>
        {props.found.reasons.map((reason) => (
          <li key={`${reason.code}-${reason.sentence}`}>
            {reason.sentence}{' '}
            <span className="mp-note">
              {reason.chambers.length === 0 ? '' : words.reasonsIn(reason.chambers.join(', '))}
            </span>
          </li>
        ))}
      </ul>
    </Notice>
  );
}

function OffersTable(props: {
  request: RequestDto;
  found: OffersDto;
  onAgain: () => void;
  isBusy: boolean;
  onProposed: () => void;
}) {
  const { request, found } = props;
  const site = useSite();
  const { currentYear } = siteCalendar(useNow(), site.zone);
  const isExpired = useExpiry(found);
  const [count, setCount] = useState(shownAtFirst);
  const heads = words.slotColumns;
  const time = (at: string) => formatInstant(at, { zone: site.zone, currentYear });
  return (
    <>
      {isExpired ? <Notice kind="caution">{words.expired}</Notice> : null}
      {found.offers.length === 0 ? <Reasons found={found} /> : null}
      <Table
        caption={words.slots}
        rows={rowsOf(found, count)}
        rowKey={(row) => row.key}
        rowState={(row) =>
          row.blockedBy !== null ? 'blocked' : row.place === 1 ? 'act' : undefined
        }
        empty=""
        stack
        columns={[
          {
            key: 'place',
            head: '',
            label: words.place,
            width: 26,
            cell: (row) =>
              row.place === null ? <Mark name="stop" tone="brick" /> : <b>{row.place}</b>,
          },
          {
            key: 'start',
            head: heads.start,
            mono: true,
            cell: (row) => <b>{time(row.offer.startAt)}</b>,
          },
          { key: 'end', head: heads.end, mono: true, cell: (row) => time(row.offer.endAt) },
          {
            key: 'length',
            head: heads.length,
            mono: true,
            align: 'right',
            cell: (row) =>
              formatDuration((Date.parse(row.offer.endAt) - Date.parse(row.offer.startAt)) / 1000),
          },
          {
            key: 'wait',
            head: heads.wait,
            mono: true,
            align: 'right',
            cell: (row) => (row.offer.waitS === 0 ? words.none : formatDuration(row.offer.waitS)),
          },
          {
            key: 'chamber',
            head: heads.chamber,
            nowrap: true,
            cell: (row) => (
              <>
                <span className="font-mono">{row.offer.chamberTag}</span>{' '}
                <span className="mp-note">{formatTemperature(row.offer.setTemperatureC)}</span>
              </>
            ),
          },
          { key: 'path', head: heads.path, cell: (row) => <PathText offer={row.offer} /> },
          { key: 'know', head: heads.know, cell: (row) => <Know row={row} /> },
          {
            key: 'act',
            head: '',
            label: words.actions,
            align: 'right',
            nowrap: true,
            cell: (row) => (
              <Acts
                row={row}
                request={request}
                found={found}
                why={isExpired ? words.again : undefined}
                onProposed={props.onProposed}
              />
            ),
          },
        ]}
      />
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
        <Button kind="link" busy={props.isBusy} onClick={props.onAgain}>
          {words.again}
        </Button>
      </div>
    </>
  );
}

/** The three earliest valid slots of a lot, and the earlier one that a single rule blocks. */
export function OffersSection(props: {
  request: RequestDto;
  lotId: number;
  title: string;
  isProposed: boolean;
  onProposed: () => void;
}) {
  const site = useSite();
  const offers = useQuery(offersQuery(site.code, props.request.id, props.lotId));
  const failure = tableError(offers);
  const found = offers.data;
  const best = found?.offers[0]?.estimate;
  return (
    <Section
      title={props.title}
      note={found === undefined ? undefined : <p>{words.slotsNote(found.startsLookedAt)}</p>}
    >
      {props.isProposed ? (
        <Notice kind="pass" role="status">
          {words.proposed}
        </Notice>
      ) : null}
      {failure === undefined ? null : <ErrorState {...failure} />}
      {found === undefined && failure === undefined ? (
        <Loading what={words.slotsSearching} />
      ) : null}
      {found === undefined ? null : (
        <OffersTable
          request={props.request}
          found={found}
          isBusy={offers.isFetching}
          onProposed={props.onProposed}
          onAgain={() => {
            void offers.refetch();
          }}
        />
      )}
      {best === undefined ? null : (
        <Disclosure summary={words.estimate}>
          <EstimatePanel estimate={best} safePct={90} />
        </Disclosure>
      )}
    </Section>
  );
}
