import type { Tx } from '#server/db/client.ts';
import { problem } from '#server/problem.ts';
import type { InputFault } from '#server/problem.ts';
import { announceCells, listCellsOfLots, listLots } from './requests.repository.ts';
import type { LotWithType, RequestRow } from './requests.repository.ts';

/** What a request still lacks before schedulers can work on it, each with the field it belongs to. */
export function listMissingForSubmit(
  request: Pick<
    RequestRow,
    'projectId' | 'setTempMdegc' | 'kind' | 'toleranceKind' | 'badToGoodRatio'
  >,
  lots: readonly Pick<LotWithType['lot'], 'cellTypeId' | 'cellCount'>[],
): Missing[] {
  const needs: readonly (readonly [boolean, string, string])[] = [
    [request.projectId === null, 'the project', '#/projectId'],
    [request.setTempMdegc === null, 'the set temperature', '#/setTemperatureC'],
    [request.kind === 'settled' && request.toleranceKind === null, 'the tolerance', '#/tolerance'],
    [
      request.kind === 'screening' && request.badToGoodRatio === null,
      'the ratio of bad to good',
      '#/badToGoodRatio',
    ],
    [lots.length === 0, 'a lot of cells', '#/lots'],
    ...lots.flatMap((lot, place) => [
      [lot.cellTypeId === null, 'the cell type', `#/lots/${place}/cellTypeId`] as const,
      [lot.cellCount === null, 'the number of cells', `#/lots/${place}/cellCount`] as const,
    ]),
  ];
  return needs.filter(([isMissing]) => isMissing).map(([, name, pointer]) => ({ name, pointer }));
}
export type Missing = { readonly name: string; readonly pointer: string };

/** The faults of what is missing, for the fields of the form. */
export function faultsOf(missing: readonly Missing[]): InputFault[] {
  return missing.map(({ name, pointer }) => ({ pointer, detail: `Add ${name}.` }));
}

/**
 * Makes a locked draft ready for the schedulers: it must be complete, and cells asked by type and
 * number are announced.
 *
 * @returns the columns that change on the request itself
 */
export async function submitDraft(tx: Tx, request: RequestRow, at: Date) {
  const lots = await listLots(tx, request.id);
  const missing = listMissingForSubmit(
    request,
    lots.map(({ lot }) => lot),
  );
  const { projectId, siteId } = request;
  if (missing.length > 0 || projectId === null) {
    const names = [...new Set(missing.map(({ name }) => name))].join(' and ');
    throw problem('request.incomplete', {
      detail: `Request ${request.id} lacks ${names}. Add it, then submit again.`,
      missing: missing.map(({ name }) => name),
      errors: faultsOf(missing),
    });
  }
  await announceMissingCells(tx, { projectId, siteId }, lots, at);
  return { state: 'submitted' as const, submittedAt: at, declineReason: null };
}

/** Announces cells for lots that were asked by type and number and have too few on record. */
export async function announceMissingCells(
  tx: Tx,
  of: { readonly siteId: number; readonly projectId: number },
  lots: readonly LotWithType[],
  at: Date,
): Promise<void> {
  const known = await listCellsOfLots(
    tx,
    lots.map(({ lot }) => lot.id),
  );
  for (const { lot } of lots) {
    const { cellTypeId, cellCount } = lot;
    const has = known.filter(({ lotId }) => lotId === lot.id).length;
    if (cellTypeId !== null && cellCount !== null && has < cellCount) {
      const cell = { ...of, cellTypeId };
      await announceCells(
        tx,
        lot.id,
        Array.from({ length: cellCount - has }, () => cell),
        at,
      );
    }
  }
}
