import { createContext, useContext, useId, type ReactNode } from 'react';
import { t } from '#src/texts/t.ts';
import { Mark } from './mark.tsx';

type FieldWiring = {
  readonly controlId: string;
  readonly labelId: string;
  readonly describedBy: string | undefined;
  readonly isWrong: boolean;
};

const FieldContext = createContext<FieldWiring | null>(null);

/** What a control inside a {@link Field} takes over: its id, its descriptions, its error state. */
export function useFieldControl(own: {
  id?: string | undefined;
  'aria-describedby'?: string | undefined;
}) {
  const wiring = useContext(FieldContext);
  const described = [own['aria-describedby'], wiring?.describedBy].filter((id) => id !== undefined);
  return {
    isWrong: wiring?.isWrong ?? false,
    labelId: wiring?.labelId,
    attributes: {
      id: own.id ?? wiring?.controlId,
      'aria-describedby': described.length > 0 ? described.join(' ') : undefined,
      'aria-invalid': wiring?.isWrong === true ? true : undefined,
    },
  };
}

export type FieldProps = {
  label: ReactNode;
  children: ReactNode;
  help?: ReactNode;
  /** A sentence that names the limit and its source. */
  error?: string | undefined;
  optional?: boolean | undefined;
  /** `group`: the control is a set (Choice, several ticks), named by the label without `for`. */
  as?: 'control' | 'group' | undefined;
  /** `above`: narrow places; the label stands over its control. */
  layout?: 'ledger' | 'above' | undefined;
};

/** One ledger row: label left, control right, one line of help, the error with its stop mark. */
export function Field(props: FieldProps) {
  const base = useId();
  const helpId = props.help === undefined ? undefined : `${base}-help`;
  const errorId = props.error === undefined ? undefined : `${base}-error`;
  const describedBy = [errorId, helpId].filter((id) => id !== undefined).join(' ');
  const wiring: FieldWiring = {
    controlId: `${base}-control`,
    labelId: `${base}-label`,
    describedBy: describedBy === '' ? undefined : describedBy,
    isWrong: props.error !== undefined,
  };
  const words = (
    <>
      {props.label}
      {props.optional ? <span className="mp-note"> {t.ui.optional}</span> : null}
    </>
  );
  return (
    <div className={props.layout === 'above' ? 'mp-field mp-field-above' : 'mp-field'}>
      {props.as === 'group' ? (
        <span className="mp-field-label" id={wiring.labelId}>
          {words}
        </span>
      ) : (
        <label className="mp-field-label" id={wiring.labelId} htmlFor={wiring.controlId}>
          {words}
        </label>
      )}
      <div className="min-w-0">
        <FieldContext value={wiring}>{props.children}</FieldContext>
        {props.error === undefined ? null : (
          <p className="mp-error" id={errorId}>
            <Mark name="stop" tone="brick" />
            <span>{props.error}</span>
          </p>
        )}
        {props.help === undefined ? null : (
          <p className="mp-help" id={helpId}>
            {props.help}
          </p>
        )}
      </div>
    </div>
  );
}
