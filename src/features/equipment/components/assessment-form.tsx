import { useState } from 'react';
import {
  createAssessment,
  getInstrument,
  type InstrumentDto,
} from '#shared/contracts/equipment.contract.ts';
import { getWaterline } from '#shared/contracts/board.contract.ts';
import { findOffers } from '#shared/contracts/offers.contract.ts';
import { Button } from '#src/components/ui/button.tsx';
import { Field } from '#src/components/ui/field.tsx';
import { DateInput, NumberInput, TextArea, TextInput } from '#src/components/ui/input.tsx';
import { Notice } from '#src/components/ui/notice.tsx';
import { Tick } from '#src/components/ui/tick.tsx';
import { useApiMutation } from '#src/hooks/use-api-mutation.ts';
import { useNow } from '#src/hooks/use-now.ts';
import { useSite } from '#src/hooks/use-site.ts';
import { siteCalendar } from '#src/lib/format-date.ts';
import { isProblem } from '#src/lib/problem.ts';
import { t } from '#src/texts/t.ts';
import { readAssessment, type AssessmentDraft } from '../assessment-form.view.ts';

/** What a judged log showed, typed in; the log itself is read elsewhere. */
export function AssessmentForm(props: { instrument: InstrumentDto; onClose: () => void }) {
  const site = useSite();
  const { today } = siteCalendar(useNow(), site.zone);
  const [draft, setDraft] = useState<AssessmentDraft>({
    setTemperatureC: '',
    assessedOn: today,
    hoursLogged: '',
    driftMkPerH: '',
    halfBandMk: '',
    periodMin: '',
    resolutionMk: '',
    sensorPlace: '',
    loggerTag: '',
    isDoorTolerant: false,
    note: '',
  });
  const [localErrors, setLocalErrors] = useState<ReadonlyMap<string, string>>(new Map());
  const save = useApiMutation(createAssessment, {
    refreshes: [getInstrument, getWaterline, findOffers],
    onDone: props.onClose,
  });
  const serverErrors = isProblem(save.error) ? save.error.fieldErrors : new Map<string, string>();
  const errorOf = (field: string) =>
    localErrors.get(field) ?? serverErrors.get(`#/${field}`) ?? undefined;
  const set = (change: Partial<AssessmentDraft>) => {
    setDraft({ ...draft, ...change });
  };
  const words = t.equipment.form;
  const figure = (
    field:
      | 'setTemperatureC'
      | 'hoursLogged'
      | 'driftMkPerH'
      | 'halfBandMk'
      | 'periodMin'
      | 'resolutionMk',
    wire: string,
    label: string,
    unit: string,
    help?: string,
  ) => (
    <Field label={label} help={help} error={errorOf(wire)} optional={field === 'periodMin'}>
      <NumberInput
        unit={unit}
        value={draft[field]}
        onChange={(event) => {
          set({ [field]: event.target.value });
        }}
      />
    </Field>
  );
  const submit = () => {
    const read = readAssessment(draft);
    setLocalErrors(read.errors);
    if (read.body !== null) {
      save.mutate({ params: { site: site.code, tag: props.instrument.tag }, body: read.body });
    }
  };
  return (
    <form
      className="mp-stack"
      onSubmit={(event) => {
        event.preventDefault();
        submit();
      }}
    >
      {figure('setTemperatureC', 'setTemperatureC', words.temperature, '°C')}
      <Field label={words.judgedOn} error={errorOf('assessedOn')}>
        <DateInput
          value={draft.assessedOn}
          onChange={(event) => {
            set({ assessedOn: event.target.value });
          }}
        />
      </Field>
      {figure('hoursLogged', 'hoursLogged', words.hours, 'h')}
      {figure('driftMkPerH', 'driftKPerH', words.drift, 'mK/h', words.driftHelp)}
      {figure('halfBandMk', 'halfBandK', words.band, 'mK', words.bandHelp)}
      {figure('periodMin', 'periodS', words.period, 'min', words.periodHelp)}
      {figure('resolutionMk', 'resolutionK', words.resolution, 'mK')}
      <Field label={words.place} error={errorOf('sensorPlace')}>
        <TextInput
          value={draft.sensorPlace}
          onChange={(event) => {
            set({ sensorPlace: event.target.value });
          }}
        />
      </Field>
      <Field label={words.logger} error={errorOf('loggerTag')} optional>
        <TextInput
          value={draft.loggerTag}
          onChange={(event) => {
            set({ loggerTag: event.target.value });
          }}
        />
      </Field>
      <Field label={words.note} error={errorOf('note')} optional>
        <TextArea
          value={draft.note}
          onChange={(event) => {
            set({ note: event.target.value });
          }}
        />
      </Field>
      <Tick
        checked={draft.isDoorTolerant}
        onChange={(event) => {
          set({ isDoorTolerant: event.target.checked });
        }}
      >
        {words.tolerant}
      </Tick>
      {save.isError ? (
        <Notice kind="stop" role="alert">
          {isProblem(save.error) ? save.error.document.detail : t.ui.failedTitle}
        </Notice>
      ) : null}
      <div className="mp-acts">
        <Button kind="primary" type="submit" busy={save.isPending}>
          {words.save}
        </Button>
        <Button kind="link" onClick={props.onClose}>
          {words.close}
        </Button>
      </div>
    </form>
  );
}
