import { Choice } from '#src/components/ui/choice.tsx';
import { Field } from '#src/components/ui/field.tsx';
import { NumberInput } from '#src/components/ui/input.tsx';
import { t } from '#src/texts/t.ts';
import type { RequestDraft } from '../request-draft.view.ts';

const words = t.request;

export type AimProps = {
  draft: RequestDraft;
  errorOf: (pointer: string) => string | undefined;
  onChange: (change: Partial<RequestDraft>) => void;
};

function Temperature({ draft, errorOf, onChange }: AimProps) {
  return (
    <>
      <Field label={words.setTemperature} error={errorOf('#/setTemperatureC')}>
        <NumberInput
          unit="°C"
          value={draft.setTemperatureC}
          onChange={(event) => {
            onChange({ setTemperatureC: event.target.value });
          }}
        />
      </Field>
      <Field label={words.setTolerance} error={errorOf('#/setToleranceK')}>
        <NumberInput
          unit="± K"
          value={draft.setToleranceK}
          onChange={(event) => {
            onChange({ setToleranceK: event.target.value });
          }}
        />
      </Field>
    </>
  );
}

function Tolerance({ draft, errorOf, onChange }: AimProps) {
  if (draft.kind === 'screening') {
    return (
      <Field label={words.ratio} help={words.ratioHelp} error={errorOf('#/badToGoodRatio')}>
        <NumberInput
          unit="×"
          value={draft.badToGoodRatio}
          onChange={(event) => {
            onChange({ badToGoodRatio: event.target.value });
          }}
        />
      </Field>
    );
  }
  const isRelative = draft.toleranceKind === 'relative';
  return (
    <>
      <Field as="group" label={words.tolerance}>
        <Choice
          options={[
            { value: 'relative', label: words.toleranceKinds.relative },
            { value: 'absolute', label: words.toleranceKinds.absolute },
          ]}
          value={draft.toleranceKind}
          onChange={(toleranceKind) => {
            onChange({ toleranceKind });
          }}
        />
      </Field>
      <Field label={words.within} error={errorOf('#/tolerance')}>
        <NumberInput
          unit={isRelative ? '%' : 'µA'}
          value={isRelative ? draft.tolerancePct : draft.toleranceUa}
          onChange={(event) => {
            onChange(
              isRelative
                ? { tolerancePct: event.target.value }
                : { toleranceUa: event.target.value },
            );
          }}
        />
      </Field>
    </>
  );
}

/** What the result must be: at which temperature, of what kind, how sure, of which grade. */
export function AimFields(props: AimProps) {
  const { draft, onChange } = props;
  return (
    <>
      <Temperature {...props} />
      <Field as="group" label={words.kind} help={words.kindHelp[draft.kind]}>
        <Choice
          options={[
            { value: 'screening', label: words.kinds.screening },
            { value: 'settled', label: words.kinds.settled },
          ]}
          value={draft.kind}
          onChange={(kind) => {
            onChange({ kind });
          }}
        />
      </Field>
      <Tolerance {...props} />
      <Field as="group" label={words.grade} help={words.gradeHelp[draft.grade]}>
        <Choice
          options={[
            { value: 'reported', label: words.grades.reported },
            { value: 'indicative', label: words.grades.indicative },
          ]}
          value={draft.grade}
          onChange={(grade) => {
            onChange({ grade });
          }}
        />
      </Field>
    </>
  );
}
