import type { MeterRange } from '#shared/domain/facility/types.ts';
import type { DemoContext } from './demo-context.ts';
import { stamped } from './demo-context.ts';
import { dayMs } from './demo-days.ts';
import type { DemoInstrument, InstrumentPlan, Register } from './instruments.ts';
import type { SiteKey } from './sites.ts';

export type DemoRange = MeterRange;
export type DemoChannel = {
  readonly unitId: number;
  readonly label: string;
  readonly instrument: DemoInstrument;
  readonly sourceOutputOhm: number;
  readonly stabilityVPerH: number;
  readonly ranges: readonly DemoRange[];
};
type SourceFigures = Pick<DemoChannel, 'sourceOutputOhm' | 'stabilityVPerH'>;
const noSource: SourceFigures = { sourceOutputOhm: 0, stabilityVPerH: 0 };

/** A source and a meter channel that stand side by side for a panel to take. */
export type WirePair = { readonly source: DemoChannel; readonly meter: DemoChannel };

const rangeLines = [
  { label: '2 µA', fullScaleA: 2e-6, resolutionA: 1e-11, noiseA: 4e-11, burdenOhm: 10 },
  { label: '20 µA', fullScaleA: 2e-5, resolutionA: 1e-10, noiseA: 3e-10, burdenOhm: 1 },
  { label: '200 µA', fullScaleA: 2e-4, resolutionA: 1e-9, noiseA: 2.5e-9, burdenOhm: 0.1 },
  { label: '2 mA', fullScaleA: 2e-3, resolutionA: 1e-8, noiseA: 2e-8, burdenOhm: 0.02 },
] as const;

/** Sources whose drift is well above the others', in V/h. */
const driftingSources: Readonly<Record<string, number>> = { S04: 4.5e-7, S10: 2e-6, S12: 1.1e-6 };
/** The burden of its widest range was never recorded, so nothing can be booked on that range. */
const unknownBurden = { tag: 'M15', label: '2 mA' };

