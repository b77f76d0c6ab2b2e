import { Button } from '#src/components/ui/button.tsx';
import { Notice } from '#src/components/ui/notice.tsx';
import { t } from '#src/texts/t.ts';
import type { DraftState } from '../use-request-draft.ts';

const words = t.request;

/** Where the entries in the form come from, when that is not plain. */
export function FormNotices(props: { state: DraftState }) {
  const { state } = props;
  if (state.isTouched && state.isBehind) {
    return (
      <Notice
        kind="caution"
        role="alert"
        title={words.behindTitle}
        ways={
          <>
            <Button size="small" onClick={state.keepMine}>
              {words.keepMine}
            </Button>
            <Button size="small" onClick={state.startAfresh}>
              {words.takeSaved}
            </Button>
          </>
        }
      >
        {words.behind}
      </Notice>
    );
  }
  return state.wasRestored && state.isTouched ? (
    <Notice
      kind="info"
      role="status"
      ways={
        <Button kind="link" onClick={state.startAfresh}>
          {words.discard}
        </Button>
      }
    >
      {words.restored}
    </Notice>
  ) : null;
}
