import { useState } from 'react';
import { useNavigate } from 'react-router-dom';
import { confirmBooking } from '#shared/contracts/bookings.contract.ts';
import { proposeOffer, type OfferDto } from '#shared/contracts/offers.contract.ts';
import type { RequestDto } from '#shared/contracts/requests.contract.ts';
import { paths } from '#src/app/paths.ts';
import { Button } from '#src/components/ui/button.tsx';
import { Dialog } from '#src/components/ui/dialog.tsx';
import { Slip } from '#src/components/ui/slip.tsx';
import { useApiMutation } from '#src/hooks/use-api-mutation.ts';
import { useSite } from '#src/hooks/use-site.ts';
import { errorText } from '#src/lib/error-text.ts';
import { formatInstant } from '#src/lib/format-date.ts';
import { formatDuration } from '#src/lib/format-duration.ts';
import { t } from '#src/texts/t.ts';
import { slipLines } from '../check-lines.view.ts';
import { requestReaders } from '../refreshes.ts';

const words = t.request;

/** What a placement would mean, as a slip. */
export function OfferSlip(props: { offer: OfferDto }) {
  const { offer } = props;
  const site = useSite();
  const time = (at: string) => formatInstant(at, { zone: site.zone });
  const lengthS = (Date.parse(offer.endAt) - Date.parse(offer.startAt)) / 1000;
  return (
    <Slip
      label={words.slipLabel}
      title={words.slipTitle(offer.chamberTag, time(offer.startAt))}
      subtitle={words.slipUntil(time(offer.endAt), formatDuration(lengthS))}
      lines={slipLines(offer.checks)}
    />
  );
}

type ActProps = {
  request: RequestDto;
  lotId: number;
  offer: OfferDto;
  offeredAt: string;
  /** Why it cannot be done now. */
  why?: string | undefined;
};

/** Books after a look at the slip; the server runs every check again. */
export function BookOffer(props: ActProps & { label: string; kind?: 'primary' | 'secondary' }) {
  const { request, lotId, offer } = props;
  const site = useSite();
  const navigate = useNavigate();
  const [isAsking, setIsAsking] = useState(false);
  const book = useApiMutation(confirmBooking, {
    refreshes: requestReaders,
    onDone: (made) => {
      void navigate(paths.booking.href(site.code, made.id));
    },
  });
  const time = (at: string) => formatInstant(at, { zone: site.zone });
  return (
    <>
      <Button
        kind={props.kind ?? 'secondary'}
        why={props.why}
        onClick={() => {
          setIsAsking(true);
        }}
      >
        {props.label}
      </Button>
      <Dialog
        isOpen={isAsking}
        title={words.bookTitle(offer.chamberTag)}
        confirmLabel={words.bookAt(offer.chamberTag)}
        kind="primary"
        busy={book.isPending}
        error={errorText(book.error)}
        onConfirm={() => {
          book.mutate({
            params: { site: site.code },
            body: {
              requestId: request.id,
              lotId,
              requestVersion: request.version,
              offeredAt: props.offeredAt,
              placement: offer.placement,
            },
          });
        }}
        onClose={() => {
          setIsAsking(false);
          book.reset();
        }}
      >
        <p>{words.bookText(time(offer.startAt), time(offer.endAt))}</p>
        {isAsking ? <OfferSlip offer={offer} /> : null}
      </Dialog>
    </>
  );
}

/** Notes the slot for the scheduler; a draft is submitted with it. */
export function ProposeOffer(
  props: ActProps & { kind?: 'primary' | 'secondary'; onDone: () => void },
) {
  const { request, lotId, offer } = props;
  const site = useSite();
  const propose = useApiMutation(proposeOffer, {
    refreshes: requestReaders,
    onDone: props.onDone,
  });
  const failure = errorText(propose.error);
  return (
    <>
      <Button
        kind={props.kind ?? 'secondary'}
        busy={propose.isPending}
        why={props.why}
        onClick={() => {
          propose.mutate({
            params: { site: site.code, id: request.id, lotId },
            body: {
              version: request.version,
              offeredAt: props.offeredAt,
              placement: offer.placement,
            },
          });
        }}
      >
        {words.propose}
      </Button>
      {failure === undefined ? null : (
        <p className="mp-error max-w-[36ch] text-left whitespace-normal" role="alert">
          {failure}
        </p>
      )}
    </>
  );
}
