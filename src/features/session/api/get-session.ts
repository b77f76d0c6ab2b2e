import { queryOptions } from '@tanstack/react-query';
import { getSession } from '#shared/contracts/session.contract.ts';
import { apiKey, callApi, setCsrfToken } from '#src/lib/call-api.ts';

/** Who is signed in. Roles can change at any time, so it is read again whenever the page returns. */
export const sessionQuery = queryOptions({
  queryKey: apiKey(getSession),
  queryFn: async ({ signal }) => {
    const session = await callApi(getSession, { signal });
    setCsrfToken(session.csrfToken ?? '');
    return session;
  },
  staleTime: 60_000,
  refetchOnWindowFocus: true,
});
