import { useQuery } from '@tanstack/react-query';
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
import { fromSiteInput } from '#src/lib/site-time.ts';
import { t } from '#src/texts/t.ts';
import { chambersQuery } from '../api/request-queries.ts';
import { countStops } from '../check-lines.view.ts';
import { refusalText } from '../refusal.view.ts';
import { OfferSlip } from './offer-slip.tsx';
import type { Taking } from './slot-dialog.tsx';

const words = t.request;

function usePlace() {
  const site = useSite();
  const [chamberTag, setChamberTag] = useState('');
  const [start, setStart] = useState('');
  const [checkedFor, setCheckedFor] = useState<string | null>(null);
  const reading = fromSiteInput(start, site.zone);
  const place = `${chamberTag} ${start}`;
  const faults = {
    gap: t.ui.timeGap(site.zone),
    invalid: t.ui.timeInvalid,
    instant: undefined,
    empty: undefined,
  };
  return {
    chamberTag,
    setChamberTag,
    start,
    setStart,
    startAt: reading.kind === 'instant' ? reading.at : null,
    fault: faults[reading.kind],
    isCurrent: checkedFor === place,
    noteChecked: () => {
      setCheckedFor(place);
    },
  };
}
type Place = ReturnType<typeof usePlace>;

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

function PlaceFields(props: { place: Place }) {
  const { place } = props;
  const site = useSite();
  const chambers = useQuery(chambersQuery(site.code));
  return (
    <>
      <Field label={words.chamber}>
        <TextInput
          value={place.chamberTag}
          maxLength={4}
          suggestions={chambers.data?.vessels.map(({ tag }) => tag)}
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
    </>
  );
}

/** Why it cannot be booked yet; undefined where it can. */
function whyNot(place: Place, offer: OfferDto | null): string | undefined {
  if (!place.isCurrent || offer === null) {
    return words.unchecked;
  }
  const stops = countStops(offer.checks);
  return stops === 0 ? undefined : words.stops(stops);
}

function whyUncheckable(place: Place): string | undefined {
  if (place.chamberTag === '') {
    return words.chamberMissing;
  }
  return place.startAt === null ? words.startMissing : undefined;
}

/** Books a lot at a chamber and start of one's own choice, after every check was seen. */
export function BookByForm(props: {
  request: RequestDto;
  lotId: number;
  onTake: (taking: Taking) => void;
}) {
  const { request, lotId } = props;
  const site = useSite();
  const place = usePlace();
  const check = useApiMutation(checkPlacement);
  const answer = place.isCurrent ? check.data : undefined;
  const offer = answer?.offer ?? null;
  return (
    <Section title={words.byForm} note={<p>{words.byFormNote}</p>}>
      <TwoColumns kind="form">
        <form
          onSubmit={(event) => {
            event.preventDefault();
            if (place.startAt !== null && place.chamberTag !== '') {
              place.noteChecked();
              check.mutate({
                params: { site: site.code, id: request.id, lotId },
                body: { chamberTag: place.chamberTag, startAt: place.startAt },
              });
            }
          }}
        >
          <PlaceFields place={place} />
          <div className="mp-acts mt-3">
            <Button type="submit" busy={check.isPending} why={whyUncheckable(place)}>
              {words.check}
            </Button>
            <Button
              kind="primary"
              why={whyNot(place, offer)}
              onClick={() => {
                if (offer !== null) {
                  props.onTake({ act: 'book', offer });
                }
              }}
            >
              {words.bookHere}
            </Button>
          </div>
        </form>
        <Answer failure={refusalText(check.error)} reason={answer?.reason ?? null} offer={offer} />
      </TwoColumns>
    </Section>
  );
}
