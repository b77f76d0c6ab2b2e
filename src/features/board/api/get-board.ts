import { keepPreviousData, queryOptions } from '@tanstack/react-query';
import type { z } from 'zod';
import { getBoard } from '#shared/contracts/board.contract.ts';
import { apiKey, callApi } from '#src/lib/call-api.ts';

export type BoardQuery = z.input<typeof getBoard.query>;

/** One window of the board; the last one stays on the screen while the next is fetched. */
export function boardQuery(site: string, query: BoardQuery) {
  const input = { params: { site }, query };
  return queryOptions({
    queryKey: apiKey(getBoard, input),
    queryFn: ({ signal }) => callApi(getBoard, { ...input, signal }),
    placeholderData: keepPreviousData,
    refetchInterval: 60_000,
  });
}
