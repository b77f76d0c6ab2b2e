import { thermalFigures, type ThermalFigures } from './thermal-figures.ts';
import type { CellClass, CellFormat } from './types.ts';

const byClass: Record<CellClass, ThermalFigures> = {
  coin: thermalFigures.coin,
  'small-pouch': thermalFigures.smallPouch,
  cylindrical: thermalFigures.cylindrical21700,
  'large-cylindrical': thermalFigures.cylindrical4680,
  prismatic: thermalFigures.prismatic,
  'large-prismatic': thermalFigures.largePrismatic,
};

/**
 * Mass, surface and inner length for a cell: by its format where that fixes the size, else by the
 * size class (whose row is its largest cell, so smaller ones are on the safe side).
 *
 * @example findThermalFigures('18650', 'cylindrical').massKg // 0.047
 */
export function findThermalFigures(format: CellFormat, cellClass: CellClass): ThermalFigures {
  if (format === '18650') {
    return thermalFigures.cylindrical18650;
  }
  if (format === '21700') {
    return thermalFigures.cylindrical21700;
  }
  if (format === '4680') {
    return thermalFigures.cylindrical4680;
  }
  return format === 'coin' ? thermalFigures.coin : byClass[cellClass];
}
