import { infiniteQueryOptions, queryOptions } from '@tanstack/react-query';
import type { z } from 'zod';
import { getBooking, getLoad, listBookings } from '#shared/contracts/bookings.contract.ts';
import { apiKey, callApi } from '#src/lib/call-api.ts';

type Query = Omit<z.input<typeof listBookings.query>, 'cursor'>;

export function bookingsQuery(site: string, query: Query) {
  const params = { site };
  return infiniteQueryOptions({
    queryKey: apiKey(listBookings, { params, query }),
    queryFn: ({ signal, pageParam }) =>
      callApi(listBookings, {
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

export function bookingQuery(site: string, id: number) {
  const params = { site, id };
  return queryOptions({
    queryKey: apiKey(getBooking, { params }),
    queryFn: ({ signal }) => callApi(getBooking, { params, signal }),
  });
}

export function loadQuery(site: string, id: number) {
  const params = { site, id };
  return queryOptions({
    queryKey: apiKey(getLoad, { params }),
    queryFn: ({ signal }) => callApi(getLoad, { params, signal }),
  });
}
