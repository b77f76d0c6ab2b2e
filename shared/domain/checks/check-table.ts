import { checkBurdenKnown } from './check-burden-known.ts';
import { checkCalibrationValid } from './check-calibration-valid.ts';
import { checkCellLimits } from './check-cell-limits.ts';
import { checkCellsReceived } from './check-cells-received.ts';
import { checkChamberSpan } from './check-chamber-span.ts';
import { checkDoubleUse } from './check-double-use.ts';
import { checkEnergyAndCount } from './check-energy-and-count.ts';
import { checkHazardProtection } from './check-hazard-protection.ts';
import { checkInService } from './check-in-service.ts';
import { checkLoadOpen } from './check-load-open.ts';
import { checkMapping } from './check-mapping.ts';
import { checkMeterRange } from './check-meter-range.ts';
import { checkNeededBy } from './check-needed-by.ts';
import { checkPathConnects } from './check-path-connects.ts';
import { checkPositionFit } from './check-position-fit.ts';
import { checkRestTime } from './check-rest-time.ts';
import { checkSharedTemperature } from './check-shared-temperature.ts';
import { checkSlotLength } from './check-slot-length.ts';
import { checkSourceSpan } from './check-source-span.ts';
import { checkSourceStability } from './check-source-stability.ts';
import { checkStabilityLogged } from './check-stability-logged.ts';
import { checkStillPhase } from './check-still-phase.ts';
import { checkTemperatureCurrent } from './check-temperature-current.ts';
import { checkUnattended } from './check-unattended.ts';
import { checkWorkingHours } from './check-working-hours.ts';
import type { CheckCode, CheckResult, PlacementFacts } from './types.ts';

/**
 * Every check by its code; a code without a check does not compile.
 *
 * @example checkTable['needed-by'](facts).outcome
 */
export const checkTable: Readonly<Record<CheckCode, (facts: PlacementFacts) => CheckResult>> = {
  'double-use': checkDoubleUse,
  'position-fit': checkPositionFit,
  'path-connects': checkPathConnects,
  'in-service': checkInService,
  'calibration-valid': checkCalibrationValid,
  'meter-range': checkMeterRange,
  'source-span': checkSourceSpan,
  'source-stability': checkSourceStability,
  'burden-known': checkBurdenKnown,
  'chamber-span': checkChamberSpan,
  'shared-temperature': checkSharedTemperature,
  'still-phase': checkStillPhase,
  'load-open': checkLoadOpen,
  'stability-logged': checkStabilityLogged,
  'temperature-current': checkTemperatureCurrent,
  mapping: checkMapping,
  'cell-limits': checkCellLimits,
  'hazard-protection': checkHazardProtection,
  'energy-and-count': checkEnergyAndCount,
  unattended: checkUnattended,
  'cells-received': checkCellsReceived,
  'rest-time': checkRestTime,
  'working-hours': checkWorkingHours,
  'slot-length': checkSlotLength,
  'needed-by': checkNeededBy,
};
