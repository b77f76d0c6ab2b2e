import type { SlotRequest } from '#shared/domain/availability/types.ts';
import type { Position } from '#shared/domain/facility/types.ts';
import { formatFigure } from './words/format-figure.ts';

/**
 * Why a position may not take a cell (format, capacity or hazard by its record), as a short clause;
 * null when it may. A position without a recorded format takes nothing.
 *
 * @example findPositionMisfit(position, request) // 'C03/4 takes 18650 cells, not pouch'
 */
export function findPositionMisfit(
  position: Pick<Position, 'tag' | 'formats' | 'maxCapacityAh' | 'maxHazard'>,
  request: Pick<SlotRequest, 'cell' | 'limits'>,
): string | null {
  const { format, capacityAh } = request.cell;
  if (!position.formats.includes(format)) {
    const taken = position.formats.length === 0 ? 'no recorded' : position.formats.join(', ');
    return `${position.tag} takes ${taken} cells, not ${format}`;
  }
  if (capacityAh > position.maxCapacityAh) {
    return `${position.tag} takes up to ${formatFigure(position.maxCapacityAh)} Ah, the cell has ${formatFigure(capacityAh)} Ah`;
  }
  if (request.limits.hazardLevel > position.maxHazard) {
    return `${position.tag} is for hazard level ${position.maxHazard}, the cell type has ${request.limits.hazardLevel}`;
  }
  return null;
}
