import type { MeterRange, Panel } from '#shared/domain/facility/types.ts';

/**
 * What is not recorded about a path's resistance, as a clause; null when all is known.
 *
 * @example findUnknownWiring({ name: 'P1', leadResistanceOhm: null }, range, 'M1/1') // 'the lead resistance of P1'
 */
export function findUnknownWiring(
  panel: Pick<Panel, 'name' | 'leadResistanceOhm'>,
  range: Pick<MeterRange, 'label' | 'burdenOhm' | 'burdenInsideLoop'>,
  meterTag: string,
): string | null {
  if (panel.leadResistanceOhm === null) {
    return `the lead resistance of ${panel.name}`;
  }
  if (range.burdenOhm === null) {
    return `the burden of ${meterTag} ${range.label}`;
  }
  return range.burdenInsideLoop === null
    ? `whether the burden of ${meterTag} ${range.label} lies inside the sense loop`
    : null;
}
