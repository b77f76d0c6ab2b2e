import { infiniteQueryOptions, queryOptions } from '@tanstack/react-query';
import type { z } from 'zod';
import { listProjects } from '#shared/contracts/registers.contract.ts';
import { getRequest, listRequests } from '#shared/contracts/requests.contract.ts';
import { apiKey, callApi } from '#src/lib/call-api.ts';

type Query = Omit<z.input<typeof listRequests.query>, 'cursor'>;

export function requestsQuery(site: string, query: Query) {
  const params = { site };
  return infiniteQueryOptions({
    queryKey: apiKey(listRequests, { params, query }),
    queryFn: ({ signal, pageParam }) =>
      callApi(listRequests, {
        params,
        query: pageParam === null ? query : { ...query, cursor: pageParam },
        signal,
      }),
    initialPageParam: startOfList(),
    getNextPageParam: (page) => page.nextCursor,
  });
}

function startOfList(): string | null {
  return null;
}

export function requestQuery(site: string, id: number) {
  const params = { site, id };
  return queryOptions({
    queryKey: apiKey(getRequest, { params }),
    queryFn: ({ signal }) => callApi(getRequest, { params, signal }),
  });
}

export function projectsQuery(site: string) {
  const params = { site };
  return queryOptions({
    queryKey: apiKey(listProjects, { params }),
    queryFn: ({ signal }) => callApi(listProjects, { params, signal }),
    staleTime: 300_000,
  });
}
