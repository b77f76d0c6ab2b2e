import { useMutation, useQuery } from '@tanstack/react-query';
import { Suspense } from 'react';
import { Navigate, Outlet, useLocation, useParams } from 'react-router-dom';
import { Page } from '#src/components/layout/page.tsx';
import { ErrorState, Loading } from '#src/components/ui/feedback.tsx';
import { LinkButton } from '#src/components/ui/button.tsx';
import { Notice } from '#src/components/ui/notice.tsx';
import { sessionQuery } from '#src/features/session/api/get-session.ts';
import { signOut } from '#src/features/session/api/sign-out.ts';
import { SiteShell } from '#src/features/shell/components/site-shell.tsx';
import { tableError } from '#src/lib/table-error.ts';
import { t } from '#src/texts/t.ts';

function NoSite() {
  return (
    <main id="main">
      <Page title={t.shell.noSiteTitle} intro={<p>{t.shell.noSite}</p>} />
    </main>
  );
}

export function NotFoundPage() {
  return (
    <Page
      title={t.shell.notFoundTitle}
      intro={<p>{t.shell.notFound}</p>}
      actions={<LinkButton to="/">{t.shell.toToday}</LinkButton>}
    />
  );
}

/** Everything below a site: needs a session, a site the person may see, and frames the page. */
export function Component() {
  const session = useQuery(sessionQuery);
  const { site } = useParams();
  const location = useLocation();
  const leave = useMutation({ mutationFn: signOut });
  const failure = tableError(session);
  if (session.data === undefined) {
    return (
      <main id="main" className="mp-page">
        {failure === undefined ? <Loading what={t.shell.wait} /> : <ErrorState {...failure} />}
      </main>
    );
  }
  if (session.data.person === null) {
    const here = location.pathname + location.search;
    return <Navigate replace to={`/sign-in?return=${encodeURIComponent(here)}`} />;
  }
  const [first] = session.data.sites;
  if (first === undefined) {
    return <NoSite />;
  }
  if (site === undefined) {
    return <Navigate replace to={`/${first.code}`} />;
  }
  if (!session.data.sites.some((entry) => entry.code === site)) {
    return (
      <main id="main">
        <NotFoundPage />
      </main>
    );
  }
  return (
    <SiteShell
      key={site}
      session={session.data}
      siteCode={site}
      onSignOut={() => {
        leave.mutate();
      }}
    >
      {leave.isError ? (
        <Notice kind="stop" role="alert">
          {t.shell.signOutFailed}
        </Notice>
      ) : null}
      <Suspense fallback={<Loading what={t.shell.wait} />}>
        <Outlet />
      </Suspense>
    </SiteShell>
  );
}
