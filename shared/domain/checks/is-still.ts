import type { LoadPhase } from '#shared/domain/hold-estimate/types.ts';

/**
 * Does a phase need the chamber still (true), disturb it (false), or neither (null)? Ramp and return
 * always disturb; a door (connect, unload) disturbs only where the door rule is strict.
 *
 * @example isStill('connect', false) // null
 */
export function isStill(phase: LoadPhase, isStrict: boolean): boolean | null {
  switch (phase) {
    case 'soak':
    case 'match':
    case 'hold':
    case 'measure':
      return true;
    case 'ramp':
    case 'return':
      return false;
    case 'connect':
    case 'unload':
      return isStrict ? false : null;
    case 'wait':
      return null;
  }
}
