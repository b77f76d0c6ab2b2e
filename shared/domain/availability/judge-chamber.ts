import { checkBits, foreverStoppingBits } from './check-bits.ts';
import { choosePaths } from './choose-paths.ts';
import { pathCodes } from './path-codes.ts';
import type { PreparedChamber } from './prepared.ts';
import type { SlotRequest } from './types.ts';
import { startOfDayMs } from '#shared/domain/calendar/start-of-day-ms.ts';
import { findCellFault } from '#shared/domain/checks/find-cell-fault.ts';
import type { CheckCode } from '#shared/domain/checks/types.ts';
import type { FacilityIndex } from '#shared/domain/facility/types.ts';

type Judged = 'placeStops' | 'mappedUntilMs' | 'hasEnoughPaths' | 'helpfulCodes';
type JudgeInput = { readonly index: FacilityIndex; readonly request: SlotRequest };

/**
 * What can be said of a prepared chamber before any time is looked at: rules that stop it always,
 * and whether its paths can be enough at best. It only saves looking; the checks decide.
 *
 * @example judgeChamber({ index, request }, wired).hasEnoughPaths // false for 17 cells on 16 paths
 */
export function judgeChamber(
  input: JudgeInput,
  wired: Omit<PreparedChamber, Judged>,
): Pick<PreparedChamber, Judged> {
  const { index, request } = input;
  const { mappingDueOn } = wired.chamber;
  const enough = (lifted: readonly CheckCode[]): boolean => hasEnough(input, wired, lifted);
  const hasEnoughPaths = enough([]);
  return {
    placeStops: checkBits(listPlaceStops(request, wired)),
    mappedUntilMs: mappingDueOn === null ? Infinity : startOfDayMs(index.calendar, mappingDueOn, 1),
    hasEnoughPaths,
    helpfulCodes: hasEnoughPaths ? pathCodes : pathCodes.filter((code) => enough([code])),
  };
}

function listPlaceStops(
  request: SlotRequest,
  wired: Omit<PreparedChamber, Judged>,
): readonly CheckCode[] {
  const { chamber, setTemperatureC } = wired;
  const offK = Math.abs(setTemperatureC - request.setTemperatureC);
  const isReached =
    setTemperatureC >= chamber.minTemperatureC && setTemperatureC <= chamber.maxTemperatureC;
  const rules: readonly (readonly [CheckCode, boolean])[] = [
    ['in-service', chamber.state !== 'in-service'],
    ['chamber-span', !isReached || offK > request.setToleranceK + 1e-9],
    ['cell-limits', findCellFault({ request, chamber, setTemperatureC }) !== null],
    ['hazard-protection', request.limits.hazardLevel > chamber.protectionLevel],
    ['cells-received', request.cellsDamaged],
  ];
  return rules.filter(([, stops]) => stops).map(([code]) => code);
}

function hasEnough(
  input: JudgeInput,
  wired: Omit<PreparedChamber, Judged>,
  lifted: readonly CheckCode[],
): boolean {
  const { index, request } = input;
  const ofTime = checkBits([...lifted, 'in-service', 'calibration-valid']);
  const { paths } = choosePaths({
    index,
    prepared: wired,
    cellCount: request.cellCount,
    span: { startMs: 0, endMs: 0 },
    ignoreBookingId: null,
    wiring: wired.wirings.length - 1,
    stopping: foreverStoppingBits(request) & ~ofTime,
    isDisturbing: () => false,
    ignoreTaken: true,
  });
  return paths.length >= request.cellCount;
}
