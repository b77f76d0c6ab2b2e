import { z } from 'zod';
import { instant, recordNumber } from '#shared/contracts/common.ts';
import type {
  LotDto,
  RequestDto,
  RequestRow as RequestListRow,
} from '#shared/contracts/requests.contract.ts';
import type { CellOfLot, ListedRequest, LotWithType, WholeRequest } from './requests.repository.ts';

/** What a request keeps of the slot its engineer would like. */
export const proposedOfferSchema = z.looseObject({
  lotId: recordNumber,
  startAt: instant,
  endAt: instant,
  chamberTag: z.string(),
});

const defaultBadToGoodRatio = 3;
const defaultTolerance = { kind: 'relative' as const, fraction: 0.1 };

export function presentRequest(input: {
  readonly whole: WholeRequest;
  readonly siteCode: string;
  readonly lots: readonly LotWithType[];
  readonly cells: readonly CellOfLot[];
  readonly bookings: readonly { readonly lotId: number; readonly id: number }[];
}): RequestDto {
  const { request, requesterName, projectName } = input.whole;
  return {
    id: request.id,
    site: input.siteCode,
    state: request.state,
    requester: { id: request.requesterId, name: requesterName },
    project:
      request.projectId === null || projectName === null
        ? null
        : { id: request.projectId, name: projectName },
    kind: request.kind,
    grade: request.grade,
    setTemperatureC: request.setTempMdegc === null ? null : request.setTempMdegc / 1000,
    setToleranceK: request.setToleranceMk / 1000,
    tolerance: toleranceOf(request),
    badToGoodRatio: request.badToGoodRatio ?? defaultBadToGoodRatio,
    earliestStartAt: request.earliestStartAt?.toISOString() ?? null,
    neededByAt: request.neededByAt?.toISOString() ?? null,
    maySplit: request.maySplit,
    note: request.note ?? '',
    lots: input.lots.map((lot) => presentLot(lot, input)),
    priority: request.priority,
    declineReason: request.declineReason,
    withdrawReason: request.withdrawReason,
    proposal: proposalOf(request),
    createdAt: request.createdAt.toISOString(),
    submittedAt: request.submittedAt?.toISOString() ?? null,
    version: request.version,
  };
}

function toleranceOf(request: WholeRequest['request']): RequestDto['tolerance'] {
  if (request.toleranceKind === 'absolute' && request.toleranceCurrentA !== null) {
    return { kind: 'absolute', currentA: request.toleranceCurrentA };
  }
  return request.toleranceFraction === null
    ? defaultTolerance
    : { kind: 'relative', fraction: request.toleranceFraction };
}

function presentLot(
  { lot, cellTypeName }: LotWithType,
  of: Pick<Parameters<typeof presentRequest>[0], 'cells' | 'bookings'>,
): LotDto {
  const cells = of.cells.filter(({ lotId }) => lotId === lot.id);
  const isAnnounced = cells.every(({ status }) => status === 'announced');
  return {
    id: lot.id,
    cellTypeId: lot.cellTypeId,
    cellIds: isAnnounced ? [] : cells.map(({ id }) => id),
    cellCount: lot.cellCount,
    stateOfChargePct: lot.stateOfChargePct,
    restedSinceAt: lot.restedSinceAt?.toISOString() ?? null,
    storageTemperatureC: lot.storageTemperatureC,
    isDamaged: lot.isDamaged,
    cellTypeName,
    cells: cells.map(({ id, serial }) => ({ id, serial })),
    bookingId: of.bookings.find(({ lotId }) => lotId === lot.id)?.id ?? null,
  };
}

function proposalOf(request: WholeRequest['request']): RequestDto['proposal'] {
  if (request.proposedOffer === null || request.proposedAt === null) {
    return null;
  }
  const { lotId, startAt, endAt, chamberTag } = proposedOfferSchema.parse(request.proposedOffer);
  return { lotId, startAt, endAt, chamberTag, proposedAt: request.proposedAt.toISOString() };
}

export function presentRequestRow(row: ListedRequest): RequestListRow {
  const { request } = row;
  return {
    id: request.id,
    state: request.state,
    requester: { id: request.requesterId, name: row.requesterName },
    projectName: row.projectName,
    kind: request.kind,
    grade: request.grade,
    cellTypeNames: row.cellTypeNames,
    cellCount: row.cellCount,
    setTemperatureC: request.setTempMdegc === null ? null : request.setTempMdegc / 1000,
    neededByAt: request.neededByAt?.toISOString() ?? null,
    submittedAt: request.submittedAt?.toISOString() ?? null,
    updatedAt: request.updatedAt.toISOString(),
    priority: request.priority,
    hasProposal: request.proposedOffer !== null,
    bookingIds: row.bookingIds,
  };
}
