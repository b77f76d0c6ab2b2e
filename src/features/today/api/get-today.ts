import { queryOptions } from '@tanstack/react-query';
import { getToday } from '#shared/contracts/board.contract.ts';
import { apiKey, callApi } from '#src/lib/call-api.ts';

export function todayQuery(site: string) {
  const params = { site };
  return queryOptions({
    queryKey: apiKey(getToday, { params }),
    queryFn: ({ signal }) => callApi(getToday, { params, signal }),
    refetchInterval: 120_000,
  });
}
