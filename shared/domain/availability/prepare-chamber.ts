import { checkBits } from './check-bits.ts';
import { chooseMeterRange } from './choose-meter-range.ts';
import { estimatePath } from './estimate-path.ts';
import { judgeChamber } from './judge-chamber.ts';
import { longestNeeds } from './longest-needs.ts';
import { needsOfEstimate } from './needs-of-estimate.ts';
import { pathWiring } from './path-wiring.ts';
import type {
  PreparedChamber,
  PreparedMeter,
  PreparedPanel,
  PreparedPosition,
  PreparedSource,
  WiringClass,
} from './prepared.ts';
import type { SlotRequest } from './types.ts';
import { findPositionMisfit } from '#shared/domain/checks/find-position-misfit.ts';
import { findUnknownWiring } from '#shared/domain/checks/find-unknown-wiring.ts';
import { judgeMeterRange } from '#shared/domain/checks/judge-meter-range.ts';
import type { MeasuringNeeds } from '#shared/domain/checks/judge-meter-range.ts';
import { measuringNeeds } from '#shared/domain/checks/measuring-needs.ts';
import { judgeSourceSpan } from '#shared/domain/checks/judge-source-span.ts';
import { judgeSourceStability } from '#shared/domain/checks/judge-source-stability.ts';
import type { CheckCode } from '#shared/domain/checks/types.ts';
import type { Chamber, FacilityIndex, Panel, ServiceState } from '#shared/domain/facility/types.ts';
import type {
  SingleEstimate,
  SlotEstimate,
  TooLongEstimate,
} from '#shared/domain/hold-estimate/types.ts';

export type PrepareInput = {
  readonly index: FacilityIndex;
  readonly request: SlotRequest;
  readonly chamber: Chamber;
  readonly setTemperatureC: number;
};
type Input = PrepareInput & { readonly needs: MeasuringNeeds };
type WithLength = SingleEstimate | TooLongEstimate;
type Numbered<Thing> = { readonly thing: Thing; readonly group: number };

/**
 * Everything about a chamber at one set temperature that does not depend on time: what hangs on
 * which panel, the range each meter would use, what stops a channel or position at any time, and one
 * estimate for each kind of wiring.
 *
 * @param asked.reference estimate at the same set temperature on reference wiring
 * @throws RangeError when the reference estimate names no current
 * @example prepareChamber({ index, request, reference, chamber, setTemperatureC: 45 }).wirings.length // 1 where all paths are alike
 */
export function prepareChamber(
  asked: PrepareInput & { readonly reference: SlotEstimate },
): PreparedChamber {
  const needs = measuringNeeds(asked.request, asked.reference);
  if (needs === null) {
    throw new RangeError('Without a state of charge no path can be prepared; ask for it first.');
  }
  const input = { ...asked, needs };
  const estimates = new Map<string, SlotEstimate>();
  const withoutLength = new Set<string>();
  const drafts = input.index.facility.panels
    .filter((panel) => panel.chamberId === input.chamber.id)
    .toSorted((first, second) => first.name.localeCompare(second.name) || first.id - second.id)
    .map((panel) => draftPanel(input, panel, { estimates, withoutLength }));
  const withLength = [...estimates].filter(
    (entry): entry is [string, WithLength] =>
      entry[1].outcome === 'ok' || entry[1].outcome === 'too-long',
  );
  const ordered = withLength.toSorted(
    ([firstKey, first], [secondKey, second]) =>
      first.safeTotalS - second.safeTotalS || firstKey.localeCompare(secondKey),
  );
  const order = new Map(ordered.map(([key], place) => [key, place]));
  const wired = {
    chamber: input.chamber,
    setTemperatureC: input.setTemperatureC,
    panels: drafts.map(({ keys, ...panel }) => ({
      ...panel,
      wiringOf: keys.map((row) =>
        row.map((cell) => cell.map((key) => (key === null ? -1 : (order.get(key) ?? -1)))),
      ),
    })),
    wirings: accumulate(ordered.map(([, estimate]) => estimate)),
    wiredCount: drafts.reduce((sum, draft) => sum + draft.wiredCount, 0),
    withoutLength: [...withoutLength],
  };
  return { ...wired, ...judgeChamber(input, wired) };
}

function accumulate(estimates: readonly WithLength[]): readonly WiringClass[] {
  return estimates.map((estimate, place) => ({
    estimate,
    needsS: longestNeeds(
      estimates.slice(0, place + 1).map((faster) => needsOfEstimate(faster) ?? {}),
    ),
  }));
}

