import { requireFinite } from '#shared/domain/quantities/require-finite.ts';
import { requireNotNegative } from '#shared/domain/quantities/require-not-negative.ts';
import { requirePositive } from '#shared/domain/quantities/require-positive.ts';

/**
 * Standard uncertainty that the temperature log's resolution leaves in the window-mean induced
 * current; below it the log cannot tell:
 *
 *     u = C·|α|·√2·u_T/w,   u_T = resolution/√12
 *
 * @param input.resolutionK smallest step of the log, K
 * @param input.windowS length of the measuring window, s
 * @returns A
 * @throws RangeError on a non-finite input, C or window not above zero, or a negative resolution
 * @example
 * logResolutionFloor({ capacitanceF: 14000, entropicCoefficientVPerK: 1e-4, resolutionK: 0.1,
 *   windowS: 1800 }) // 31.7526448e-6
 */
export function logResolutionFloor(input: {
  readonly capacitanceF: number;
  readonly entropicCoefficientVPerK: number;
  readonly resolutionK: number;
  readonly windowS: number;
}): number {
  requirePositive(input.capacitanceF, 'capacitanceF');
  requireFinite(input.entropicCoefficientVPerK, 'entropicCoefficientVPerK');
  const logUncertaintyK = requireNotNegative(input.resolutionK, 'resolutionK') / Math.sqrt(12);
  return (
    (input.capacitanceF * Math.abs(input.entropicCoefficientVPerK) * Math.SQRT2 * logUncertaintyK) /
    requirePositive(input.windowS, 'windowS')
  );
}
