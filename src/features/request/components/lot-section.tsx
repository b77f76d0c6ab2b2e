import { useQuery } from '@tanstack/react-query';
import { useState, type ReactNode } from 'react';
import { Link } from 'react-router-dom';
import type { LotDto, RequestDto } from '#shared/contracts/requests.contract.ts';
import type { CheckCode } from '#shared/domain/checks/types.ts';
import { paths } from '#src/app/paths.ts';
import { Section } from '#src/components/layout/page.tsx';
import { Notice } from '#src/components/ui/notice.tsx';
import { useSite } from '#src/hooks/use-site.ts';
import { t } from '#src/texts/t.ts';
import { offersQuery } from '../api/request-queries.ts';
import { lotIsOpen, lotIsSearched, lotWords } from '../lot-words.view.ts';
import { useTime } from '../use-time.ts';
import { BookByForm } from './book-by-form.tsx';
import { LotEstimate } from './lot-estimate.tsx';
import { OffersSection } from './offers-section.tsx';
import { SlotDialog, type Taking } from './slot-dialog.tsx';

const words = t.request;

function LotFacts(props: { lot: LotDto; place: number; estimate: ReactNode }) {
  const { lot } = props;
  const site = useSite();
  const time = useTime();
  const serials = lot.cells.map(({ serial }) => serial).filter((serial) => serial !== null);
  return (
    <Section title={words.lot(props.place)}>
      <p>
        <b>{lotWords(lot).what}</b>
        {lotWords(lot).condition(time)}
        {lot.bookingId === null ? null : (
          <>
            {' '}
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
      {lot.isDamaged ? <Notice kind="caution">{words.damagedCaution}</Notice> : null}
      {props.estimate}
    </Section>
  );
}

type LotSectionProps = {
  request: RequestDto;
  lot: LotDto;
  place: number;
  onAskDeviation: ((code: CheckCode) => void) | undefined;
};

/** One lot: its cells, what they take, and its slots as long as it can still be booked. */
export function LotSection(props: LotSectionProps) {
  const { request, lot } = props;
  const site = useSite();
  // Kept here, above what disappears as soon as somebody else has booked the lot.
  const [taking, setTaking] = useState<Taking | null>(null);
  const [isProposed, setIsProposed] = useState(false);
  const take = (wish: Taking) => {
    setIsProposed(false);
    setTaking(wish);
  };
  const isSearched = lotIsSearched(request, lot);
  const offers = useQuery({ ...offersQuery(site.code, request.id, lot.id), enabled: isSearched });
  const title = request.lots.length === 1 ? words.slots : words.slotsOfLot(words.lot(props.place));
  const mayBook = request.state !== 'draft' && offers.data?.mayConfirm === true;
  return (
    <>
      <LotFacts
        lot={lot}
        place={props.place}
        estimate={
          lotIsOpen(request, lot) && !offers.isLoading ? (
            <LotEstimate request={request} lot={lot} first={offers.data?.offers[0]} />
          ) : null
        }
      />
      {isSearched ? (
        <OffersSection
          request={request}
          offers={offers}
          title={title}
          isProposed={isProposed}
          onTake={take}
          onAskDeviation={props.onAskDeviation}
        />
      ) : null}
      {isSearched && mayBook ? <BookByForm request={request} lotId={lot.id} onTake={take} /> : null}
      {taking === null ? null : (
        <SlotDialog
          request={request}
          lotId={lot.id}
          taking={taking}
          onProposed={() => {
            setTaking(null);
            setIsProposed(true);
          }}
          onClose={() => {
            setTaking(null);
          }}
        />
      )}
    </>
  );
}
