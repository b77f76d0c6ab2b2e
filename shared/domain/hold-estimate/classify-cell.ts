import { requirePositive } from '#shared/domain/quantities/require-positive.ts';
import type { CellClass, CellFormat } from './types.ts';

/**
 * Size class of a cell from its format and capacity: coin and cylindrical by format, pouch and
 * prismatic by capacity (≤ 5 Ah small pouch, ≤ 80 Ah prismatic, above it large prismatic).
 *
 * @throws RangeError when the capacity is not above zero
 * @example classifyCell('21700', 5) // 'cylindrical'
 */
export function classifyCell(format: CellFormat, capacityAh: number): CellClass {
  requirePositive(capacityAh, 'capacityAh');
  if (format === 'coin') {
    return 'coin';
  }
  if (format === '18650' || format === '21700') {
    return 'cylindrical';
  }
  if (format === '4680') {
    return 'large-cylindrical';
  }
  if (capacityAh <= 5) {
    return 'small-pouch';
  }
  return capacityAh <= 80 ? 'prismatic' : 'large-prismatic';
}
