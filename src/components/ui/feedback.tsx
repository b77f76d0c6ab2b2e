import type { ReactNode } from 'react';
import { t } from '#src/texts/t.ts';
import { Button } from './button.tsx';
import { Notice } from './notice.tsx';

export function Loading(props: { what?: string | undefined }) {
  return (
    <p className="mp-empty" role="status">
      {props.what === undefined ? t.ui.loading : t.ui.loadingWhat(props.what)}
    </p>
  );
}

/** What is not there, and what to do about it. */
export function EmptyState(props: { children?: ReactNode; action?: ReactNode }) {
  return (
    <div className="mp-empty">
      <p>{props.children ?? t.ui.nothing}</p>
      {props.action === undefined ? null : <div className="mp-acts mt-2">{props.action}</div>}
    </div>
  );
}

/** A failure in words: what happened, the request number for the log, the way on. */
export function ErrorState(props: {
  title?: string | undefined;
  detail: string;
  requestId?: string | undefined;
  onRetry?: (() => void) | undefined;
}) {
  return (
    <Notice
      kind="stop"
      role="alert"
      title={props.title ?? t.ui.failedTitle}
      ways={
        props.onRetry === undefined ? undefined : (
          <Button size="small" onClick={props.onRetry}>
            {t.ui.retry}
          </Button>
        )
      }
    >
      {props.detail}
      {props.requestId === undefined ? null : (
        <span className="mp-note block">
          {t.ui.requestId} <span className="font-mono break-all">{props.requestId}</span>
        </span>
      )}
    </Notice>
  );
}
