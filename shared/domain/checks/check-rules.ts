import type { CheckCode } from './types.ts';

export type CheckRule = {
  readonly title: string;
  /** Nobody may lift it: double use, path, shared temperature, still phases, and cell safety. */
  readonly isNeverLifted: boolean;
  /** A stop about quality only: for indicative work it is a caution. */
  readonly softensForIndicative: boolean;
};

const physical = { isNeverLifted: true, softensForIndicative: false };
const quality = { isNeverLifted: false, softensForIndicative: true };
const organisation = { isNeverLifted: false, softensForIndicative: false };

/**
 * What each check is called and who may live with its stop. A burden nobody recorded cannot be lifted
 * because no length can be computed without it.
 *
 * @example checkRules['double-use'].isNeverLifted // true
 */
export const checkRules: Readonly<Record<CheckCode, CheckRule>> = {
  'double-use': { title: 'Double use', ...physical },
  'position-fit': { title: 'Position takes the cell', ...physical },
  'path-connects': { title: 'Path connects', ...physical },
  'in-service': { title: 'In service and released', ...organisation },
  'calibration-valid': { title: 'Calibration valid to the end', ...quality },
  'meter-range': { title: 'Meter range', ...quality },
  'source-span': { title: 'Source span', ...organisation },
  'source-stability': { title: 'Source stability', ...quality },
  'burden-known': { title: 'Burden and leads known', ...physical },
  'chamber-span': { title: 'Chamber span', ...physical },
  'shared-temperature': { title: 'Shared temperature', ...physical },
  'still-phase': { title: 'Still phases', ...physical },
  'load-open': { title: 'Load open', ...organisation },
  'stability-logged': { title: 'Stability logged', ...quality },
  'temperature-current': { title: 'Temperature-induced current', ...quality },
  mapping: { title: 'Mapping in date', ...quality },
  'cell-limits': { title: 'Cell limits', ...physical },
  'hazard-protection': { title: 'Chamber protection', ...physical },
  'energy-and-count': { title: 'Energy and count', ...physical },
  unattended: { title: 'Unattended permission', ...physical },
  'cells-received': { title: 'Cells received', ...physical },
  'rest-time': { title: 'Rest', ...quality },
  'working-hours': { title: 'Working hours', ...organisation },
  'slot-length': { title: 'Slot length', ...organisation },
  'needed-by': { title: 'Needed by', ...organisation },
};
