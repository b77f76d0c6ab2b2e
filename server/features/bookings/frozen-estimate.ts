import type { Offer, SlotRequest } from '#shared/domain/availability/types.ts';
import type { PhaseNeeds } from '#shared/domain/availability/needs-of-estimate.ts';
import type { FacilityIndex } from '#shared/domain/facility/types.ts';
import { unplaceable } from './booking-order.ts';

/** The columns of a booking that keep its lengths and what they rest on. */
export function freezeEstimate(input: {
  readonly offer: Offer;
  readonly needsS: PhaseNeeds;
  readonly slotRequest: SlotRequest;
  readonly index: FacilityIndex;
}) {
  const { offer, slotRequest, index } = input;
  const { estimate } = offer;
  if (estimate.outcome !== 'ok' && estimate.outcome !== 'too-long') {
    throw unplaceable('The lot has no single length. Answer the question of its estimate first.');
  }
  const chamber = index.chambers.get(offer.chamberId);
  return {
    likelyS: Math.ceil(estimate.likelyTotalS),
    safeS: Math.ceil(estimate.safeTotalS),
    estimateInputs: {
      slotRequest,
      setTemperatureC: offer.setTemperatureC,
      chamber: {
        tag: offer.chamberTag,
        idleTemperatureC: chamber?.idleTemperatureC ?? null,
        rampKPerMin: chamber?.rampKPerMin ?? null,
      },
      paths: offer.paths.map(({ panel, source, meter, range, position }) => ({
        panel: panel.name,
        leadResistanceOhm: panel.leadResistanceOhm,
        source: source.tag,
        sourceOutputOhm: source.outputResistanceOhm,
        meter: meter.tag,
        range: { ...range, validity: undefined },
        position: position.tag,
        holderFactor: position.holderFactor,
      })),
      policy: index.facility.policy,
    },
    estimateResult: estimate,
    modelVersion: estimate.modelVersion,
    ownPhases: input.needsS,
  };
}
