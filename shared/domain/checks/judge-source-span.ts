import type { SlotRequest } from '#shared/domain/availability/types.ts';
import type { SourceChannel } from '#shared/domain/facility/types.ts';
import type { CheckOutcome } from './types.ts';

/**
 * Can a source reach the cell's voltage? With a stated open-circuit voltage it must lie in the span.
 * Without one the whole of the cell's limits should; a part of them is a caution, none a stop.
 *
 * @example judgeSourceSpan({ minVoltageV: 0, maxVoltageV: 6 }, { openCircuitVoltageV: 3.7, minVoltageV: 2.5, maxVoltageV: 4.2 }) // 'pass'
 */
export function judgeSourceSpan(
  source: Pick<SourceChannel, 'minVoltageV' | 'maxVoltageV'>,
  limits: Pick<SlotRequest['limits'], 'openCircuitVoltageV' | 'minVoltageV' | 'maxVoltageV'>,
): CheckOutcome {
  const voltageV = limits.openCircuitVoltageV;
  if (voltageV !== null) {
    return source.minVoltageV <= voltageV && voltageV <= source.maxVoltageV ? 'pass' : 'stop';
  }
  if (source.minVoltageV <= limits.minVoltageV && limits.maxVoltageV <= source.maxVoltageV) {
    return 'pass';
  }
  const touches =
    source.minVoltageV <= limits.maxVoltageV && limits.minVoltageV <= source.maxVoltageV;
  return touches ? 'caution' : 'stop';
}
