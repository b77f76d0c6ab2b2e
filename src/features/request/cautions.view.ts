import type { CellTypeDto } from '#shared/contracts/registers.contract.ts';
import { formatTemperature } from '#src/lib/format-quantity.ts';
import { t } from '#src/texts/t.ts';

/** From this temperature on a well charged cell is worth a word; common practice of the trade. */
const hotC = 45;
const chargedPct = 80;
const coldC = 5;

type Choice = {
  readonly cellType: CellTypeDto | undefined;
  readonly stateOfChargePct: number | null;
  readonly setTemperatureC: number | null;
  readonly isDamaged: boolean;
};

/** What must be said where the choice is made; the checks refuse what may not be. */
export function cautionsOf(choice: Choice): readonly string[] {
  const { cellType, stateOfChargePct: charge, setTemperatureC: at, isDamaged } = choice;
  const words = t.request;
  return [
    ...(isDamaged ? [words.damagedCaution] : []),
    ...(cellType?.isReleased === false ? [words.notReleased] : []),
    ...limitCautions(cellType, charge, at),
    ...(charge !== null && at !== null && charge >= chargedPct && at >= hotC
      ? [words.hotCaution(charge, formatTemperature(at, 0))]
      : []),
    ...(at !== null && at <= coldC ? [words.coldCaution] : []),
  ];
}

function limitCautions(
  cellType: CellTypeDto | undefined,
  charge: number | null,
  at: number | null,
): readonly string[] {
  if (cellType === undefined) {
    return [];
  }
  const { minTemperatureC: min, maxTemperatureC: max, maxHoldStateOfChargePct: limit } = cellType;
  return [
    ...(charge !== null && charge > limit ? [t.request.chargeCaution(charge, limit)] : []),
    ...(at !== null && (at < min || at > max)
      ? [t.request.spanCaution(formatTemperature(min, 0), formatTemperature(max, 0))]
      : []),
  ];
}
