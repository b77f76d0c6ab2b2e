import type { ReactNode } from 'react';

/** The name of a key. */
export function Kbd(props: { children: ReactNode }) {
  return <kbd className="mp-kbd">{props.children}</kbd>;
}