export function layChannels(
  context: DemoContext,
  register: Register,
): {
  readonly separate: Readonly<Record<SiteKey, readonly WirePair[]>>;
  readonly paired: Readonly<Record<SiteKey, readonly WirePair[]>>;
} {
  const dice = context.diceFor('channels');
  const entered = stamped(context.nowMs - 1110 * dayMs);

  function channel(
    instrument: DemoInstrument,
    label: string,
    use: 'source' | 'measure',
  ): { channelId: number; unitId: number } {
    const channelId = context.number('channels');
    const unitId = context.number('units');
    const instrumentId = instrument.id;
    context.rows.channels.push({ id: channelId, instrumentId, label, function: use, ...entered });
    context.rows.units.push({
      id: unitId,
      kind: use === 'source' ? 'source-channel' : 'meter-channel',
      instrumentId,
      channelId,
    });
    return { channelId, unitId };
  }

  function specifySource(instrument: DemoInstrument): SourceFigures {
    const outputOhm = dice.pick([0.001, 0.002, 0.002]);
    const quiet = Math.round(dice.between(5, 20)) / 1e8;
    const stabilityVPerH = driftingSources[instrument.tag] ?? quiet;
    context.rows.sourceSpecs.push({
      id: context.number('sourceSpecs'),
      instrumentId: instrument.id,
      minV: 0,
      maxV: 6,
      stabilityVPerH,
      noiseV: dice.pick([2e-7, 3e-7, 5e-7]),
      outputOhm,
      tempcoVPerK: dice.pick([5e-7, 8e-7, 1e-6]),
      ...entered,
    });
    return { sourceOutputOhm: outputOhm, stabilityVPerH };
  }

  function specifyRanges(instrument: DemoInstrument): DemoRange[] {
    return rangeLines.map((line) => {
      const isKnown = instrument.tag !== unknownBurden.tag || line.label !== unknownBurden.label;
      const range = {
        ...line,
        id: context.number('meterRanges'),
        burdenOhm: isKnown ? line.burdenOhm : null,
        burdenInsideLoop: isKnown ? true : null,
        sampleIntervalS: 10,
        accuracyPpmReading: 300,
        accuracyPpmRange: 100,
      };
      const instrumentId = instrument.id;
      const accuracyA = line.resolutionA * 2;
      context.rows.meterRanges.push({ ...range, instrumentId, accuracyA, ...entered });
      return { ...range, validity: [] };
    });
  }

  function laySource(plan: InstrumentPlan, count: number): DemoChannel[] {
    const instrument = register.enter(plan);
    const figures = specifySource(instrument);
    return Array.from({ length: count }, (_, index) => {
      const label = `${plan.tag}/${index + 1}`;
      const { unitId } = channel(instrument, label, 'source');
      return { unitId, label, instrument, ...figures, ranges: [] };
    });
  }
  function layMeter(plan: InstrumentPlan, count: number): DemoChannel[] {
    const instrument = register.enter(plan);
    const ranges = specifyRanges(instrument);
    return Array.from({ length: count }, (_, index) => {
      const label = `${plan.tag}/${index + 1}`;
      const { unitId } = channel(instrument, label, 'measure');
      return { unitId, label, instrument, ...noSource, ranges };
    });
  }
  function layPaired(plan: InstrumentPlan, count: number): WirePair[] {
    const instrument = register.enter(plan);
    const figures = specifySource(instrument);
    const ranges = specifyRanges(instrument);
    return Array.from({ length: count }, (_, index) => {
      const [sourceLabel, meterLabel] = [`${plan.tag}/${index + 1}S`, `${plan.tag}/${index + 1}M`];
      const source = channel(instrument, sourceLabel, 'source');
      const meter = channel(instrument, meterLabel, 'measure');
      context.rows.channelPairs.push({
        id: context.number('channelPairs'),
        instrumentId: instrument.id,
        sourceChannelId: source.channelId,
        meterChannelId: meter.channelId,
      });
      return {
        source: { unitId: source.unitId, label: sourceLabel, instrument, ...figures, ranges },
        meter: { unitId: meter.unitId, label: meterLabel, instrument, ...figures, ranges },
      };
    });
  }

  function layBanks(site: SiteKey, from: number, to: number): WirePair[] {
    const sources: DemoChannel[] = [];
    const meters: DemoChannel[] = [];
    for (let index = from; index <= to; index += 1) {
      const digits = String(index).padStart(2, '0');
      const room = roomOfBank(site, index);
      sources.push(
        ...laySource(
          { tag: `S${digits}`, kind: 'source', model: 'precision source, 8 channels', site, room },
          8,
        ),
      );
      meters.push(...layMeter(meterPlan(`M${digits}`, site, room), 8));
    }
    return sources.flatMap((source, index) => {
      const meter = meters[index];
      return meter === undefined ? [] : [{ source, meter }];
    });
  }

  register.enter({
    tag: 'F01',
    kind: 'mainframe',
    model: 'mainframe, 6 slots',
    site: 'larkfen',
    room: 'Room 2',
    firmware: '5.1',
  });
  const larkfen = layBanks('larkfen', 1, 12);
  const otterholm = layBanks('otterholm', 13, 16);
  laySource(
    {
      tag: 'S17',
      kind: 'source',
      model: 'precision source, 8 channels',
      site: 'larkfen',
      room: 'Standards room',
      state: 'awaiting-release',
      note: 'Delivered last week; first calibration is on the bench.',
    },
    4,
  );
  const measureModel = 'source and meter, paired channels';
  const pairPlan = (tag: string, site: SiteKey, room: string): InstrumentPlan => ({
    tag,
    kind: 'source',
    model: measureModel,
    site,
    room,
    firmware: '2.4',
  });
  return {
    separate: { larkfen, otterholm },
    paired: {
      larkfen: layPaired(pairPlan('Q01', 'larkfen', 'Room 1'), 6),
      otterholm: [
        ...layPaired(pairPlan('Q02', 'otterholm', 'Hall A'), 6),
        ...layPaired(pairPlan('Q03', 'otterholm', 'Hall A'), 4),
      ],
    },
  };
}

function roomOfBank(site: SiteKey, index: number): string {
  if (site === 'otterholm') {
    return index <= 14 ? 'Hall A' : 'Hall B';
  }
  if (index <= 2 || index >= 11) {
    return 'Room 1';
  }
  return index >= 7 && index <= 9 ? 'Room 3' : 'Room 2';
}

function meterPlan(tag: string, site: SiteKey, room: string): InstrumentPlan {
  const plan: InstrumentPlan = {
    tag,
    kind: 'meter',
    model: 'microammeter, 8 channels',
    site,
    room,
  };
  if (tag === 'M05' || tag === 'M06') {
    return { ...plan, parentTag: 'F01', note: 'Slot of mainframe F01.' };
  }
  if (tag === 'M11') {
    return {
      ...plan,
      state: 'out-of-service',
      note: 'As found out of tolerance on the 2 µA range.',
    };
  }
  if (tag === 'M15') {
    return {
      ...plan,
      note: 'Burden of the 2 mA range is not in the papers; the maker has been asked.',
    };
  }
  return plan;
}
