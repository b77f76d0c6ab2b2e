import { queryOptions } from '@tanstack/react-query';
import { searchSite } from '#shared/contracts/board.contract.ts';
import { apiKey, callApi } from '#src/lib/call-api.ts';

export function searchQuery(site: string, text: string) {
  const input = { params: { site }, query: { text } };
  return queryOptions({
    queryKey: apiKey(searchSite, input),
    queryFn: ({ signal }) => callApi(searchSite, { ...input, signal }),
    enabled: text !== '',
  });
}
