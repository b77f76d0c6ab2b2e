import type { Chamber } from '#shared/domain/facility/types.ts';
import type { PathChoice } from './types.ts';

/**
 * Why a path does not connect, as a sentence; null when it does. All three must hang on one panel of
 * the chamber, and channels of one instrument that are a pair are taken together in one path.
 *
 * @example findPathFault(path, chamber) // 'S05/1 and C03/4 do not hang on one panel.'
 */
export function findPathFault(
  path: PathChoice,
  chamber: Pick<Chamber, 'id' | 'tag'>,
): string | null {
  const { panel, source, meter, position } = path;
  if (position.chamberId !== chamber.id || panel.chamberId !== chamber.id) {
    return `${position.tag} on ${panel.name} is not in ${chamber.tag}.`;
  }
  const isOnPanel =
    panel.sourceUnitIds.includes(source.unitId) &&
    panel.meterUnitIds.includes(meter.unitId) &&
    panel.positionUnitIds.includes(position.unitId);
  if (!isOnPanel) {
    return `${source.tag}, ${meter.tag} and ${position.tag} are not all wired to ${panel.name}.`;
  }
  const sourceAlone = source.pairedUnitId !== null && source.pairedUnitId !== meter.unitId;
  const meterAlone = meter.pairedUnitId !== null && meter.pairedUnitId !== source.unitId;
  if (sourceAlone || meterAlone) {
    return `${sourceAlone ? source.tag : meter.tag} is one of a pair that must be used together.`;
  }
  return meter.ranges.includes(path.range)
    ? null
    : `${meter.tag} has no range ${path.range.label}.`;
}
