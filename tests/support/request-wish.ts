import type { LotFields, RequestDto, RequestFields } from '#shared/contracts/requests.contract.ts';

/** A lot of which nothing is said yet. */
export const emptyLot: LotFields = {
  cellTypeId: null,
  cellIds: [],
  cellCount: null,
  stateOfChargePct: null,
  restedSinceAt: null,
  storageTemperatureC: null,
  isDamaged: false,
};

/** The form of a request as somebody has just opened it. */
export const emptyForm: RequestFields = {
  projectId: null,
  kind: 'settled',
  grade: 'reported',
  lots: [emptyLot],
  setTemperatureC: null,
  setToleranceK: 0.5,
  tolerance: { kind: 'relative', fraction: 0.1 },
  badToGoodRatio: 3,
  earliestStartAt: null,
  neededByAt: null,
  maySplit: false,
  note: '',
};

/** A form that can be submitted: four cells asked by type and number, at 25 °C. */
export function wholeForm(
  of: { readonly projectId: number; readonly cellTypeId: number },
  change: Partial<RequestFields> = {},
): RequestFields {
  return {
    ...emptyForm,
    projectId: of.projectId,
    setTemperatureC: 25,
    lots: [{ ...emptyLot, cellTypeId: of.cellTypeId, cellCount: 4 }],
    ...change,
  };
}

/** What a form sends of a request that was read: its fields and the version they belong to. */
export function editOf(
  request: RequestDto,
  change: Partial<RequestFields> = {},
): RequestFields & { readonly version: number } {
  return {
    projectId: request.project?.id ?? null,
    kind: request.kind,
    grade: request.grade,
    lots: request.lots.map(
      ({
        cellTypeId,
        cellIds,
        cellCount,
        stateOfChargePct,
        restedSinceAt,
        storageTemperatureC,
        isDamaged,
      }) => ({
        cellTypeId,
        cellIds,
        cellCount,
        stateOfChargePct,
        restedSinceAt,
        storageTemperatureC,
        isDamaged,
      }),
    ),
    setTemperatureC: request.setTemperatureC,
    setToleranceK: request.setToleranceK,
    tolerance: request.tolerance,
    badToGoodRatio: request.badToGoodRatio,
    earliestStartAt: request.earliestStartAt,
    neededByAt: request.neededByAt,
    maySplit: request.maySplit,
    note: request.note,
    ...change,
    version: request.version,
  };
}
