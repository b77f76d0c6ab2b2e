import type { ReactNode } from 'react';
import { t } from '#src/texts/t.ts';
import { Button } from './button.tsx';

/** The row over a list; each value lives in the URL through `useUrlState`. */
export function Filters(props: {
  children: ReactNode;
  onClear?: (() => void) | undefined;
  /** Said at the end: how many there are. */
  count?: ReactNode;
}) {
  return (
    <div className="mp-filters" role="search" aria-label={t.ui.filters}>
      {props.children}
      {props.onClear === undefined ? null : (
        <Button kind="link" onClick={props.onClear}>
          {t.ui.clearFilters}
        </Button>
      )}
      {props.count === undefined ? null : <span className="mp-note">{props.count}</span>}
    </div>
  );
}
