import type { RequestFields } from '#shared/contracts/requests.contract.ts';
import { parseFigure } from '#src/lib/format-number.ts';
import type { RequestDraft } from './request-draft.view.ts';

type Tolerance = RequestFields['tolerance'];

/** What the estimate asks of a request; null where nothing usable is typed yet. */
export type LooseFields = Pick<RequestFields, 'kind' | 'setTemperatureC' | 'lots'> & {
  readonly tolerance: Tolerance | null;
  readonly badToGoodRatio: number | null;
};

const percent = 100;
const digitsKept = 12;

/** A figure inside its limits, or nothing: an estimate of half-typed input would only mislead. */
function within(text: string, min: number, max: number): number | null {
  const value = parseFigure(text);
  return value !== undefined && value >= min && value <= max ? value : null;
}

function wholeWithin(text: string, max: number): number | null {
  const value = within(text, 1, max);
  return value !== null && Number.isInteger(value) ? value : null;
}

export function looseTolerance(draft: RequestDraft): Tolerance | null {
  if (draft.toleranceKind === 'relative') {
    const share = within(draft.tolerancePct, 0.5, 50);
    return share === null ? null : { kind: 'relative', fraction: share / percent };
  }
  const microamperes = within(draft.toleranceUa, 1e-6, 1000);
  return microamperes === null
    ? null
    : { kind: 'absolute', currentA: Number((microamperes / 1e6).toPrecision(digitsKept)) };
}

export function looseRatio(draft: RequestDraft): number | null {
  const ratio = within(draft.badToGoodRatio, 1, 1000);
  return ratio === 1 ? null : ratio;
}

/** What the estimate needs of a draft that is still being typed. */
export function looseFields(draft: RequestDraft): LooseFields {
  return {
    kind: draft.kind,
    tolerance: looseTolerance(draft),
    badToGoodRatio: looseRatio(draft),
    setTemperatureC: within(draft.setTemperatureC, -60, 150),
    lots: draft.lots.map((lot) => ({
      cellTypeId: lot.cellTypeId === '' ? null : Number(lot.cellTypeId),
      cellIds: [],
      cellCount:
        lot.by === 'serial' && lot.cells.length > 0
          ? lot.cells.length
          : wholeWithin(lot.cellCount, 64),
      stateOfChargePct: within(lot.stateOfChargePct, 0, percent),
      restedSinceAt: null,
      storageTemperatureC: null,
      isDamaged: lot.isDamaged,
    })),
  };
}
