import { requireNotNegative } from '#shared/domain/quantities/require-not-negative.ts';
import { requirePositive } from '#shared/domain/quantities/require-positive.ts';

/**
 * Largest window mean a sinusoidal current can leave: 2·(amplitude/ω)/w. The mean over a whole
 * number of periods is exactly zero; the bound holds for every phase and length.
 *
 * @param input.amplitudeA amplitude of the induced current, A
 * @param input.periodS period, s
 * @param input.windowS length of the measuring window, s
 * @returns A, not negative
 * @throws RangeError when the amplitude is negative or period or window are not above zero
 * @example windowBound({ amplitudeA: 15.6812364e-6, periodS: 600, windowS: 1800 }) // 1.66383086e-6
 */
export function windowBound(input: {
  readonly amplitudeA: number;
  readonly periodS: number;
  readonly windowS: number;
}): number {
  const amplitudeA = requireNotNegative(input.amplitudeA, 'amplitudeA');
  const periodS = requirePositive(input.periodS, 'periodS');
  const windowS = requirePositive(input.windowS, 'windowS');
  return (amplitudeA * periodS) / (Math.PI * windowS);
}
