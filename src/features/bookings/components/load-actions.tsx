import { useState } from 'react';
import { closeLoad, reopenLoad, type LoadDto } from '#shared/contracts/bookings.contract.ts';
import { Button } from '#src/components/ui/button.tsx';
import { Dialog } from '#src/components/ui/dialog.tsx';
import { Field } from '#src/components/ui/field.tsx';
import { DateTimeInput } from '#src/components/ui/input.tsx';
import { useApiMutation } from '#src/hooks/use-api-mutation.ts';
import { useSite } from '#src/hooks/use-site.ts';
import { errorText } from '#src/lib/error-text.ts';
import { fromSiteInput, toSiteInput } from '#src/lib/site-time.ts';
import { t } from '#src/texts/t.ts';
import { placeReaders } from '../refreshes.ts';

const words = t.bookings;

function CloseLoad(props: { load: LoadDto }) {
  const { load } = props;
  const site = useSite();
  const [isOpen, setIsOpen] = useState(false);
  const close = useApiMutation(closeLoad, { refreshes: placeReaders });
  return (
    <>
      <Button
        onClick={() => {
          setIsOpen(true);
        }}
      >
        {words.close}
      </Button>
      <Dialog
        isOpen={isOpen}
        title={words.closeTitle(load.id)}
        confirmLabel={words.close}
        kind="primary"
        busy={close.isPending}
        error={errorText(close.error)}
        onConfirm={() => {
          close.mutate({
            params: { site: site.code, id: load.id },
            body: { version: load.version },
          });
        }}
        onClose={() => {
          setIsOpen(false);
          close.reset();
        }}
      >
        <p>{words.closeText}</p>
      </Dialog>
    </>
  );
}

function ReopenLoad(props: { load: LoadDto }) {
  const { load } = props;
  const site = useSite();
  const [isOpen, setIsOpen] = useState(false);
  const [closesAt, setClosesAt] = useState(toSiteInput(load.startAt, site.zone));
  const reopen = useApiMutation(reopenLoad, { refreshes: placeReaders });
  const reading = fromSiteInput(closesAt, site.zone);
  const fault = reading.kind === 'instant' ? undefined : t.ui.timeInvalid;
  return (
    <>
      <Button
        onClick={() => {
          setIsOpen(true);
        }}
      >
        {words.reopen}
      </Button>
      <Dialog
        isOpen={isOpen}
        title={words.reopenTitle(load.id)}
        confirmLabel={words.reopen}
        kind="primary"
        busy={reopen.isPending}
        why={fault}
        error={errorText(reopen.error)}
        onConfirm={() => {
          if (reading.kind === 'instant') {
            reopen.mutate({
              params: { site: site.code, id: load.id },
              body: { version: load.version, closesAt: reading.at },
            });
          }
        }}
        onClose={() => {
          setIsOpen(false);
          reopen.reset();
        }}
      >
        <p>{words.reopenText}</p>
        <Field label={words.closesAt} layout="above" help={words.timesIn(site.zone)} error={fault}>
          <DateTimeInput
            value={closesAt}
            onChange={(event) => {
              setClosesAt(event.target.value);
            }}
          />
        </Field>
      </Dialog>
    </>
  );
}

/** Closing lets nobody join; opening again is possible until loading starts. */
export function LoadActions(props: { load: LoadDto }) {
  switch (props.load.state) {
    case 'open':
      return <CloseLoad load={props.load} />;
    case 'closed':
      return <ReopenLoad load={props.load} />;
    default:
      return null;
  }
}
