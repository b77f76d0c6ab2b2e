import type { ReactNode } from 'react';

/** More of the same, opened in place. */
export function Disclosure(props: {
  summary: ReactNode;
  children: ReactNode;
  open?: boolean | undefined;
}) {
  return (
    <details className="mp-details" open={props.open}>
      <summary>{props.summary}</summary>
      {props.children}
    </details>
  );
}
