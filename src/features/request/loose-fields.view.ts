import type { RequestFields } from '#shared/contracts/requests.contract.ts';
import { parseFigure } from '#src/lib/format-number.ts';
import type { RequestDraft } from './request-draft.view.ts';

type Loose = Pick<
  RequestFields,
  'kind' | 'tolerance' | 'badToGoodRatio' | 'setTemperatureC' | 'lots'
>;

const percent = 100;

/** A figure inside its limits, or nothing: an estimate of half-typed input would only mislead. */
function within(text: string, min: number, max: number): number | null {
  const value = parseFigure(text);
  return value !== undefined && value >= min && value <= max ? value : null;
}

/** What the estimate needs of a draft that is still being typed. */
export function looseFields(draft: RequestDraft): Loose {
  const fraction = (within(draft.tolerancePct, 0.5, 50) ?? 10) / percent;
  const currentA = within(draft.toleranceUa, 1e-6, 1000);
  return {
    kind: draft.kind,
    tolerance:
      draft.toleranceKind === 'absolute' && currentA !== null
        ? { kind: 'absolute', currentA: currentA * 1e-6 }
        : { kind: 'relative', fraction },
    badToGoodRatio: within(draft.badToGoodRatio, 1.01, 1000) ?? 3,
    setTemperatureC: within(draft.setTemperatureC, -60, 150),
    lots: draft.lots.map((lot) => ({
      cellTypeId: lot.cellTypeId === '' ? null : Number(lot.cellTypeId),
      cellIds: [],
      cellCount:
        lot.by === 'serial' && lot.cellIds.length > 0
          ? lot.cellIds.length
          : wholeWithin(lot.cellCount, 64),
      stateOfChargePct: within(lot.stateOfChargePct, 0, percent),
      restedSinceAt: null,
      storageTemperatureC: null,
      isDamaged: lot.isDamaged,
    })),
  };
}

function wholeWithin(text: string, max: number): number | null {
  const value = within(text, 1, max);
  return value !== null && Number.isInteger(value) ? value : null;
}
