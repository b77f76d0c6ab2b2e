import { useNavigate } from 'react-router-dom';
import { confirmBooking } from '#shared/contracts/bookings.contract.ts';
import { proposeOffer, type OfferDto } from '#shared/contracts/offers.contract.ts';
import type { RequestDto } from '#shared/contracts/requests.contract.ts';
import { paths } from '#src/app/paths.ts';
import { Dialog } from '#src/components/ui/dialog.tsx';
import { useApiMutation } from '#src/hooks/use-api-mutation.ts';
import { useSite } from '#src/hooks/use-site.ts';
import { t } from '#src/texts/t.ts';
import type { SlotAct } from '../offers.view.ts';
import { refusalText } from '../refusal.view.ts';
import { requestReaders } from '../refreshes.ts';
import { useTime } from '../use-time.ts';
import { OfferSlip } from './offer-slip.tsx';

const words = t.request;

/** A slot that somebody is about to take, as it was when they chose it. */
export type Taking = {
  readonly act: SlotAct;
  readonly offer: OfferDto;
  /** Left out where a place was chosen by form: it was not offered and does not expire. */
  readonly offeredAt?: string | undefined;
};

function useTaking(request: RequestDto, lotId: number, done: { onProposed: () => void }) {
  const site = useSite();
  const navigate = useNavigate();
  const book = useApiMutation(confirmBooking, {
    refreshes: requestReaders,
    onDone: (made) => {
      void navigate(paths.booking.href(site.code, made.id));
    },
  });
  const propose = useApiMutation(proposeOffer, {
    refreshes: requestReaders,
    onDone: done.onProposed,
  });
  return {
    isBusy: book.isPending || propose.isPending,
    error: refusalText(book.error ?? propose.error),
    run: ({ act, offer, offeredAt }: Taking) => {
      const { placement } = offer;
      if (act === 'book') {
        book.mutate({
          params: { site: site.code },
          body: {
            requestId: request.id,
            lotId,
            requestVersion: request.version,
            ...(offeredAt === undefined ? {} : { offeredAt }),
            placement,
          },
        });
      } else if (offeredAt !== undefined) {
        propose.mutate({
          params: { site: site.code, id: request.id, lotId },
          body: { version: request.version, offeredAt, placement },
        });
      }
    },
  };
}

/**
 * Asks before a slot is taken and shows what it means. It stands apart from the list of slots: when
 * somebody was quicker the list changes under it, and the answer must stay readable.
 */
export function SlotDialog(props: {
  request: RequestDto;
  lotId: number;
  taking: Taking;
  onProposed: () => void;
  onClose: () => void;
}) {
  const { request, taking } = props;
  const time = useTime();
  const doing = useTaking(request, props.lotId, { onProposed: props.onProposed });
  const { offer, act } = taking;
  const text = act === 'book' ? words.bookText : words.proposeText;
  return (
    <Dialog
      isOpen
      title={
        act === 'book' ? words.bookTitle(offer.chamberTag) : words.proposeTitle(offer.chamberTag)
      }
      confirmLabel={act === 'book' ? words.bookAt(offer.chamberTag) : words.propose}
      kind="primary"
      busy={doing.isBusy}
      error={doing.error}
      onConfirm={() => {
        doing.run(taking);
      }}
      onClose={props.onClose}
    >
      <p>{text(time(offer.startAt), time(offer.endAt))}</p>
      {act === 'propose' && request.state === 'draft' ? <p>{words.proposeSubmits}</p> : null}
      <div className="mt-3 max-h-[45vh] overflow-y-auto p-1">
        <OfferSlip offer={offer} />
      </div>
    </Dialog>
  );
}
