import { useState } from 'react';
import type { BookingRow } from '#shared/contracts/bookings.contract.ts';
import {
  approveCalibration,
  refuseCalibration,
  type CalibrationDto,
} from '#shared/contracts/calibrations.contract.ts';
import { Button } from '#src/components/ui/button.tsx';
import { Dialog } from '#src/components/ui/dialog.tsx';
import { Field } from '#src/components/ui/field.tsx';
import { TextArea } from '#src/components/ui/input.tsx';
import { useApiMutation } from '#src/hooks/use-api-mutation.ts';
import { useMay, useSite } from '#src/hooks/use-site.ts';
import { errorText } from '#src/lib/error-text.ts';
import { t } from '#src/texts/t.ts';
import { validityReaders } from '../refreshes.ts';

const words = t.metrology;

/** The second signature: whoever recorded it cannot give it. */
export function DecideCalibration(props: {
  record: CalibrationDto;
  onApproved: (affected: readonly BookingRow[]) => void;
}) {
  const { record } = props;
  const site = useSite();
  const may = useMay();
  const [asked, setAsked] = useState<'approve' | 'refuse' | null>(null);
  const [reason, setReason] = useState('');
  const approve = useApiMutation(approveCalibration, {
    refreshes: validityReaders,
    onDone: (answer) => {
      setAsked(null);
      props.onApproved(answer.affected);
    },
  });
  const refuse = useApiMutation(refuseCalibration, {
    refreshes: validityReaders,
    onDone: () => {
      setAsked(null);
    },
  });
  const close = () => {
    setAsked(null);
    approve.reset();
    refuse.reset();
  };
  if (!may('calibration.approve')) {
    return null;
  }
  const isOwn = record.recordedBy.id === site.actor.personId;
  const why = isOwn ? words.ownRecord : undefined;
  const params = { site: site.code, id: record.id };
  return (
    <>
      <Button
        why={why}
        onClick={() => {
          setAsked('refuse');
        }}
      >
        {words.refuse}
      </Button>
      <Button
        kind="primary"
        why={why}
        onClick={() => {
          setAsked('approve');
        }}
      >
        {words.approve}
      </Button>
      <Dialog
        isOpen={asked === 'approve'}
        title={words.approveTitle(record.id)}
        confirmLabel={words.approve}
        kind="primary"
        busy={approve.isPending}
        error={errorText(approve.error)}
        onConfirm={() => {
          approve.mutate({ params, body: { version: record.version } });
        }}
        onClose={close}
      >
        <p>{words.approveText(record.tag)}</p>
        {record.conformityAsLeft === 'does-not-conform' ? <p>{words.asLeftWarning}</p> : null}
      </Dialog>
      <Dialog
        isOpen={asked === 'refuse'}
        title={words.refuseTitle(record.id)}
        confirmLabel={words.refuse}
        busy={refuse.isPending}
        why={reason.trim().length < 3 ? words.reasonMissing : undefined}
        error={errorText(refuse.error)}
        onConfirm={() => {
          refuse.mutate({ params, body: { version: record.version, reason } });
        }}
        onClose={close}
      >
        <p>{words.refuseText}</p>
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
