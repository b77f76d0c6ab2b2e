import { requireFinite } from './require-finite.ts';
import { requirePositive } from './require-positive.ts';

/**
 * The smallest whole multiple of a step that is not below the value. A value that exceeds a multiple
 * by less than a billionth of the step counts as that multiple, so that 0.1 + 0.2 is not one step more.
 *
 * @param value any unit
 * @param step same unit, > 0
 * @throws RangeError when the value is not finite or the step not above zero
 * @example ceilToStep(61, 60) // 120
 */
export function ceilToStep(value: number, step: number): number {
  requireFinite(value, 'value');
  requirePositive(step, 'step');
  const steps = Math.ceil(value / step - 1e-9);
  return steps === 0 ? 0 : steps * step;
}
