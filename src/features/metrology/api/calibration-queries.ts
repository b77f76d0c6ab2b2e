import { infiniteQueryOptions, queryOptions } from '@tanstack/react-query';
import type { z } from 'zod';
import {
  getCalibration,
  listCalibrations,
  listDuties,
} from '#shared/contracts/calibrations.contract.ts';
import { getInstrument } from '#shared/contracts/equipment.contract.ts';
import { apiKey, callApi } from '#src/lib/call-api.ts';

type Paged<C extends { query: z.ZodType }> = Omit<z.input<C['query']>, 'cursor'>;

export function dutiesQuery(site: string, query: Paged<typeof listDuties>) {
  const params = { site };
  return infiniteQueryOptions({
    queryKey: apiKey(listDuties, { params, query }),
    queryFn: ({ signal, pageParam }) =>
      callApi(listDuties, { params, query: withCursor(query, pageParam), signal }),
    initialPageParam: startOfList(),
    getNextPageParam: (page) => page.nextCursor,
  });
}

export function calibrationsQuery(site: string, query: Paged<typeof listCalibrations>) {
  const params = { site };
  return infiniteQueryOptions({
    queryKey: apiKey(listCalibrations, { params, query }),
    queryFn: ({ signal, pageParam }) =>
      callApi(listCalibrations, { params, query: withCursor(query, pageParam), signal }),
    initialPageParam: startOfList(),
    getNextPageParam: (page) => page.nextCursor,
  });
}

export function calibrationQuery(site: string, id: number) {
  const params = { site, id };
  return queryOptions({
    queryKey: apiKey(getCalibration, { params }),
    queryFn: ({ signal }) => callApi(getCalibration, { params, signal }),
  });
}

export function instrumentQuery(site: string, tag: string) {
  const params = { site, tag };
  return queryOptions({
    queryKey: apiKey(getInstrument, { params }),
    queryFn: ({ signal }) => callApi(getInstrument, { params, signal }),
    enabled: /^[A-Z]\d{2,3}$/.test(tag),
  });
}

/** The duty of one instrument, for its interval. */
export function dutyOfQuery(site: string, tag: string) {
  const input = { params: { site }, query: { text: tag, limit: 20 } };
  return queryOptions({
    queryKey: apiKey(listDuties, input),
    queryFn: ({ signal }) => callApi(listDuties, { ...input, signal }),
    enabled: /^[A-Z]\d{2,3}$/.test(tag),
  });
}

function startOfList(): string | null {
  return null;
}

function withCursor<Query extends object>(query: Query, cursor: string | null) {
  return cursor === null ? query : { ...query, cursor };
}
