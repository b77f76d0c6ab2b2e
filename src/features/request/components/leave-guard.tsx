import { useEffect } from 'react';
import { useBlocker } from 'react-router-dom';
import { Dialog } from '#src/components/ui/dialog.tsx';
import { t } from '#src/texts/t.ts';

const words = t.request;

/** Asks before a page with unsaved entries is left, by a link or by closing the window. */
export function LeaveGuard(props: { mayLeave: () => boolean }) {
  const { mayLeave } = props;
  const blocker = useBlocker(
    ({ currentLocation, nextLocation }) =>
      currentLocation.pathname !== nextLocation.pathname && !mayLeave(),
  );
  useEffect(() => {
    const ask = (event: BeforeUnloadEvent) => {
      if (!mayLeave()) {
        event.preventDefault();
      }
    };
    window.addEventListener('beforeunload', ask);
    return () => {
      window.removeEventListener('beforeunload', ask);
    };
  }, [mayLeave]);
  return (
    <Dialog
      isOpen={blocker.state === 'blocked'}
      title={words.leaveTitle}
      confirmLabel={words.leave}
      cancelLabel={words.stay}
      kind="danger"
      onConfirm={() => {
        blocker.proceed?.();
      }}
      onClose={() => {
        blocker.reset?.();
      }}
    >
      <p>{words.leaveAsk}</p>
    </Dialog>
  );
}
