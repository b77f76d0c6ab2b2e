import { useRouteError } from 'react-router-dom';
import { Page } from '#src/components/layout/page.tsx';
import { Button } from '#src/components/ui/button.tsx';
import { isProblem } from '#src/lib/problem.ts';
import { t } from '#src/texts/t.ts';

/** The page of last resort: one screen failed, the others still work. */
export function FailedPage() {
  const error = useRouteError();
  return (
    <Page
      title={t.shell.failedTitle}
      intro={<p role="alert">{isProblem(error) ? error.document.detail : t.shell.failed}</p>}
      actions={
        <Button
          onClick={() => {
            window.location.reload();
          }}
        >
          {t.shell.reload}
        </Button>
      }
    />
  );
}
