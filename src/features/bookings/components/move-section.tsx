import { useState } from 'react';
import { moveBooking, type BookingDto } from '#shared/contracts/bookings.contract.ts';
import { checkPlacement, type OfferDto } from '#shared/contracts/offers.contract.ts';
import { Section, TwoColumns } from '#src/components/layout/page.tsx';
import { Button } from '#src/components/ui/button.tsx';
import { ErrorState } from '#src/components/ui/feedback.tsx';
import { Field } from '#src/components/ui/field.tsx';
import { DateTimeInput, TextArea, TextInput } from '#src/components/ui/input.tsx';
import { Notice } from '#src/components/ui/notice.tsx';
import { Slip } from '#src/components/ui/slip.tsx';
import { useApiMutation } from '#src/hooks/use-api-mutation.ts';
import { useSite } from '#src/hooks/use-site.ts';
import { errorText } from '#src/lib/error-text.ts';
import { formatDuration } from '#src/lib/format-duration.ts';
import { formatInstant } from '#src/lib/format-date.ts';
import { fromSiteInput, toSiteInput } from '#src/lib/site-time.ts';
import { t } from '#src/texts/t.ts';
import { slipLines, stopReason } from '../check-lines.view.ts';
import { placeReaders } from '../refreshes.ts';

const words = t.bookings;

/** Where the booking would go, and why; kept while the server is asked, whatever it answers. */
function useMoveForm(booking: BookingDto) {
  const site = useSite();
  const [chamberTag, setChamberTag] = useState(booking.chamberTag);
  const [start, setStart] = useState(toSiteInput(booking.startAt, site.zone));
  const [reason, setReason] = useState('');
  const [checkedFor, setCheckedFor] = useState('');
  const reading = fromSiteInput(start, site.zone);
  return {
    values: { chamberTag, start, reason },
    set: { setChamberTag, setStart, setReason },
    startAt: reading.kind === 'instant' ? reading.at : null,
    startFault: faultOf(reading.kind, site.zone),
    /** What was checked counts only for the place it was checked for. */
    isCurrent: checkedFor === `${chamberTag} ${start}`,
    noteChecked: () => {
      setCheckedFor(`${chamberTag} ${start}`);
    },
  };
}

function faultOf(kind: ReturnType<typeof fromSiteInput>['kind'], zone: string): string | undefined {
  if (kind === 'gap') {
    return t.ui.timeGap(zone);
  }
  return kind === 'instant' ? undefined : t.ui.timeInvalid;
}

type Form = ReturnType<typeof useMoveForm>;

function Fields(props: { form: Form }) {
  const site = useSite();
  const { values, set, startFault } = props.form;
  return (
    <>
      <Field label={words.moveChamber}>
        <TextInput
          value={values.chamberTag}
          maxLength={4}
          onChange={(event) => {
            set.setChamberTag(event.target.value.toUpperCase());
          }}
        />
      </Field>
      <Field label={words.moveStart} help={words.moveStartHelp(site.zone)} error={startFault}>
        <DateTimeInput
          value={values.start}
          step={900}
          onChange={(event) => {
            set.setStart(event.target.value);
          }}
        />
      </Field>
      <Field label={words.reason} help={words.reasonHelp}>
        <TextArea
          value={values.reason}
          onChange={(event) => {
            set.setReason(event.target.value);
          }}
        />
      </Field>
    </>
  );
}

function Found(props: { offer: OfferDto }) {
  const { offer } = props;
  const site = useSite();
  const time = (at: string) => formatInstant(at, { zone: site.zone });
  const lengthS = (Date.parse(offer.endAt) - Date.parse(offer.startAt)) / 1000;
  return (
    <Slip
      label={words.moveSlipLabel}
      title={words.moveSlip(offer.chamberTag, time(offer.startAt))}
      subtitle={words.moveUntil(time(offer.endAt), formatDuration(lengthS))}
      lines={slipLines(offer.checks)}
    />
  );
}

/** Why the move cannot be made yet; undefined where it can. */
function whyNot(form: Form, offer: OfferDto | null | undefined): string | undefined {
  if (!form.isCurrent || offer === null || offer === undefined) {
    return words.moveUnchecked;
  }
  return (
    stopReason(offer.checks) ??
    (form.values.reason.trim().length < 3 ? words.reasonMissing : undefined)
  );
}

function useMoving(booking: BookingDto, onClose: (isDone: boolean) => void) {
  const site = useSite();
  const check = useApiMutation(checkPlacement);
  const move = useApiMutation(moveBooking, {
    refreshes: placeReaders,
    onDone: () => {
      onClose(true);
    },
  });
  return {
    check,
    move,
    askCheck: (chamberTag: string, startAt: string) => {
      move.reset();
      check.mutate({
        params: {
          site: site.code,
          id: booking.requestId ?? 0,
          lotId: booking.lotId ?? 0,
        },
        body: { chamberTag, startAt, movesBookingId: booking.id },
      });
    },
    run: (offer: OfferDto, reason: string) => {
      move.mutate({
        params: { site: site.code, id: booking.id },
        body: { version: booking.version, placement: offer.placement, reason },
      });
    },
  };
}

/** What the server said of the place, beside the form. */
function Answer(props: {
  failure: string | undefined;
  reason: string | null;
  offer: OfferDto | null;
}) {
  return (
    <div aria-live="polite">
      {props.failure === undefined ? null : <ErrorState detail={props.failure} />}
      {props.reason === null ? null : <Notice kind="stop">{props.reason}</Notice>}
      {props.offer === null ? null : <Found offer={props.offer} />}
    </div>
  );
}

/** Moves a booking by form: place and time, the slip of checks, then the move. */
export function MoveSection(props: { booking: BookingDto; onClose: (isDone: boolean) => void }) {
  const form = useMoveForm(props.booking);
  const moving = useMoving(props.booking, props.onClose);
  const { check, move } = moving;
  const offer = form.isCurrent ? check.data?.offer : undefined;
  return (
    <Section title={words.moveHead} note={<p>{words.moveNote}</p>}>
      <TwoColumns kind="form">
        <div>
          <Fields form={form} />
          <div className="mp-acts mt-3">
            <Button
              busy={check.isPending}
              why={form.startFault === undefined ? undefined : words.moveStart}
              onClick={() => {
                if (form.startAt !== null) {
                  form.noteChecked();
                  moving.askCheck(form.values.chamberTag, form.startAt);
                }
              }}
            >
              {words.moveCheck}
            </Button>
            <Button
              kind="primary"
              busy={move.isPending}
              why={whyNot(form, offer)}
              onClick={() => {
                if (offer !== null && offer !== undefined) {
                  moving.run(offer, form.values.reason);
                }
              }}
            >
              {words.moveTo(form.values.chamberTag)}
            </Button>
            <Button
              kind="link"
              onClick={() => {
                props.onClose(false);
              }}
            >
              {words.moveKeep}
            </Button>
          </div>
        </div>
        <Answer
          failure={errorText(check.error ?? move.error)}
          reason={form.isCurrent ? (check.data?.reason ?? null) : null}
          offer={offer ?? null}
        />
      </TwoColumns>
    </Section>
  );
}
