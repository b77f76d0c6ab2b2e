import { z } from 'zod';
import { requestFields } from '#shared/contracts/requests.contract.ts';
import type { RequestDto, RequestFields } from '#shared/contracts/requests.contract.ts';
import { parseFigure } from '#src/lib/format-number.ts';
import { fromSiteInput, toSiteInput } from '#src/lib/site-time.ts';
import { t } from '#src/texts/t.ts';

/** As typed: figures and times stay text until the form is sent, so that nothing typed is lost. */
export const lotDraftSchema = z.object({
  /** Names the lot while the form is open; the server numbers lots by their order. */
  key: z.string(),
  cellTypeId: z.string(),
  by: z.enum(['number', 'serial']),
  cellCount: z.string(),
  cellIds: z.array(z.number()),
  stateOfChargePct: z.string(),
  restedSince: z.string(),
  storageTemperatureC: z.string(),
  isDamaged: z.boolean(),
});
export type LotDraft = z.infer<typeof lotDraftSchema>;

export const requestDraftSchema = z.object({
  projectId: z.string(),
  kind: z.enum(['settled', 'screening']),
  grade: z.enum(['reported', 'indicative']),
  lots: z.array(lotDraftSchema),
  setTemperatureC: z.string(),
  setToleranceK: z.string(),
  toleranceKind: z.enum(['relative', 'absolute']),
  tolerancePct: z.string(),
  toleranceUa: z.string(),
  badToGoodRatio: z.string(),
  earliestStart: z.string(),
  neededBy: z.string(),
  maySplit: z.boolean(),
  note: z.string(),
});
export type RequestDraft = z.infer<typeof requestDraftSchema>;

export function emptyLot(): LotDraft {
  return {
    key: crypto.randomUUID(),
    cellTypeId: '',
    by: 'number',
    cellCount: '',
    cellIds: [],
    stateOfChargePct: '',
    restedSince: '',
    storageTemperatureC: '',
    isDamaged: false,
  };
}

export function emptyDraft(): RequestDraft {
  return {
    projectId: '',
    kind: 'settled',
    grade: 'reported',
    lots: [emptyLot()],
    setTemperatureC: '25',
    setToleranceK: '0.5',
    toleranceKind: 'relative',
    tolerancePct: '10',
    toleranceUa: '',
    badToGoodRatio: '3',
    earliestStart: '',
    neededBy: '',
    maySplit: false,
    note: '',
  };
}

const text = (value: number | null) => (value === null ? '' : String(Number(value.toPrecision(9))));

export function draftOf(request: RequestDto, zone: string): RequestDraft {
  const { tolerance } = request;
  return {
    projectId: text(request.project?.id ?? null),
    kind: request.kind,
    grade: request.grade,
    lots: request.lots.map((lot) => ({
      key: String(lot.id),
      cellTypeId: text(lot.cellTypeId),
      by: lot.cellIds.length > 0 ? 'serial' : 'number',
      cellCount: text(lot.cellCount),
      cellIds: lot.cellIds,
      stateOfChargePct: text(lot.stateOfChargePct),
      restedSince: lot.restedSinceAt === null ? '' : toSiteInput(lot.restedSinceAt, zone),
      storageTemperatureC: text(lot.storageTemperatureC),
      isDamaged: lot.isDamaged,
    })),
    setTemperatureC: text(request.setTemperatureC),
    setToleranceK: text(request.setToleranceK),
    toleranceKind: tolerance.kind,
    tolerancePct: tolerance.kind === 'relative' ? text(tolerance.fraction * 100) : '10',
    toleranceUa: tolerance.kind === 'absolute' ? text(tolerance.currentA * 1e6) : '',
    badToGoodRatio: text(request.badToGoodRatio),
    earliestStart:
      request.earliestStartAt === null ? '' : toSiteInput(request.earliestStartAt, zone),
    neededBy: request.neededByAt === null ? '' : toSiteInput(request.neededByAt, zone),
    maySplit: request.maySplit,
    note: request.note,
  };
}

export type FieldErrors = ReadonlyMap<string, string>;

/** Reads the draft with the contract's own schema; errors by JSON pointer, as the server names them. */
export function readDraft(
  draft: RequestDraft,
  zone: string,
): { fields: RequestFields | null; errors: FieldErrors } {
  const errors = new Map<string, string>();
  const figure = (typed: string, pointer: string, factor = 1): number | null => {
    if (typed.trim() === '') {
      return null;
    }
    const value = parseFigure(typed);
    if (value === undefined) {
      errors.set(pointer, t.ui.notANumber);
      return null;
    }
    return value * factor;
  };
  const instant = (typed: string, pointer: string): string | null => {
    const reading = fromSiteInput(typed, zone);
    if (reading.kind === 'gap') {
      errors.set(pointer, t.ui.timeGap(zone));
    } else if (reading.kind === 'invalid') {
      errors.set(pointer, t.ui.timeInvalid);
    }
    return reading.kind === 'instant' ? reading.at : null;
  };
  const fields: RequestFields = {
    projectId: draft.projectId === '' ? null : Number(draft.projectId),
    kind: draft.kind,
    grade: draft.grade,
    lots: draft.lots.map((lot, place) => ({
      cellTypeId: lot.cellTypeId === '' ? null : Number(lot.cellTypeId),
      cellIds: lot.by === 'serial' ? lot.cellIds : [],
      cellCount:
        lot.by === 'serial' && lot.cellIds.length > 0
          ? lot.cellIds.length
          : figure(lot.cellCount, `#/lots/${place}/cellCount`),
      stateOfChargePct: figure(lot.stateOfChargePct, `#/lots/${place}/stateOfChargePct`),
      restedSinceAt: instant(lot.restedSince, `#/lots/${place}/restedSinceAt`),
      storageTemperatureC: figure(lot.storageTemperatureC, `#/lots/${place}/storageTemperatureC`),
      isDamaged: lot.isDamaged,
    })),
    setTemperatureC: figure(draft.setTemperatureC, '#/setTemperatureC'),
    setToleranceK: figure(draft.setToleranceK, '#/setToleranceK') ?? 0,
    tolerance:
      draft.toleranceKind === 'relative'
        ? { kind: 'relative', fraction: figure(draft.tolerancePct, '#/tolerance', 0.01) ?? 0.1 }
        : { kind: 'absolute', currentA: figure(draft.toleranceUa, '#/tolerance', 1e-6) ?? 0 },
    badToGoodRatio: figure(draft.badToGoodRatio, '#/badToGoodRatio') ?? 3,
    earliestStartAt: instant(draft.earliestStart, '#/earliestStartAt'),
    neededByAt: instant(draft.neededBy, '#/neededByAt'),
    maySplit: draft.maySplit,
    note: draft.note,
  };
  const parsed = requestFields.safeParse(fields);
  for (const issue of parsed.error?.issues ?? []) {
    const pointer = pointerOf(issue.path);
    if (!errors.has(pointer)) {
      errors.set(pointer, issue.message);
    }
  }
  return { fields: errors.size === 0 ? fields : null, errors };
}

/** A fault inside the tolerance belongs to the one field it is typed in. */
function pointerOf(path: readonly PropertyKey[]): string {
  const pointer = `#/${path.map(String).join('/')}`;
  return pointer.startsWith('#/tolerance') ? '#/tolerance' : pointer;
}
