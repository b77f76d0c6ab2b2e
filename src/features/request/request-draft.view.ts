import { z } from 'zod';
import { requestFields } from '#shared/contracts/requests.contract.ts';
import type { RequestDto, RequestFields } from '#shared/contracts/requests.contract.ts';
import { parseFigure } from '#src/lib/format-number.ts';
import { fromSiteInput, toSiteInput } from '#src/lib/site-time.ts';
import { t } from '#src/texts/t.ts';
import { looseRatio, looseTolerance } from './loose-fields.view.ts';

const usualTolerance = { kind: 'relative', fraction: 0.1 } as const;
const usualRatio = 3;
/** Enough to say what was typed, few enough to leave the dust of binary fractions behind. */
const digitsKept = 12;

/** As typed: figures and times stay text until the form is sent, so that nothing typed is lost. */
export const lotDraftSchema = z.object({
  /** Names the lot while the form is open; the server numbers lots by their order. */
  key: z.string(),
  cellTypeId: z.string(),
  by: z.enum(['number', 'serial']),
  cellCount: z.string(),
  cells: z.array(z.object({ id: z.number(), serial: z.string().nullable() })),
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
    cells: [],
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
      cells: lot.cells.filter(({ id }) => lot.cellIds.includes(id)),
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

/** Reads single entries; what cannot be read is noted at its JSON pointer. */
function entryReader(zone: string, errors: Map<string, string>) {
  const figure = (typed: string, pointer: string, perUnit = 1): number | null => {
    if (typed.trim() === '') {
      return null;
    }
    const value = parseFigure(typed);
    if (value === undefined) {
      errors.set(pointer, t.ui.notANumber);
      return null;
    }
    return perUnit === 1 ? value : Number((value / perUnit).toPrecision(digitsKept));
  };
  return {
    figure,
    /** A figure that even a draft must have. */
    needed: (typed: string, pointer: string, perUnit = 1): number => {
      const value = figure(typed, pointer, perUnit);
      if (value === null) {
        errors.set(pointer, t.ui.notANumber);
      }
      return value ?? Number.NaN;
    },
    instant: (typed: string, pointer: string): string | null => {
      const reading = fromSiteInput(typed, zone);
      if (reading.kind === 'gap') {
        errors.set(pointer, t.ui.timeGap(zone));
      } else if (reading.kind === 'invalid') {
        errors.set(pointer, t.ui.timeInvalid);
      }
      return reading.kind === 'instant' ? reading.at : null;
    },
  };
}
type EntryReader = ReturnType<typeof entryReader>;

/** Only the aim that is shown is held against its limits; the hidden one keeps what it can. */
function readAim(
  draft: RequestDraft,
  read: EntryReader,
): Pick<RequestFields, 'tolerance' | 'badToGoodRatio'> {
  if (draft.kind === 'screening') {
    return {
      tolerance: looseTolerance(draft) ?? usualTolerance,
      badToGoodRatio: read.needed(draft.badToGoodRatio, '#/badToGoodRatio'),
    };
  }
  return {
    tolerance:
      draft.toleranceKind === 'relative'
        ? { kind: 'relative', fraction: read.needed(draft.tolerancePct, '#/tolerance', 100) }
        : { kind: 'absolute', currentA: read.needed(draft.toleranceUa, '#/tolerance', 1e6) },
    badToGoodRatio: looseRatio(draft) ?? usualRatio,
  };
}

function readLot(lot: LotDraft, at: string, read: EntryReader): RequestFields['lots'][number] {
  const isBySerial = lot.by === 'serial' && lot.cells.length > 0;
  return {
    cellTypeId: lot.cellTypeId === '' ? null : Number(lot.cellTypeId),
    cellIds: isBySerial ? lot.cells.map(({ id }) => id) : [],
    cellCount: isBySerial ? lot.cells.length : read.figure(lot.cellCount, `${at}/cellCount`),
    stateOfChargePct: read.figure(lot.stateOfChargePct, `${at}/stateOfChargePct`),
    restedSinceAt: read.instant(lot.restedSince, `${at}/restedSinceAt`),
    storageTemperatureC: read.figure(lot.storageTemperatureC, `${at}/storageTemperatureC`),
    isDamaged: lot.isDamaged,
  };
}

/** Reads the draft with the contract's own schema; errors by JSON pointer, as the server names them. */
export function readDraft(
  draft: RequestDraft,
  zone: string,
): { fields: RequestFields | null; errors: FieldErrors } {
  const errors = new Map<string, string>();
  const read = entryReader(zone, errors);
  const fields: RequestFields = {
    projectId: draft.projectId === '' ? null : Number(draft.projectId),
    kind: draft.kind,
    grade: draft.grade,
    lots: draft.lots.map((lot, place) => readLot(lot, `#/lots/${place}`, read)),
    setTemperatureC: read.figure(draft.setTemperatureC, '#/setTemperatureC'),
    setToleranceK: read.needed(draft.setToleranceK, '#/setToleranceK'),
    ...readAim(draft, read),
    earliestStartAt: read.instant(draft.earliestStart, '#/earliestStartAt'),
    neededByAt: read.instant(draft.neededBy, '#/neededByAt'),
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

/**
 * Of a booked request only the note and the day it is needed by can change: the rest goes back as it
 * was sent, to the last digit, so that nothing looks changed that nobody touched.
 */
export function readFreeEntries(
  draft: RequestDraft,
  request: RequestDto,
  zone: string,
): ReturnType<typeof readDraft> {
  const errors = new Map<string, string>();
  const neededByAt = entryReader(zone, errors).instant(draft.neededBy, '#/neededByAt');
  const fields = { ...fieldsOf(request), neededByAt, note: draft.note };
  return { fields: errors.size === 0 ? fields : null, errors };
}

function fieldsOf(request: RequestDto): RequestFields {
  return {
    projectId: request.project?.id ?? null,
    kind: request.kind,
    grade: request.grade,
    lots: request.lots.map((lot) => ({
      cellTypeId: lot.cellTypeId,
      cellIds: lot.cellIds,
      cellCount: lot.cellCount,
      stateOfChargePct: lot.stateOfChargePct,
      restedSinceAt: lot.restedSinceAt,
      storageTemperatureC: lot.storageTemperatureC,
      isDamaged: lot.isDamaged,
    })),
    setTemperatureC: request.setTemperatureC,
    setToleranceK: request.setToleranceK,
    tolerance: request.tolerance,
    badToGoodRatio: request.badToGoodRatio,
    earliestStartAt: request.earliestStartAt,
    neededByAt: request.neededByAt,
    maySplit: request.maySplit,
    note: request.note,
  };
}
