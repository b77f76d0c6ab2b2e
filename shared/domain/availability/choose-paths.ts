import { checkBits } from './check-bits.ts';
import type {
  PreparedChamber,
  PreparedMeter,
  PreparedPanel,
  PreparedPosition,
  PreparedSource,
} from './prepared.ts';
import { covers } from '#shared/domain/checks/covers.ts';
import { findTaken } from '#shared/domain/checks/find-taken.ts';
import type { PathChoice } from '#shared/domain/checks/types.ts';
import type {
  FacilityIndex,
  MeterChannel,
  SourceChannel,
  ValiditySpan,
} from '#shared/domain/facility/types.ts';
import type { Span } from '#shared/domain/intervals/types.ts';

export type ChooseInput = {
  readonly index: FacilityIndex;
  readonly prepared: Pick<PreparedChamber, 'panels'>;
  readonly cellCount: number;
  readonly span: Span;
  readonly ignoreBookingId: number | null;
  /** Slowest wiring that may be used, a place in the chamber's list. */
  readonly wiring: number;
  /** Codes whose stop counts, as bits; of the others a channel may have any. */
  readonly stopping: number;
  /** Is a source's drift together with the chamber too much for the measuring window? */
  readonly isDisturbing: (source: PreparedSource) => boolean;
  /** Units passed over although free; for counting only. */
  readonly ignoreTaken: boolean;
};

const calibration = checkBits(['calibration-valid']);
const service = checkBits(['in-service']);
const disturbance = checkBits(['temperature-current']);

export type ChosenPaths = {
  readonly paths: readonly PathChoice[];
  /** Slowest wiring among them, a place in the chamber's list; -1 where there is no path. */
  readonly slowest: number;
};

/**
 * The paths for a lot over a span, or fewer where not enough are free and able. The choice is
 * deterministic: panels by name, within a panel sources by number, each with its pair or the first
 * unpaired meter, and the first position, that are free, not stopped and wired fast enough.
 *
 * @example choosePaths({ ...facts, cellCount: 6 }).paths.length // 6, or fewer
 */
export function choosePaths(input: ChooseInput): ChosenPaths {
  const state: State = { chosen: [], used: new Set(), slowest: -1 };
  for (const panel of input.prepared.panels) {
    choosePanelPaths(input, panel, state);
    if (state.chosen.length >= input.cellCount) {
      break;
    }
  }
  return { paths: state.chosen, slowest: state.slowest };
}

type State = { readonly chosen: PathChoice[]; readonly used: Set<number>; slowest: number };

function choosePanelPaths(input: ChooseInput, panel: PreparedPanel, state: State): void {
  const { chosen, used } = state;
  const free = usablePanel(input, panel, used);
  for (const source of free.sources) {
    if (chosen.length >= input.cellCount) {
      return;
    }
    const found = findPartners(input, panel, { source, free, used });
    if (found !== null) {
      const { meter, position } = found;
      state.slowest = Math.max(state.slowest, found.wiring);
      for (const unitId of [
        source.channel.unitId,
        meter.channel.unitId,
        position.position.unitId,
      ]) {
        used.add(unitId);
      }
      chosen.push({
        panel: panel.panel,
        source: source.channel,
        meter: meter.channel,
        range: meter.range,
        position: position.position,
      });
    }
  }
}

type Free = {
  readonly sources: readonly PreparedSource[];
  readonly meters: readonly PreparedMeter[];
  readonly positions: readonly PreparedPosition[];
};

function usablePanel(input: ChooseInput, panel: PreparedPanel, used: ReadonlySet<number>): Free {
  const sources = panel.sources.filter(
    (source) =>
      isFree(input, source.channel.unitId, used) &&
      isAble(input, source.channel.unitId, {
        stops: source.stops | (input.isDisturbing(source) ? disturbance : 0),
        validity: source.channel.validity,
      }),
  );
  if (sources.length === 0) {
    return { sources, meters: [], positions: [] };
  }
  return {
    sources,
    meters: panel.meters.filter(
      (meter) =>
        isFree(input, meter.channel.unitId, used) &&
        isAble(input, meter.channel.unitId, { stops: meter.stops, validity: meter.range.validity }),
    ),
    positions: panel.positions.filter(
      (position) =>
        isFree(input, position.position.unitId, used) &&
        isAble(input, position.position.unitId, { stops: position.stops, validity: null }),
    ),
  };
}

type Partners = {
  readonly meter: PreparedMeter;
  readonly position: PreparedPosition;
  readonly wiring: number;
};

function findPartners(
  input: ChooseInput,
  panel: PreparedPanel,
  choice: { readonly source: PreparedSource; readonly free: Free; readonly used: Set<number> },
): Partners | null {
  const { source, free, used } = choice;
  for (const meter of free.meters) {
    if (used.has(meter.channel.unitId) || !belongTogether(source.channel, meter.channel)) {
      continue;
    }
    for (const position of free.positions) {
      const wiring = panel.wiringOf[source.group]?.[meter.group]?.[position.group] ?? -1;
      const isFastEnough = wiring >= 0 && wiring <= input.wiring;
      if (isFastEnough && !used.has(position.position.unitId)) {
        return { meter, position, wiring };
      }
    }
  }
  return null;
}

/** Channels of one instrument that are a pair go together or not at all. */
function belongTogether(source: SourceChannel, meter: MeterChannel): boolean {
  return (
    (source.pairedUnitId === null || source.pairedUnitId === meter.unitId) &&
    (meter.pairedUnitId === null || meter.pairedUnitId === source.unitId)
  );
}

function isFree(input: ChooseInput, unitId: number, used: ReadonlySet<number>): boolean {
  return (
    !used.has(unitId) &&
    (input.ignoreTaken ||
      findTaken(input.index.taken.get(unitId), input.span, input.ignoreBookingId) === null)
  );
}

function isAble(
  input: ChooseInput,
  unitId: number,
  facts: { readonly stops: number; readonly validity: readonly ValiditySpan[] | null },
): boolean {
  const { stopping, span, index } = input;
  if ((facts.stops & stopping) !== 0) {
    return false;
  }
  if ((stopping & service) !== 0) {
    if (findTaken(index.unavailable.get(unitId), span, null) !== null) {
      return false;
    }
  }
  return facts.validity === null || (stopping & calibration) === 0 || covers(facts.validity, span);
}
