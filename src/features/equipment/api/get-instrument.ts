import { keepPreviousData, queryOptions } from '@tanstack/react-query';
import { getInstrument, getInstrumentWeek } from '#shared/contracts/equipment.contract.ts';
import { apiKey, callApi } from '#src/lib/call-api.ts';

export function instrumentQuery(site: string, tag: string) {
  const params = { site, tag };
  return queryOptions({
    queryKey: apiKey(getInstrument, { params }),
    queryFn: ({ signal }) => callApi(getInstrument, { params, signal }),
  });
}

export function instrumentWeekQuery(site: string, tag: string, from: string, to: string) {
  const input = { params: { site, tag }, query: { from, to } };
  return queryOptions({
    queryKey: apiKey(getInstrumentWeek, input),
    queryFn: ({ signal }) => callApi(getInstrumentWeek, { ...input, signal }),
    placeholderData: keepPreviousData,
  });
}
