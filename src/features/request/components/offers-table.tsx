import { Link } from 'react-router-dom';
import type { OfferDto } from '#shared/contracts/offers.contract.ts';
import type { CheckCode } from '#shared/domain/checks/types.ts';
import { checkRules } from '#shared/domain/checks/check-rules.ts';
import { paths } from '#src/app/paths.ts';
import { Button } from '#src/components/ui/button.tsx';
import { Disclosure } from '#src/components/ui/disclosure.tsx';
import { Mark } from '#src/components/ui/mark.tsx';
import { Table } from '#src/components/ui/table.tsx';
import { PhaseBar } from '#src/components/drawing/phase-bar.tsx';
import { barPhases } from '#src/components/drawing/booking-bar.view.ts';
import { useSite } from '#src/hooks/use-site.ts';
import { formatDuration, formatHours } from '#src/lib/format-duration.ts';
import { formatTemperature } from '#src/lib/format-quantity.ts';
import { t } from '#src/texts/t.ts';
import { describePaths } from '../offer-path.view.ts';
import type { OfferRow, SlotAct } from '../offers.view.ts';
import { useTime } from '../use-time.ts';
import { OfferSlip, WaysOut } from './offer-slip.tsx';

const words = t.request;
const barWidth = 190;

export type OffersTableProps = {
  rows: readonly OfferRow[];
  requestId: number;
  /** What this person can do with a slot; null for who may only look. */
  act: SlotAct | null;
  /** Why no slot can be taken now. */
  why: string | undefined;
  onTake: (offer: OfferDto) => void;
  onAskDeviation: ((code: CheckCode) => void) | undefined;
};

function Know(props: Pick<OffersTableProps, 'requestId' | 'onAskDeviation'> & { row: OfferRow }) {
  const { blockedBy, offer, isWished } = props.row;
  const site = useSite();
  return (
    <div className="min-w-0">
      {blockedBy === null ? (
        <>
          {isWished ? <b>{words.proposedHere} </b> : null}
          {offer.joinsLoadId === null ? null : (
            <>
              <Link to={paths.load.href(site.code, offer.joinsLoadId)}>
                {words.joins(offer.joinsLoadId)}
              </Link>
              {'. '}
            </>
          )}
          {offer.remark}
        </>
      ) : (
        <>
          <b className="mp-word-brick">
            {words.blocked} {checkRules[blockedBy.code].title}.
          </b>{' '}
          {blockedBy.sentence}
          <WaysOut
            check={blockedBy}
            requestId={props.requestId}
            onAskDeviation={props.onAskDeviation}
          />
        </>
      )}
      <Disclosure summary={words.checks}>
        <OfferSlip offer={offer} />
      </Disclosure>
    </div>
  );
}

function likelyHoldEnd(offer: OfferDto): string | null {
  const hold = offer.phases.find(({ phase }) => phase === 'hold');
  const { estimate } = offer;
  return hold === undefined || !('hold' in estimate)
    ? null
    : new Date(Date.parse(hold.startAt) + estimate.hold.likelyS * 1000).toISOString();
}

function Phases(props: { offer: OfferDto }) {
  const { offer } = props;
  const seconds = (Date.parse(offer.endAt) - Date.parse(offer.startAt)) / 1000;
  return (
    <div>
      <span className="block font-mono whitespace-nowrap">{formatHours(seconds)}</span>
      <PhaseBar phases={barPhases(offer.phases, likelyHoldEnd(offer))} width={barWidth} />
    </div>
  );
}

function Place(props: { offer: OfferDto }) {
  const { offer } = props;
  const { positions, sources, meters } = describePaths(offer.paths);
  return (
    <div>
      <span className="whitespace-nowrap">
        <span className="font-mono">{positions}</span>{' '}
        <span className="mp-note">{formatTemperature(offer.setTemperatureC)}</span>
      </span>
      <span className="mp-note block font-mono">{sources}</span>
      <span className="mp-note block font-mono">{meters}</span>
    </div>
  );
}

function TakeButton(props: OffersTableProps & { row: OfferRow }) {
  const { row, act } = props;
  if (row.blockedBy !== null) {
    return <span className="mp-note">{words.notValid}</span>;
  }
  return act === null || (act === 'propose' && row.isWished) ? null : (
    <Button
      kind={row.place === 1 ? 'primary' : 'secondary'}
      why={props.why}
      onClick={() => {
        props.onTake(row.offer);
      }}
    >
      {act === 'book' ? words.book : words.propose}
    </Button>
  );
}

/** Its place in order, or the stop mark, before the time at which loading starts. */
function Start(props: { row: OfferRow }) {
  const { place, offer } = props.row;
  const time = useTime();
  return (
    <span className="flex items-baseline gap-2 whitespace-nowrap">
      <span className="w-[18px] flex-none">
        {place === null ? <Mark name="stop" tone="brick" /> : <b>{place}</b>}
      </span>
      <b className="font-mono">{time(offer.startAt)}</b>
    </span>
  );
}

/** Slots as rows: when, how the time is spent, where, what to know, and one act. */
export function OffersTable(props: OffersTableProps) {
  const time = useTime();
  const heads = words.slotColumns;
  return (
    <Table
      caption={words.slots}
      rows={props.rows}
      rowKey={(row) => row.key}
      rowState={(row) => (row.blockedBy !== null ? 'blocked' : row.place === 1 ? 'act' : undefined)}
      stack
      columns={[
        {
          key: 'start',
          head: heads.start,
          cell: (row) => <Start row={row} />,
        },
        { key: 'end', head: heads.end, mono: true, cell: (row) => time(row.offer.endAt) },
        { key: 'phases', head: heads.length, cell: (row) => <Phases offer={row.offer} /> },
        {
          key: 'wait',
          head: heads.wait,
          mono: true,
          align: 'right',
          cell: (row) => (row.offer.waitS === 0 ? words.none : formatDuration(row.offer.waitS)),
        },
        { key: 'path', head: heads.path, cell: (row) => <Place offer={row.offer} /> },
        {
          key: 'know',
          head: heads.know,
          cell: (row) => (
            <Know row={row} requestId={props.requestId} onAskDeviation={props.onAskDeviation} />
          ),
        },
        {
          key: 'act',
          head: '',
          label: words.actions,
          align: 'right',
          nowrap: true,
          cell: (row) => <TakeButton {...props} row={row} />,
        },
      ]}
    />
  );
}
