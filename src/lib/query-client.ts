import { QueryCache, QueryClient } from '@tanstack/react-query';
import { isProblem } from './problem.ts';

/** A session that ended while the page was open: back to the sign-in page, and to this page after. */
function onSignedOut(): void {
  const here = window.location.pathname + window.location.search;
  if (window.location.pathname !== '/sign-in') {
    window.location.assign(`/sign-in?return=${encodeURIComponent(here)}`);
  }
}

export function createQueryClient(): QueryClient {
  return new QueryClient({
    queryCache: new QueryCache({
      onError: (error) => {
        if (isProblem(error, 'session.missing')) {
          onSignedOut();
        }
      },
    }),
    defaultOptions: {
      queries: {
        staleTime: 15_000,
        retry: (count, error) => isProblem(error, 'service.unavailable') && count < 2,
      },
      mutations: { retry: false },
    },
  });
}
