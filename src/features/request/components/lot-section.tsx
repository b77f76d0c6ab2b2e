import { useQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import type { LotDto, RequestDto } from '#shared/contracts/requests.contract.ts';
import type { CheckCode } from '#shared/domain/checks/types.ts';
import { paths } from '#src/app/paths.ts';
import { Section } from '#src/components/layout/page.tsx';
import { Disclosure } from '#src/components/ui/disclosure.tsx';
import { ErrorState } from '#src/components/ui/feedback.tsx';
import { Notice } from '#src/components/ui/notice.tsx';
import { useSite } from '#src/hooks/use-site.ts';
import { tableError } from '#src/lib/table-error.ts';
import { t } from '#src/texts/t.ts';
import { basisQuery, cellTypesQuery, offersQuery } from '../api/request-queries.ts';
import { estimateLot } from '../estimate-input.view.ts';
import { estimateSentence } from '../estimate-words.view.ts';
import { lotIsOpen, lotWords } from '../lot-words.view.ts';
import { useTime } from '../use-time.ts';
import { BookByForm } from './book-by-form.tsx';
import { EstimateDetail, EstimateHead } from './estimate-panel.tsx';
import { OffersSection } from './offers-section.tsx';

const words = t.request;

/** What the lot would take over the site's reference wiring, as long as nothing is booked. */
function LotEstimate(props: { request: RequestDto; lot: LotDto }) {
  const { request, lot } = props;
  const site = useSite();
  const basis = useQuery(basisQuery(site.code));
  const cellTypes = useQuery(cellTypesQuery(site.code));
  const failure = tableError(basis.error === null ? cellTypes : basis);
  if (failure !== undefined) {
    return <ErrorState {...failure} />;
  }
  if (basis.data === undefined || cellTypes.data === undefined) {
    return null;
  }
  const cellType = cellTypes.data.items.find((each) => each.id === lot.cellTypeId);
  const result = estimateLot(request, lot, cellType, basis.data);
  if (result.kind === 'needs') {
    return <p className="mp-note mt-3">{estimateSentence(result)}</p>;
  }
  const shown = { estimate: result.estimate, input: result.input };
  return (
    <div className="mt-4">
      <EstimateHead {...shown} safePct={basis.data.process.safePercentile * 100} />
      <div className="mt-3">
        <Disclosure summary={words.estimateDetail}>
          <EstimateDetail {...shown} staffedHours={basis.data.staffedHours} />
        </Disclosure>
      </div>
    </div>
  );
}

function LotFacts(props: { request: RequestDto; lot: LotDto; place: number }) {
  const { request, lot } = props;
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
      {lotIsOpen(request, lot) ? <LotEstimate request={request} lot={lot} /> : null}
    </Section>
  );
}

function LotSlots(props: LotSectionProps) {
  const { request, lot } = props;
  const site = useSite();
  const offers = useQuery(offersQuery(site.code, request.id, lot.id));
  const title = request.lots.length === 1 ? words.slots : words.slotsOfLot(words.lot(props.place));
  const mayBook = request.state !== 'draft' && offers.data?.mayConfirm === true;
  return (
    <>
      <OffersSection
        request={request}
        offers={offers}
        title={title}
        onAskDeviation={props.onAskDeviation}
      />
      {mayBook ? <BookByForm request={request} lotId={lot.id} /> : null}
    </>
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
  const isComplete =
    lot.cellTypeId !== null && lot.cellCount !== null && request.setTemperatureC !== null;
  return (
    <>
      <LotFacts request={request} lot={lot} place={props.place} />
      {isComplete && lotIsOpen(request, lot) ? <LotSlots {...props} /> : null}
    </>
  );
}