function draftPanel(
  input: Input,
  panel: Panel,
  memo: { readonly estimates: Map<string, SlotEstimate>; readonly withoutLength: Set<string> },
): Omit<PreparedPanel, 'wiringOf'> & {
  readonly keys: readonly (readonly (readonly (string | null)[])[])[];
  readonly wiredCount: number;
} {
  const sources = listSources(input, panel);
  const meters = listMeters(input, panel);
  const positions = listPositions(input, panel);
  const keys = firstOfEach(sources).map((source) =>
    firstOfEach(meters).map((meter) =>
      firstOfEach(positions).map((position) => {
        const path = { panel, source: source.channel, meter: meter.channel, range: meter.range };
        const unknown = findUnknownWiring(panel, meter.range, meter.channel.tag);
        const wiring = pathWiring(path);
        if (unknown !== null || wiring === null) {
          memo.withoutLength.add(`Nobody recorded ${unknown ?? panel.name}.`);
          return null;
        }
        const { holderFactor } = position.position;
        const key = JSON.stringify([{ ...wiring, label: '' }, holderFactor]);
        const { request, chamber, setTemperatureC } = input;
        const { policy } = input.index.facility;
        const estimate =
          memo.estimates.get(key) ??
          estimatePath({ request, policy, chamber, setTemperatureC, wiring, holderFactor });
        memo.estimates.set(key, estimate);
        if (estimate.outcome !== 'ok' && estimate.outcome !== 'too-long') {
          memo.withoutLength.add(estimate.reason);
        }
        return key;
      }),
    ),
  );
  const wiredCount = Math.min(sources.length, meters.length, positions.length);
  return { panel, sources, meters, positions, keys, wiredCount };
}

/** The first member of every group, in order of the groups' numbers. */
function firstOfEach<Member extends { readonly group: number }>(
  members: readonly Member[],
): readonly Member[] {
  return members.filter(
    (member, place) => members.findIndex((other) => other.group === member.group) === place,
  );
}

function groupBy<Thing>(
  things: readonly Thing[],
  keyOf: (thing: Thing) => string,
): readonly Numbered<Thing>[] {
  const numbers = new Map<string, number>();
  return things.map((thing) => {
    const key = keyOf(thing);
    const group = numbers.get(key) ?? numbers.size;
    numbers.set(key, group);
    return { thing, group };
  });
}

function stopBits(state: ServiceState, codes: readonly (CheckCode | null)[]): number {
  return checkBits([
    ...codes.filter((code) => code !== null),
    ...(state === 'in-service' ? [] : (['in-service'] as const)),
  ]);
}

function listSources(input: Input, panel: Panel): readonly PreparedSource[] {
  const channels = [...new Set(panel.sourceUnitIds)]
    .toSorted((first, second) => first - second)
    .flatMap((unitId) => input.index.sources.get(unitId) ?? []);
  return groupBy(channels, (channel) => String(channel.outputResistanceOhm)).map(
    ({ thing: channel, group }) => ({
      channel,
      group,
      stops: stopBits(channel.state, [
        judgeSourceSpan(channel, input.request.limits) === 'stop' ? 'source-span' : null,
        judgeSourceStability(channel, input.needs).outcome === 'stop' ? 'source-stability' : null,
      ]),
    }),
  );
}

function listMeters(input: Input, panel: Panel): readonly PreparedMeter[] {
  const channels = [...new Set(panel.meterUnitIds)]
    .toSorted((first, second) => first - second)
    .flatMap((unitId) => input.index.meters.get(unitId) ?? [])
    .flatMap((channel) => {
      const range = chooseMeterRange(channel, input.needs);
      return range === null ? [] : [{ channel, range }];
    });
  const figuresOf = (range: PreparedMeter['range']): string =>
    JSON.stringify([
      range.burdenOhm,
      range.burdenInsideLoop,
      range.noiseA,
      range.resolutionA,
      range.sampleIntervalS,
    ]);
  return groupBy(channels, ({ range }) => figuresOf(range)).map(
    ({ thing: { channel, range }, group }) => ({
      channel,
      range,
      group,
      stops: stopBits(channel.state, [
        judgeMeterRange(range, input.needs).outcome === 'stop' ? 'meter-range' : null,
      ]),
    }),
  );
}

function listPositions(input: Input, panel: Panel): readonly PreparedPosition[] {
  const positions = [...new Set(panel.positionUnitIds)]
    .toSorted((first, second) => first - second)
    .flatMap((unitId) => input.index.positions.get(unitId) ?? [])
    .filter((position) => position.chamberId === input.chamber.id);
  return groupBy(positions, (position) => String(position.holderFactor)).map(
    ({ thing: position, group }) => ({
      position,
      group,
      stops: stopBits(position.state, [
        findPositionMisfit(position, input.request) === null ? null : 'position-fit',
      ]),
    }),
  );
}
