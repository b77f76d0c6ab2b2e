import { useEffect, useId, useRef, type ReactNode } from 'react';
import { t } from '#src/texts/t.ts';
import { Button } from './button.tsx';
import { Notice } from './notice.tsx';

/**
 * Asks before an act that cannot be taken back. The native dialog keeps the focus inside, gives it
 * back on closing, and closes on Escape.
 */
export function Dialog(props: {
  isOpen: boolean;
  title: string;
  children?: ReactNode;
  /** The verb with its object: `Cancel booking 2418`. */
  confirmLabel: string;
  kind?: 'primary' | 'danger' | undefined;
  onConfirm: () => void;
  onClose: () => void;
  cancelLabel?: string | undefined;
  busy?: boolean | undefined;
  why?: string | undefined;
  error?: string | undefined;
}) {
  const ref = useRef<HTMLDialogElement>(null);
  const titleId = useId();
  const { isOpen } = props;
  useEffect(() => {
    const dialog = ref.current;
    if (dialog === null || dialog.open === isOpen) {
      return;
    }
    if (isOpen) {
      dialog.showModal();
    } else {
      dialog.close();
    }
  }, [isOpen]);
  return (
    <dialog
      ref={ref}
      className="mp-dialog"
      aria-labelledby={titleId}
      onClose={() => {
        if (isOpen) {
          props.onClose();
        }
      }}
    >
      <h2 id={titleId}>{props.title}</h2>
      <div className="mp-dialog-body">{props.children}</div>
      {props.error === undefined ? null : (
        <Notice kind="stop" role="alert">
          {props.error}
        </Notice>
      )}
      <div className="mp-acts">
        <Button onClick={props.onClose}>{props.cancelLabel ?? t.ui.cancel}</Button>
        <Button
          kind={props.kind ?? 'danger'}
          onClick={props.onConfirm}
          busy={props.busy}
          why={props.why}
        >
          {props.confirmLabel}
        </Button>
      </div>
    </dialog>
  );
}
