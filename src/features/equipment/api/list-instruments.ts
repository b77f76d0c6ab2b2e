import { infiniteQueryOptions } from '@tanstack/react-query';
import type { z } from 'zod';
import { listInstruments } from '#shared/contracts/equipment.contract.ts';
import { apiKey, callApi } from '#src/lib/call-api.ts';

type Query = Omit<z.input<typeof listInstruments.query>, 'cursor'>;

export function instrumentsQuery(site: string, query: Query) {
  const params = { site };
  return infiniteQueryOptions({
    queryKey: apiKey(listInstruments, { params, query }),
    queryFn: ({ signal, pageParam }) =>
      callApi(listInstruments, {
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
