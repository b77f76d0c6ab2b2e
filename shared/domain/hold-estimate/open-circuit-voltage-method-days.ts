import { requirePositive } from '#shared/domain/quantities/require-positive.ts';

/**
 * Days the open-circuit voltage method would need for the same information:
 *
 *     days = N·u_V·C/(I·86 400)
 *
 * For telling two cells apart take the difference of their currents and of their readings' u_V.
 *
 * @param input.signalToUncertainty N, how many uncertainties the voltage must fall
 * @param input.voltageUncertaintyV u_V, V
 * @returns days
 * @throws RangeError when an input is not above zero
 * @example
 * openCircuitVoltageMethodDays({ signalToUncertainty: 10, voltageUncertaintyV: 1e-4,
 *   capacitanceF: 14000, currentA: 1e-5 }) // 16.2037037
 */
export function openCircuitVoltageMethodDays(input: {
  readonly signalToUncertainty: number;
  readonly voltageUncertaintyV: number;
  readonly capacitanceF: number;
  readonly currentA: number;
}): number {
  return (
    (requirePositive(input.signalToUncertainty, 'signalToUncertainty') *
      requirePositive(input.voltageUncertaintyV, 'voltageUncertaintyV') *
      requirePositive(input.capacitanceF, 'capacitanceF')) /
    (requirePositive(input.currentA, 'currentA') * 86_400)
  );
}
