import { requirePositive } from '#shared/domain/quantities/require-positive.ts';

/**
 * Time after a temperature step at which the induced current is largest:
 *
 *     t = τ_th·τ_e·ln(τ_th/τ_e)/(τ_th − τ_e);   equal time constants: t = τ
 *
 * @returns s
 * @throws RangeError when a time constant is not above zero
 * @example stepPeakTime({ thermalTimeConstantS: 600, timeConstantS: 1400 }) // 889.662753...
 */
export function stepPeakTime(input: {
  readonly thermalTimeConstantS: number;
  readonly timeConstantS: number;
}): number {
  const thermalS = requirePositive(input.thermalTimeConstantS, 'thermalTimeConstantS');
  const electricalS = requirePositive(input.timeConstantS, 'timeConstantS');
  const relative = (thermalS - electricalS) / electricalS;
  return relative === 0 ? thermalS : (thermalS * Math.log1p(relative)) / relative;
}
