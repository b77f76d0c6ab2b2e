import { queryOptions } from '@tanstack/react-query';
import { getWaterline } from '#shared/contracts/board.contract.ts';
import { findOffers } from '#shared/contracts/offers.contract.ts';
import {
  getEstimateBasis,
  listCells,
  listCellTypes,
  listDeviations,
  listProjects,
} from '#shared/contracts/registers.contract.ts';
import { getRequest } from '#shared/contracts/requests.contract.ts';
import { apiKey, callApi } from '#src/lib/call-api.ts';
import { lifetimeMs } from '../offers.view.ts';

const registerLifeMs = 300_000;

export function requestQuery(site: string, id: number) {
  const params = { site, id };
  return queryOptions({
    queryKey: apiKey(getRequest, { params }),
    queryFn: ({ signal }) => callApi(getRequest, { params, signal }),
  });
}

export function cellTypesQuery(site: string) {
  const params = { site };
  return queryOptions({
    queryKey: apiKey(listCellTypes, { params }),
    queryFn: ({ signal }) => callApi(listCellTypes, { params, signal }),
    staleTime: registerLifeMs,
  });
}

export function projectsQuery(site: string) {
  const params = { site };
  return queryOptions({
    queryKey: apiKey(listProjects, { params }),
    queryFn: ({ signal }) => callApi(listProjects, { params, signal }),
    staleTime: registerLifeMs,
  });
}

export function basisQuery(site: string) {
  const params = { site };
  return queryOptions({
    queryKey: apiKey(getEstimateBasis, { params }),
    queryFn: ({ signal }) => callApi(getEstimateBasis, { params, signal }),
    staleTime: registerLifeMs,
  });
}

export const cellsShown = 40;

export function freeCellsQuery(
  site: string,
  wish: {
    readonly cellTypeId: number | null;
    readonly projectId: number | null;
    readonly text: string;
  },
) {
  const { cellTypeId, projectId, text } = wish;
  const input = {
    params: { site },
    query: {
      isFree: 'true' as const,
      limit: cellsShown,
      ...(cellTypeId === null ? {} : { cellTypeId }),
      ...(projectId === null ? {} : { projectId }),
      ...(text === '' ? {} : { text }),
    },
  };
  return queryOptions({
    queryKey: apiKey(listCells, input),
    queryFn: ({ signal }) => callApi(listCells, { ...input, signal }),
    enabled: cellTypeId !== null,
  });
}

export function offersQuery(site: string, id: number, lotId: number) {
  const input = { params: { site, id, lotId } };
  return queryOptions({
    queryKey: apiKey(findOffers, input),
    queryFn: ({ signal }) => callApi(findOffers, { ...input, signal }),
    staleTime: 60_000,
    // Offers run out; while somebody looks at them they are searched again in time.
    refetchInterval: ({ state }) => (state.data === undefined ? false : lifetimeMs(state.data)),
  });
}

export function deviationsQuery(site: string, id: number) {
  const params = { site, id };
  return queryOptions({
    queryKey: apiKey(listDeviations, { params }),
    queryFn: ({ signal }) => callApi(listDeviations, { params, signal }),
  });
}

export function chambersQuery(site: string) {
  const params = { site };
  return queryOptions({
    queryKey: apiKey(getWaterline, { params }),
    queryFn: ({ signal }) => callApi(getWaterline, { params, signal }),
    staleTime: registerLifeMs,
  });
}
