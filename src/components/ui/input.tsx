import { useId, type ComponentProps, type ReactNode } from 'react';
import { useFieldControl } from './field.tsx';

function Frame(props: {
  isWrong: boolean;
  isFigure?: boolean | undefined;
  unit?: ReactNode;
  children: ReactNode;
}) {
  const names = ['mp-input'];
  if (props.isWrong) {
    names.push('mp-input-wrong');
  }
  if (props.isFigure) {
    names.push('mp-input-figure');
  }
  return (
    <div className={names.join(' ')}>
      {props.children}
      {props.unit === undefined ? null : <span className="mp-input-unit">{props.unit}</span>}
    </div>
  );
}

type InputProps = Omit<ComponentProps<'input'>, 'type' | 'className'> & {
  unit?: ReactNode;
};

export function TextInput({
  unit,
  type = 'text',
  suggestions,
  ...rest
}: InputProps & {
  type?: 'text' | 'email' | 'search' | 'tel' | 'url' | 'password' | undefined;
  /** Offered while typing; other text is accepted all the same. */
  suggestions?: readonly string[] | undefined;
}) {
  const { attributes, isWrong } = useFieldControl(rest);
  const listId = useId();
  return (
    <Frame isWrong={isWrong} unit={unit}>
      <input
        {...rest}
        {...attributes}
        type={type}
        list={suggestions === undefined ? rest.list : listId}
      />
      {suggestions === undefined ? null : (
        <datalist id={listId}>
          {suggestions.map((suggestion) => (
            <option key={suggestion} value={suggestion} />
          ))}
        </datalist>
      )}
    </Frame>
  );
}

/** Keeps what was typed, with comma or point; `parseFigure` reads it where the form is checked. */
export function NumberInput({ unit, ...rest }: InputProps) {
  const { attributes, isWrong } = useFieldControl(rest);
  return (
    <Frame isWrong={isWrong} isFigure unit={unit}>
      <input {...rest} {...attributes} type="text" inputMode="decimal" autoComplete="off" />
    </Frame>
  );
}

/** A calendar day, `YYYY-MM-DD`. */
export function DateInput(props: Omit<InputProps, 'unit'>) {
  const { attributes, isWrong } = useFieldControl(props);
  return (
    <Frame isWrong={isWrong} isFigure>
      <input {...props} {...attributes} type="date" />
    </Frame>
  );
}

/** Wall time at the site; `fromSiteInput` and `toSiteInput` convert. The zone stands as its unit. */
export function DateTimeInput({ unit, ...rest }: InputProps) {
  const { attributes, isWrong } = useFieldControl(rest);
  return (
    <Frame isWrong={isWrong} isFigure unit={unit}>
      <input {...rest} {...attributes} type="datetime-local" />
    </Frame>
  );
}

export function TextArea(props: Omit<ComponentProps<'textarea'>, 'className'>) {
  const { attributes, isWrong } = useFieldControl(props);
  return (
    <Frame isWrong={isWrong}>
      <textarea rows={3} {...props} {...attributes} />
    </Frame>
  );
}
