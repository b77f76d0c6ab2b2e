import type { ComponentProps, ReactNode } from 'react';
import { useFieldControl } from './field.tsx';

/** A tick box with its words; several of them are any-of-few. */
export function Tick({
  children,
  ...rest
}: Omit<ComponentProps<'input'>, 'type' | 'className' | 'children'> & { children: ReactNode }) {
  const { attributes } = useFieldControl(rest);
  return (
    <label className="mp-tick">
      <input
        {...rest}
        type="checkbox"
        aria-describedby={attributes['aria-describedby']}
        aria-invalid={attributes['aria-invalid']}
      />
      <span>{children}</span>
    </label>
  );
}
