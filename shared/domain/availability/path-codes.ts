import type { CheckCode } from '#shared/domain/checks/types.ts';

/** The rules that channels and positions pass or fail one by one. */
export const pathCodes = [
  'position-fit',
  'source-span',
  'meter-range',
  'source-stability',
  'temperature-current',
  'in-service',
  'calibration-valid',
] as const satisfies readonly CheckCode[];
