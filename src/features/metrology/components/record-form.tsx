import { useState } from 'react';
import { useNavigate } from 'react-router-dom';
import { recordCalibration } from '#shared/contracts/calibrations.contract.ts';
import type { InstrumentDto } from '#shared/contracts/equipment.contract.ts';
import { conformities, type Conformity } from '#shared/domain/states.ts';
import { paths } from '#src/app/paths.ts';
import { Section } from '#src/components/layout/page.tsx';
import { Button, LinkButton } from '#src/components/ui/button.tsx';
import { Choice } from '#src/components/ui/choice.tsx';
import { Field } from '#src/components/ui/field.tsx';
import { DateInput, TextArea, TextInput } from '#src/components/ui/input.tsx';
import { Notice } from '#src/components/ui/notice.tsx';
import { useApiMutation } from '#src/hooks/use-api-mutation.ts';
import { useNow } from '#src/hooks/use-now.ts';
import { useSite } from '#src/hooks/use-site.ts';
import { errorText } from '#src/lib/error-text.ts';
import { siteCalendar } from '#src/lib/format-date.ts';
import { isProblem } from '#src/lib/problem.ts';
import { t } from '#src/texts/t.ts';
import {
  dueAfter,
  fieldError,
  groupScopes,
  readRecord,
  scopeKey,
  type RecordDraft,
} from '../record-form.view.ts';
import { validityReaders } from '../refreshes.ts';
import { CertificateInput } from './certificate-input.tsx';
import { ScopePicker } from './scope-picker.tsx';

const words = t.metrology;

type FormProps = {
  instrument: InstrumentDto;
  intervalMonths: number | null;
  replacesId: number | null;
};

function useRecordForm({ instrument, intervalMonths, replacesId }: FormProps) {
  const site = useSite();
  const navigate = useNavigate();
  const { today } = siteCalendar(useNow(), site.zone);
  const [draft, setDraft] = useState<RecordDraft>({
    performedOn: today,
    dueOn: '',
    provider: '',
    certificateNumber: '',
    conformityAsFound: 'conforms',
    conformityAsLeft: 'conforms',
    note: '',
    ticked: new Set(instrument.scopes.map(scopeKey)),
    limitations: new Map(),
    fileId: null,
  });
  const [localErrors, setLocalErrors] = useState<ReadonlyMap<string, string>>(new Map());
  const save = useApiMutation(recordCalibration, {
    refreshes: validityReaders,
    onDone: (record) => {
      void navigate(paths.calibration.href(site.code, record.id));
    },
  });
  const serverErrors = isProblem(save.error) ? save.error.fieldErrors : new Map<string, string>();
  const dueOn =
    draft.dueOn === '' && intervalMonths !== null
      ? dueAfter(draft.performedOn, intervalMonths)
      : draft.dueOn;
  return {
    draft,
    dueOn,
    set: (change: Partial<RecordDraft>) => {
      setDraft((current) => ({ ...current, ...change }));
    },
    errorOf: (field: string) => fieldError(field, localErrors, serverErrors),
    isSaving: save.isPending,
    failure: errorText(save.error),
    submit: () => {
      const read = readRecord(draft, { instrument, dueOn, replacesId });
      setLocalErrors(read.errors);
      if (read.body !== null) {
        save.mutate({ params: { site: site.code }, body: read.body });
      }
    },
  };
}

type Form = ReturnType<typeof useRecordForm>;

function WhenAndBy(props: { form: Form; intervalMonths: number | null }) {
  const { draft, dueOn, set, errorOf } = props.form;
  return (
    <Section title={words.when}>
      <div className="max-w-[560px]">
        <Field label={words.performedOn} error={errorOf('performedOn')}>
          <DateInput
            value={draft.performedOn}
            onChange={(event) => {
              set({ performedOn: event.target.value });
            }}
          />
        </Field>
        <Field
          label={words.dueOn}
          error={errorOf('dueOn')}
          help={
            props.intervalMonths === null ? words.dueHelpNone : words.dueHelp(props.intervalMonths)
          }
        >
          <DateInput
            value={dueOn}
            onChange={(event) => {
              set({ dueOn: event.target.value });
            }}
          />
        </Field>
        <Field label={words.provider} error={errorOf('provider')} help={words.providerHelp}>
          <TextInput
            value={draft.provider}
            onChange={(event) => {
              set({ provider: event.target.value });
            }}
          />
        </Field>
        <Field label={words.certificateNumber} error={errorOf('certificateNumber')}>
          <TextInput
            value={draft.certificateNumber}
            onChange={(event) => {
              set({ certificateNumber: event.target.value });
            }}
          />
        </Field>
      </div>
    </Section>
  );
}

function Conformities(props: { form: Form }) {
  const { draft, set, errorOf } = props.form;
  const options = conformities.map((value) => ({ value, label: words.conformities[value] }));
  return (
    <Section title={words.conformity} note={<p>{words.conformityNote}</p>}>
      <Field as="group" label={words.asFound} error={errorOf('conformityAsFound')}>
        <Choice<Conformity>
          options={options}
          value={draft.conformityAsFound}
          onChange={(conformityAsFound) => {
            set({ conformityAsFound });
          }}
        />
      </Field>
      <Field as="group" label={words.asLeft} error={errorOf('conformityAsLeft')}>
        <Choice<Conformity>
          options={options}
          value={draft.conformityAsLeft}
          onChange={(conformityAsLeft) => {
            set({ conformityAsLeft });
          }}
        />
      </Field>
      {draft.conformityAsLeft === 'conforms' ? null : (
        <Notice kind="caution">{words.asLeftWarning}</Notice>
      )}
    </Section>
  );
}

/** Everything a record says, for one instrument; kept as typed whatever the server answers. */
export function RecordForm(props: FormProps) {
  const site = useSite();
  const form = useRecordForm(props);
  const { draft, set, errorOf } = form;
  const scopeFault = errorOf('scopes');
  return (
    <form
      noValidate
      onSubmit={(event) => {
        event.preventDefault();
        form.submit();
      }}
    >
      <WhenAndBy form={form} intervalMonths={props.intervalMonths} />
      <Section title={words.pick} note={<p>{words.pickNote}</p>}>
        {scopeFault === undefined ? null : (
          <Notice kind="stop" role="alert">
            {draft.ticked.size === 0 ? words.pickAtLeastOne : scopeFault}
          </Notice>
        )}
        <ScopePicker groups={groupScopes(props.instrument.scopes)} draft={draft} onChange={set} />
      </Section>
      <Conformities form={form} />
      <Section title={words.file} note={<p>{words.fileNote}</p>}>
        <CertificateInput
          fileId={draft.fileId}
          onFile={(fileId) => {
            set({ fileId });
          }}
        />
      </Section>
      <Section title={words.finish} note={<p>{words.finishNote}</p>}>
        <div className="max-w-[720px]">
          <Field label={words.note} error={errorOf('note')} optional>
            <TextArea
              value={draft.note}
              onChange={(event) => {
                set({ note: event.target.value });
              }}
            />
          </Field>
        </div>
        {form.failure === undefined ? null : (
          <Notice kind="stop" role="alert">
            {form.failure}
          </Notice>
        )}
        <div className="mp-acts mt-3">
          <Button kind="primary" type="submit" busy={form.isSaving}>
            {words.save}
          </Button>
          <LinkButton kind="link" to={paths.metrology.href(site.code)}>
            {words.back}
          </LinkButton>
        </div>
      </Section>
    </form>
  );
}
