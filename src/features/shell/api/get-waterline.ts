import { queryOptions } from '@tanstack/react-query';
import { getWaterline } from '#shared/contracts/board.contract.ts';
import { apiKey, callApi } from '#src/lib/call-api.ts';

export function waterlineQuery(site: string) {
  const params = { site };
  return queryOptions({
    queryKey: apiKey(getWaterline, { params }),
    queryFn: ({ signal }) => callApi(getWaterline, { params, signal }),
    refetchInterval: 60_000,
  });
}
