import { estimatePath } from './estimate-path.ts';
import type { SlotRequest } from './types.ts';
import type { Chamber, Facility } from '#shared/domain/facility/types.ts';
import type { SlotEstimate } from '#shared/domain/hold-estimate/types.ts';

/**
 * The estimate of a request on the site's reference wiring: its leads, and a meter whose burden lies
 * inside the sense loop. What current is expected and allowed does not depend on the wiring.
 *
 * @example referenceEstimate({ facility, request, chamber, setTemperatureC: 45 }).outcome // 'ok'
 */
export function referenceEstimate(input: {
  readonly facility: Pick<Facility, 'policy' | 'siteName'>;
  readonly request: SlotRequest;
  readonly chamber: Pick<Chamber, 'idleTemperatureC' | 'rampKPerMin'>;
  readonly setTemperatureC: number;
}): SlotEstimate {
  const { policy, siteName } = input.facility;
  return estimatePath({
    request: input.request,
    policy,
    chamber: input.chamber,
    setTemperatureC: input.setTemperatureC,
    holderFactor: 1,
    wiring: {
      label: `reference wiring of ${siteName}`,
      leadResistanceOhm: policy.referenceLeadResistanceOhm,
      sourceOutputOhm: 0,
      burdenOhm: 0,
      burdenInsideLoop: true,
      meterNoiseA: 1e-9,
      meterResolutionA: 1e-10,
      sampleIntervalS: 1,
    },
  });
}
