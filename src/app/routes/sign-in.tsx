import { useQuery } from '@tanstack/react-query';
import { Navigate, useSearchParams } from 'react-router-dom';
import { ErrorState, Loading } from '#src/components/ui/feedback.tsx';
import { sessionQuery } from '#src/features/session/api/get-session.ts';
import { SignInPage } from '#src/features/session/components/sign-in-page.tsx';
import { tableError } from '#src/lib/table-error.ts';
import { t } from '#src/texts/t.ts';

function signInHref(returnTo: string, person?: string): string {
  const search = new URLSearchParams({ return: returnTo });
  if (person !== undefined) {
    search.set('as', person);
  }
  return `/auth/sign-in?${search.toString()}`;
}

export function Component() {
  const [params] = useSearchParams();
  const session = useQuery(sessionQuery);
  const returnTo = params.get('return') ?? '/';
  const failure = tableError(session);
  if (session.data === undefined) {
    return (
      <main id="main" className="mp-page">
        {failure === undefined ? <Loading what={t.shell.wait} /> : <ErrorState {...failure} />}
      </main>
    );
  }
  if (session.data.person !== null) {
    return <Navigate replace to={returnTo} />;
  }
  const { demo, organisation } = session.data;
  return (
    <SignInPage
      organisation={organisation}
      signInHref={signInHref(returnTo)}
      helpHref="/help"
      isStandIn={demo !== null}
      people={(demo?.people ?? []).map((person) => ({
        role: person.site === null ? person.role : `${person.role}, ${person.site}`,
        name: person.name,
        does: person.note ?? '',
        href: signInHref(returnTo, person.sub),
      }))}
    />
  );
}
