import { cellClassFigures, largeLfpFigures, type CellClassFigures } from './cell-class-figures.ts';
import type { CellClass, Chemistry } from './types.ts';

/**
 * Electrical figures of a size class; large LFP cells have a row of their own.
 *
 * @example findCellClassFigures('cylindrical', 'nmc811').resistanceOhmAh.typical // 0.12
 */
export function findCellClassFigures(cellClass: CellClass, chemistry: Chemistry): CellClassFigures {
  return cellClass === 'large-prismatic' && chemistry === 'lfp'
    ? largeLfpFigures
    : cellClassFigures[cellClass];
}
