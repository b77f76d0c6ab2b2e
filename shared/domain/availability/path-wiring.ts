import type {
  MeterChannel,
  MeterRange,
  Panel,
  SourceChannel,
} from '#shared/domain/facility/types.ts';
import type { Wiring } from '#shared/domain/hold-estimate/types.ts';

/**
 * The electrical figures of a path as wired; null where the panel's leads were never recorded.
 *
 * @example pathWiring({ panel, source, meter, range })?.leadResistanceOhm
 */
export function pathWiring(path: {
  readonly panel: Pick<Panel, 'name' | 'leadResistanceOhm'>;
  readonly source: Pick<SourceChannel, 'tag' | 'outputResistanceOhm'>;
  readonly meter: Pick<MeterChannel, 'tag'>;
  readonly range: MeterRange;
}): Wiring | null {
  const { panel, source, meter, range } = path;
  if (panel.leadResistanceOhm === null) {
    return null;
  }
  return {
    label: `${source.tag} and ${meter.tag} on ${panel.name}`,
    leadResistanceOhm: panel.leadResistanceOhm,
    sourceOutputOhm: source.outputResistanceOhm,
    burdenOhm: range.burdenOhm,
    burdenInsideLoop: range.burdenInsideLoop,
    meterNoiseA: range.noiseA,
    meterResolutionA: range.resolutionA,
    sampleIntervalS: range.sampleIntervalS,
  };
}
