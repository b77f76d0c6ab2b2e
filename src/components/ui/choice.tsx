import { useId } from 'react';
import { useFieldControl } from './field.tsx';

export type ChoiceOption<Value extends string> = {
  readonly value: Value;
  readonly label: string;
  readonly disabled?: boolean | undefined;
};

/** One of few: joined words, the chosen one bold with an ink foot. Arrow keys move within it. */
export function Choice<Value extends string>(props: {
  options: readonly ChoiceOption<Value>[];
  value: Value | undefined;
  onChange: (value: Value) => void;
  /** Needed outside a `Field as="group"`, whose label names the set. */
  label?: string | undefined;
  name?: string | undefined;
  full?: boolean | undefined;
}) {
  const ownName = useId();
  const { attributes, labelId } = useFieldControl({});
  return (
    <div
      role="radiogroup"
      aria-label={props.label}
      aria-labelledby={props.label === undefined ? labelId : undefined}
      aria-describedby={attributes['aria-describedby']}
      aria-invalid={attributes['aria-invalid']}
      className={props.full ? 'mp-choice mp-choice-full' : 'mp-choice'}
    >
      {props.options.map((option) => (
        <label key={option.value}>
          <input
            type="radio"
            name={props.name ?? ownName}
            value={option.value}
            checked={option.value === props.value}
            disabled={option.disabled}
            onChange={() => {
              props.onChange(option.value);
            }}
          />
          {option.label}
        </label>
      ))}
    </div>
  );
}
