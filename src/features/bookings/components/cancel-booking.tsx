import { useState } from 'react';
import { cancelBooking, type BookingDto } from '#shared/contracts/bookings.contract.ts';
import { Button } from '#src/components/ui/button.tsx';
import { Dialog } from '#src/components/ui/dialog.tsx';
import { Field } from '#src/components/ui/field.tsx';
import { TextArea } from '#src/components/ui/input.tsx';
import { useApiMutation } from '#src/hooks/use-api-mutation.ts';
import { useSite } from '#src/hooks/use-site.ts';
import { errorText } from '#src/lib/error-text.ts';
import { t } from '#src/texts/t.ts';
import { placeReaders } from '../refreshes.ts';

/** Cancels after a reason was given; what was typed stays when it fails. */
export function CancelBooking(props: { booking: BookingDto }) {
  const { booking } = props;
  const site = useSite();
  const [isOpen, setIsOpen] = useState(false);
  const [reason, setReason] = useState('');
  const cancel = useApiMutation(cancelBooking, {
    refreshes: placeReaders,
    onDone: () => {
      setIsOpen(false);
    },
  });
  const words = t.bookings;
  return (
    <>
      <Button
        kind="danger"
        onClick={() => {
          setIsOpen(true);
        }}
      >
        {words.cancel}
      </Button>
      <Dialog
        isOpen={isOpen}
        title={words.cancelTitle(booking.id)}
        confirmLabel={words.cancel}
        busy={cancel.isPending}
        why={reason.trim().length < 3 ? words.reasonMissing : undefined}
        error={errorText(cancel.error)}
        onConfirm={() => {
          cancel.mutate({
            params: { site: site.code, id: booking.id },
            body: { version: booking.version, reason },
          });
        }}
        onClose={() => {
          setIsOpen(false);
          cancel.reset();
        }}
      >
        <p>{words.cancelText}</p>
        <Field label={words.reason} layout="above" help={words.reasonHelp}>
          <TextArea
            value={reason}
            onChange={(event) => {
              setReason(event.target.value);
            }}
          />
        </Field>
      </Dialog>
    </>
  );
}
