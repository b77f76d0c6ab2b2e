import type { ComponentProps } from 'react';
import { t } from '#src/texts/t.ts';
import { useFieldControl } from './field.tsx';

export type SelectOption = {
  readonly value: string;
  readonly label: string;
  readonly disabled?: boolean | undefined;
};
type OptionGroup = { readonly label: string; readonly options: readonly SelectOption[] };

export type SelectProps = Omit<ComponentProps<'select'>, 'children' | 'className'> & {
  options: readonly (SelectOption | OptionGroup)[];
  /** The first line, which chooses nothing; `null` leaves it out. */
  emptyLabel?: string | null | undefined;
};

function OptionLine(props: { option: SelectOption }) {
  return (
    <option value={props.option.value} disabled={props.option.disabled}>
      {props.option.label}
    </option>
  );
}

export function Select({ options, emptyLabel = t.ui.choose, ...rest }: SelectProps) {
  const { attributes, isWrong } = useFieldControl(rest);
  return (
    <div className={isWrong ? 'mp-input mp-input-wrong' : 'mp-input'}>
      <select {...rest} {...attributes}>
        {emptyLabel === null ? null : <option value="">{emptyLabel}</option>}
        {options.map((entry) =>
          'options' in entry ? (
            <optgroup key={entry.label} label={entry.label}>
              {entry.options.map((option) => (
                <OptionLine key={option.value} option={option} />
              ))}
            </optgroup>
          ) : (
            <OptionLine key={entry.value} option={entry} />
          ),
        )}
      </select>
      <svg className="mp-input-caret" viewBox="0 0 9 6" aria-hidden="true">
        <path d="M.5.5h8l-4 5z" fill="currentColor" />
      </svg>
    </div>
  );
}
