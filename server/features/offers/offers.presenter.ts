import type { CheckResultDto, PathDto, Placement } from '#shared/contracts/check.schemas.ts';
import type { SlotEstimateDto } from '#shared/contracts/estimate.schemas.ts';
import { slotEstimateSchema } from '#shared/contracts/estimate.schemas.ts';
import type { OfferDto } from '#shared/contracts/offers.contract.ts';
import type { Offer } from '#shared/domain/availability/types.ts';
import type { CalendarIndex } from '#shared/domain/calendar/types.ts';
import type { CheckResult, PathChoice } from '#shared/domain/checks/types.ts';
import type { SlotEstimate } from '#shared/domain/hold-estimate/types.ts';
import { remarkOn } from './offer-remark.ts';

export function presentOffer(
  offer: Offer,
  calendar: CalendarIndex,
  neededByMs: number | null,
): OfferDto {
  const startAt = new Date(offer.startMs).toISOString();
  return {
    placement: placementOf(offer),
    startAt,
    endAt: new Date(offer.endMs).toISOString(),
    chamberTag: offer.chamberTag,
    joinsLoadId: offer.joinsLoadId,
    setTemperatureC: offer.setTemperatureC,
    paths: offer.paths.map(presentPath),
    phases: offer.phases.map((phase) => ({
      phase: phase.phase,
      startAt: new Date(phase.startMs).toISOString(),
      endAt: new Date(phase.endMs).toISOString(),
      setTemperatureC: phase.setTemperatureC,
    })),
    waitS: offer.waitS,
    estimate: presentEstimate(offer.estimate),
    checks: offer.checks.map(presentCheck),
    remark: remarkOn(offer, calendar, neededByMs),
  };
}

/** What a caller sends back to name this very slot. */
export function placementOf(offer: Offer): Placement {
  return {
    chamberTag: offer.chamberTag,
    startAt: new Date(offer.startMs).toISOString(),
    setTemperatureC: offer.setTemperatureC,
    joinsLoadId: offer.joinsLoadId,
    paths: offer.paths.map(({ panel, source, meter, range, position }) => ({
      panelId: panel.id,
      sourceUnitId: source.unitId,
      meterUnitId: meter.unitId,
      meterRangeId: range.id,
      positionUnitId: position.unitId,
    })),
  };
}

function presentPath({ panel, source, meter, range, position }: PathChoice): PathDto {
  return {
    panelId: panel.id,
    panelName: panel.name,
    sourceUnitId: source.unitId,
    sourceTag: source.tag,
    meterUnitId: meter.unitId,
    meterTag: meter.tag,
    meterRangeId: range.id,
    meterRangeLabel: range.label,
    positionUnitId: position.unitId,
    positionTag: position.tag,
  };
}

export function presentCheck(check: CheckResult): CheckResultDto {
  return {
    ...check,
    evidence: check.evidence.map((entry) => ({ ...entry })),
    waysOut: check.waysOut.map((way) => ({ ...way })),
  };
}

export function presentEstimate(estimate: SlotEstimate): SlotEstimateDto {
  return slotEstimateSchema.parse(estimate);
}
