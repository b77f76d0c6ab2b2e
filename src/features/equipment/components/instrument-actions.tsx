import { useState } from 'react';
import { listBookings, getBooking } from '#shared/contracts/bookings.contract.ts';
import { getBoard, getToday, getWaterline } from '#shared/contracts/board.contract.ts';
import { listDuties } from '#shared/contracts/calibrations.contract.ts';
import {
  getInstrument,
  getInstrumentWeek,
  listInstruments,
  reportBreakdown,
  returnToService,
  takeOutOfService,
  type InstrumentDto,
} from '#shared/contracts/equipment.contract.ts';
import type { BookingRow } from '#shared/contracts/bookings.contract.ts';
import { Button } from '#src/components/ui/button.tsx';
import { Dialog } from '#src/components/ui/dialog.tsx';
import { Field } from '#src/components/ui/field.tsx';
import { DateTimeInput, TextArea } from '#src/components/ui/input.tsx';
import { useApiMutation } from '#src/hooks/use-api-mutation.ts';
import { useMay, useSite } from '#src/hooks/use-site.ts';
import { errorText } from '#src/lib/error-text.ts';
import { fromSiteInput, type SiteTimeReading } from '#src/lib/site-time.ts';
import { t } from '#src/texts/t.ts';

type Act = 'take-out' | 'release' | 'breakdown';

const refreshes = [
  getInstrument,
  getInstrumentWeek,
  listInstruments,
  listBookings,
  getBooking,
  getBoard,
  getToday,
  getWaterline,
  listDuties,
];

const texts = {
  'take-out': {
    title: t.equipment.takeOutTitle,
    text: t.equipment.takeOutText,
    verb: t.equipment.takeOut,
    reason: t.equipment.reason,
  },
  release: {
    title: t.equipment.releaseTitle,
    text: t.equipment.releaseText,
    verb: t.equipment.release,
    reason: t.equipment.releaseNote,
  },
  breakdown: {
    title: t.equipment.breakdownTitle,
    text: t.equipment.breakdownText,
    verb: t.equipment.breakdown,
    reason: t.equipment.reason,
  },
} as const;

function untilFault(reading: SiteTimeReading, zone: string): string | undefined {
  if (reading.kind === 'gap') {
    return t.ui.timeGap(zone);
  }
  return reading.kind === 'invalid' ? t.ui.timeInvalid : undefined;
}

function useActs(instrument: InstrumentDto, onDone: (rows: readonly BookingRow[]) => void) {
  const site = useSite();
  const done = (answer: { affected: readonly BookingRow[] }) => {
    onDone(answer.affected);
  };
  const takeOut = useApiMutation(takeOutOfService, { refreshes, onDone: done });
  const release = useApiMutation(returnToService, { refreshes, onDone: done });
  const breakdown = useApiMutation(reportBreakdown, { refreshes, onDone: done });
  const params = { site: site.code, tag: instrument.tag };
  const { version } = instrument;
  return {
    isBusy: takeOut.isPending || release.isPending || breakdown.isPending,
    error: errorText(takeOut.error ?? release.error ?? breakdown.error),
    reset: () => {
      takeOut.reset();
      release.reset();
      breakdown.reset();
    },
    run: (act: Act, reason: string, until: string | null) => {
      if (act === 'take-out') {
        takeOut.mutate({ params, body: { version, reason, until } });
      } else if (act === 'breakdown') {
        breakdown.mutate({ params, body: { reason, until } });
      } else {
        release.mutate({ params, body: { version, note: reason } });
      }
    },
  };
}

function ActButtons(props: { instrument: InstrumentDto; onAct: (act: Act) => void }) {
  const may = useMay();
  const isUsable = props.instrument.state === 'in-service';
  const isBlocked = !isUsable || props.instrument.unavailability.length > 0;
  const acts = [
    { act: 'breakdown', kind: 'secondary', isShown: isUsable && may('breakdown.report') },
    {
      act: 'take-out',
      kind: 'danger',
      isShown: isUsable && may('equipment.take-out-of-service'),
    },
    { act: 'release', kind: 'primary', isShown: isBlocked && may('equipment.release') },
  ] as const;
  return acts
    .filter((each) => each.isShown)
    .map(({ act, kind }) => (
      <Button
        key={act}
        kind={kind}
        onClick={() => {
          props.onAct(act);
        }}
      >
        {texts[act].verb}
      </Button>
    ));
}

/** Out of service, back again, and a breakdown: each in one dialog, what was typed kept on failure. */
export function InstrumentActions(props: {
  instrument: InstrumentDto;
  onAffected: (rows: readonly BookingRow[]) => void;
}) {
  const { instrument } = props;
  const site = useSite();
  const [act, setAct] = useState<Act | null>(null);
  const [reason, setReason] = useState('');
  const [until, setUntil] = useState('');
  const acts = useActs(instrument, (rows) => {
    setAct(null);
    setReason('');
    setUntil('');
    props.onAffected(rows);
  });
  const reading = fromSiteInput(until, site.zone);
  const fault = untilFault(reading, site.zone);
  const current = texts[act ?? 'take-out'];
  return (
    <>
      <ActButtons instrument={instrument} onAct={setAct} />
      <Dialog
        isOpen={act !== null}
        title={current.title(instrument.tag)}
        confirmLabel={current.verb}
        kind={act === 'release' ? 'primary' : 'danger'}
        busy={acts.isBusy}
        why={fault}
        error={acts.error}
        onConfirm={() => {
          if (act !== null) {
            acts.run(act, reason, reading.kind === 'instant' ? reading.at : null);
          }
        }}
        onClose={() => {
          setAct(null);
          acts.reset();
        }}
      >
        <p>{current.text}</p>
        <Field label={current.reason} layout="above">
          <TextArea
            value={reason}
            onChange={(event) => {
              setReason(event.target.value);
            }}
          />
        </Field>
        {act === 'release' ? null : (
          <Field
            label={t.equipment.until}
            layout="above"
            help={t.equipment.untilHelp(site.zone)}
            error={fault}
            optional
          >
            <DateTimeInput
              value={until}
              onChange={(event) => {
                setUntil(event.target.value);
              }}
            />
          </Field>
        )}
      </Dialog>
    </>
  );
}
