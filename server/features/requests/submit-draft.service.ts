import type { Tx } from '#server/db/client.ts';
import { problem } from '#server/problem.ts';
import { announceCells, listCellsOfLots, listLots } from './requests-of-offers.repository.ts';
import type { LotWithType, RequestRow } from './requests-of-offers.repository.ts';

/** What a draft still lacks before schedulers can work on it. */
export function listMissingForSubmit(request: RequestRow, lots: readonly LotWithType[]): string[] {
  const needs: readonly (readonly [boolean, string])[] = [
    [request.projectId === null, 'the project'],
    [request.setTempMdegc === null, 'the set temperature'],
    [request.kind === 'settled' && request.toleranceKind === null, 'the tolerance'],
    [request.kind === 'screening' && request.badToGoodRatio === null, 'the ratio of bad to good'],
    [lots.length === 0, 'a lot of cells'],
    [lots.some(({ lot }) => lot.cellTypeId === null), 'the cell type'],
    [lots.some(({ lot }) => lot.cellCount === null), 'the number of cells'],
  ];
  return needs.filter(([isMissing]) => isMissing).map(([, name]) => name);
}

/**
 * Makes a locked draft ready for the schedulers: it must be complete, and cells asked by type and
 * number are announced.
 *
 * @returns the columns that change on the request itself
 */
export async function submitDraft(tx: Tx, request: RequestRow, at: Date) {
  const lots = await listLots(tx, request.id);
  const missing = listMissingForSubmit(request, lots);
  const { projectId, siteId } = request;
  if (missing.length > 0 || projectId === null) {
    throw problem('request.incomplete', {
      detail: `Request ${request.id} lacks ${missing.join(' and ')}. Add it, then propose again.`,
      missing,
    });
  }
  const known = await listCellsOfLots(
    tx,
    lots.map(({ lot }) => lot.id),
  );
  for (const { lot } of lots) {
    const { cellTypeId, cellCount } = lot;
    const has = known.filter(({ lotId }) => lotId === lot.id).length;
    if (cellTypeId !== null && cellCount !== null && has < cellCount) {
      const cell = { siteId, projectId, cellTypeId };
      await announceCells(
        tx,
        lot.id,
        Array.from({ length: cellCount - has }, () => cell),
        at,
      );
    }
  }
  return { state: 'submitted' as const, submittedAt: at, declineReason: null };
}
