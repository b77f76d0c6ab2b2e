import { useState } from 'react';
import { checkPlacement, type OfferDto } from '#shared/contracts/offers.contract.ts';
import type { RequestDto } from '#shared/contracts/requests.contract.ts';
import { Section, TwoColumns } from '#src/components/layout/page.tsx';
import { Button } from '#src/components/ui/button.tsx';
import { ErrorState } from '#src/components/ui/feedback.tsx';
import { Field } from '#src/components/ui/field.tsx';
import { DateTimeInput, TextInput } from '#src/components/ui/input.tsx';
import { Notice } from '#src/components/ui/notice.tsx';
import { useApiMutation } from '#src/hooks/use-api-mutation.ts';
import { useSite } from '#src/hooks/use-site.ts';
import { errorText } from '#src/lib/error-text.ts';
import { fromSiteInput } from '#src/lib/site-time.ts';
import { t } from '#src/texts/t.ts';
import { countStops } from '../check-lines.view.ts';
import { BookOffer, OfferSlip } from './offer-actions.tsx';

const words = t.request;

function usePlace() {
  const site = useSite();
  const [chamberTag, setChamberTag] = useState('');
  const [start, setStart] = useState('');
  const [checkedFor, setCheckedFor] = useState<string | null>(null);
  const reading = fromSiteInput(start, site.zone);
  const place = `${chamberTag} ${start}`;
  const fault =
    reading.kind === 'gap'
      ? t.ui.timeGap(site.zone)
      : reading.kind === 'invalid'
        ? t.ui.timeInvalid
        : undefined;
  return {
    chamberTag,
    setChamberTag,
    start,
    setStart,
    startAt: reading.kind === 'instant' ? reading.at : null,
    fault,
    isCurrent: checkedFor === place,
    noteChecked: () => {
      setCheckedFor(place);
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
      {props.offer === null ? null : <OfferSlip offer={props.offer} />}
    </div>
  );
}

/** Books a lot at a chamber and start of one's own choice, after every check was seen. */
export function BookByForm(props: { request: RequestDto; lotId: number }) {
  const { request, lotId } = props;
  const site = useSite();
  const place = usePlace();
  const check = useApiMutation(checkPlacement);
  const answer = place.isCurrent ? check.data : undefined;
  const offer = answer?.offer ?? null;
  const stops = offer === null ? 0 : countStops(offer.checks);
  return (
    <Section title={words.byForm} note={<p>{words.byFormNote}</p>}>
      <TwoColumns kind="form">
        <div>
          <Field label={words.chamber}>
            <TextInput
              value={place.chamberTag}
              maxLength={4}
              onChange={(event) => {
                place.setChamberTag(event.target.value.toUpperCase());
              }}
            />
          </Field>
          <Field label={words.start} help={words.startHelp(site.zone)} error={place.fault}>
            <DateTimeInput
              value={place.start}
              step={900}
              onChange={(event) => {
                place.setStart(event.target.value);
              }}
            />
          </Field>
          <div className="mp-acts mt-3">
            <Button
              busy={check.isPending}
              why={place.startAt === null || place.chamberTag === '' ? words.start : undefined}
              onClick={() => {
                if (place.startAt !== null) {
                  place.noteChecked();
                  check.mutate({
                    params: { site: site.code, id: request.id, lotId },
                    body: { chamberTag: place.chamberTag, startAt: place.startAt },
                  });
                }
              }}
            >
              {words.check}
            </Button>
            {offer === null || answer === undefined ? null : (
              <BookOffer
                request={request}
                lotId={lotId}
                offer={offer}
                offeredAt={answer.offeredAt}
                kind="primary"
                label={words.bookAt(offer.chamberTag)}
                why={stops === 0 ? undefined : words.stops(stops)}
              />
            )}
          </div>
        </div>
        <Answer failure={errorText(check.error)} reason={answer?.reason ?? null} offer={offer} />
      </TwoColumns>
    </Section>
  );
}
