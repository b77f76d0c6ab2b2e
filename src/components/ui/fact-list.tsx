import type { CSSProperties, ReactNode } from 'react';

export type Fact = { readonly name: string; readonly value: ReactNode };
type ColumnStyle = CSSProperties & { '--mp-columns': number };

/** Short columns of `name value`; four on a wide sheet, one on the phone. */
export function FactList(props: { facts: readonly Fact[]; columns?: 2 | 3 | 4 | undefined }) {
  const style: ColumnStyle = { '--mp-columns': props.columns ?? 4 };
  return (
    <dl className="mp-facts" style={style}>
      {props.facts.map((fact) => (
        <div key={fact.name}>
          <dt>{fact.name}</dt>
          <dd>{fact.value}</dd>
        </div>
      ))}
    </dl>
  );
}
