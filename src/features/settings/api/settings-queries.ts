import { infiniteQueryOptions, queryOptions } from '@tanstack/react-query';
import type { z } from 'zod';
import { listAuditEvents } from '#shared/contracts/audit.contract.ts';
import { listPeople } from '#shared/contracts/people.contract.ts';
import { getWorkingHours, listPolicies } from '#shared/contracts/settings.contract.ts';
import { apiKey, callApi } from '#src/lib/call-api.ts';

export function policiesQuery(site: string) {
  const params = { site };
  return queryOptions({
    queryKey: apiKey(listPolicies, { params }),
    queryFn: ({ signal }) => callApi(listPolicies, { params, signal }),
  });
}

export function workingHoursQuery(site: string) {
  const params = { site };
  return queryOptions({
    queryKey: apiKey(getWorkingHours, { params }),
    queryFn: ({ signal }) => callApi(getWorkingHours, { params, signal }),
  });
}

export function peopleQuery(text: string) {
  const query = text === '' ? {} : { text };
  return infiniteQueryOptions({
    queryKey: apiKey(listPeople, { query }),
    queryFn: ({ signal, pageParam }) =>
      callApi(listPeople, {
        query: pageParam === null ? query : { ...query, cursor: pageParam },
        signal,
      }),
    initialPageParam: startOfList(),
    getNextPageParam: (page) => page.nextCursor,
  });
}

export function trailQuery(
  site: string,
  query: Omit<z.input<typeof listAuditEvents.query>, 'cursor'>,
) {
  const params = { site };
  return infiniteQueryOptions({
    queryKey: apiKey(listAuditEvents, { params, query }),
    queryFn: ({ signal, pageParam }) =>
      callApi(listAuditEvents, {
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
