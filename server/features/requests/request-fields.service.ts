import type { SignedIn, SiteScope } from '#server/actor.ts';
import type { Reader } from '#server/db/client.ts';
import { problem } from '#server/problem.ts';
import type { InputFault } from '#server/problem.ts';
import type { LotFields, RequestFields } from '#shared/contracts/requests.contract.ts';
import { rolesAt } from '#shared/domain/policies/roles-at.ts';
import { isOpenProject, listCellFacts, listKnownCellTypes } from './requests.repository.ts';

/** The columns of a request from its form. */
export function toColumns(fields: RequestFields) {
  const { tolerance } = fields;
  return {
    projectId: fields.projectId,
    kind: fields.kind,
    grade: fields.grade,
    setTempMdegc:
      fields.setTemperatureC === null ? null : Math.round(fields.setTemperatureC * 1000),
    setToleranceMk: Math.round(fields.setToleranceK * 1000),
    toleranceKind: tolerance.kind,
    toleranceFraction: tolerance.kind === 'relative' ? tolerance.fraction : null,
    toleranceCurrentA: tolerance.kind === 'absolute' ? tolerance.currentA : null,
    badToGoodRatio: fields.badToGoodRatio,
    earliestStartAt: toDate(fields.earliestStartAt),
    neededByAt: toDate(fields.neededByAt),
    maySplit: fields.maySplit,
    note: fields.note,
  };
}

export function toLots(fields: RequestFields) {
  return fields.lots.map((lot) => ({
    cellIds: lot.cellIds,
    values: {
      cellTypeId: lot.cellTypeId,
      cellCount: lot.cellIds.length > 0 ? lot.cellIds.length : lot.cellCount,
      stateOfChargePct: lot.stateOfChargePct,
      restedSinceAt: toDate(lot.restedSinceAt),
      storageTemperatureC: lot.storageTemperatureC,
      isDamaged: lot.isDamaged,
    },
  }));
}

function toDate(instant: string | null): Date | null {
  return instant === null ? null : new Date(instant);
}

/** Holds what was entered against what there is; every fault is named at its field. */
export async function requireSense(
  reader: Reader,
  actor: SignedIn,
  site: SiteScope,
  fields: RequestFields,
): Promise<void> {
  refuse([
    ...timeFaults(fields),
    ...(await projectFaults(reader, actor, site, fields)),
    ...(await lotFaults(reader, site, fields)),
  ]);
}

/** The part of it that needs no record. */
export function requireTimes(fields: RequestFields): void {
  refuse(timeFaults(fields));
}

function refuse(errors: readonly InputFault[]): void {
  if (errors.length > 0) {
    throw problem('input.invalid', {
      detail:
        errors.length === 1
          ? (errors[0]?.detail ?? '')
          : `${errors.length} entries cannot be accepted. Correct what is marked and send it again.`,
      errors,
    });
  }
}

function timeFaults({ earliestStartAt, neededByAt }: RequestFields): InputFault[] {
  const isTurned =
    earliestStartAt !== null &&
    neededByAt !== null &&
    Date.parse(neededByAt) <= Date.parse(earliestStartAt);
  return isTurned
    ? [
        {
          pointer: '#/neededByAt',
          detail: 'It is needed before it may start. Give a later day, or an earlier start.',
        },
      ]
    : [];
}

/** One asks for one's own projects; schedulers ask for anybody's. */
async function projectFaults(
  reader: Reader,
  actor: SignedIn,
  site: SiteScope,
  { projectId }: RequestFields,
): Promise<InputFault[]> {
  if (projectId === null) {
    return [];
  }
  const isOwn =
    actor.projectIds.includes(projectId) || rolesAt(actor, site.code).includes('scheduler');
  return isOwn && (await isOpenProject(reader, projectId))
    ? []
    : [{ pointer: '#/projectId', detail: 'Choose a project you belong to that is still open.' }];
}

async function lotFaults(
  reader: Reader,
  site: SiteScope,
  { lots, projectId }: RequestFields,
): Promise<InputFault[]> {
  const typeIds = lots.map(({ cellTypeId }) => cellTypeId).filter((id) => id !== null);
  const types = await listKnownCellTypes(reader, typeIds);
  const cellIds = lots.flatMap((lot) => lot.cellIds);
  const cells = new Map(
    (await listCellFacts(reader, cellIds)).map((row) => [row.id, row] as const),
  );
  return lots.flatMap((lot, place): InputFault[] => {
    const at = `#/lots/${place}`;
    const isUnknownType = lot.cellTypeId !== null && !types.includes(lot.cellTypeId);
    const isForeign = lot.cellIds.some((id) => {
      const cell = cells.get(id);
      return (
        cell?.siteId !== site.id ||
        cell.cellTypeId !== lot.cellTypeId ||
        (projectId !== null && cell.projectId !== projectId)
      );
    });
    return [
      ...(isUnknownType
        ? [{ pointer: `${at}/cellTypeId`, detail: 'There is no such cell type.' }]
        : []),
      ...(isForeign
        ? [
            {
              pointer: `${at}/cellIds`,
              detail: 'Choose cells of this type and project that are registered at this site.',
            },
          ]
        : []),
      ...countFaults(lot, cellIds, at),
    ];
  });
}

function countFaults(lot: LotFields, all: readonly number[], at: string): InputFault[] {
  const isRepeated = lot.cellIds.some((id) => all.filter((other) => other === id).length > 1);
  const isMiscounted =
    lot.cellIds.length > 0 && lot.cellCount !== null && lot.cellCount !== lot.cellIds.length;
  return [
    ...(isRepeated
      ? [{ pointer: `${at}/cellIds`, detail: 'Each cell is named once in a request.' }]
      : []),
    ...(isMiscounted
      ? [
          {
            pointer: `${at}/cellCount`,
            detail: `${lot.cellIds.length} cells are named. Give the same number, or name as many.`,
          },
        ]
      : []),
  ];
}
