import { DateTime } from 'luxon';
import type { SlotRequest } from '#shared/domain/availability/types.ts';
import type { Chamber, Facility, Load, Panel, PhaseSpan } from '#shared/domain/facility/types.ts';
import type { LoadPhase } from '#shared/domain/hold-estimate/types.ts';
import { chamberFaults, isFreeUnit, isStaffed, isVouchedFor, meets } from './brute-lab.ts';
import { buildEstimate } from './build-placement.ts';

// Every quarter hour is tried in every chamber. It knows only facilities whose panels are each of one
// kind, without pairs, and requests that no quality rule touches; that is enough to test earliness.
type Lengths = Partial<Record<LoadPhase, number>>;
const quarterMs = 900_000;
const inner = ['ramp', 'soak', 'match', 'hold', 'measure', 'return'] as const;

export type BruteSlot = {
  readonly startMs: number;
  readonly endMs: number;
  readonly chamberTag: string;
};

/** The lengths of a request on the wiring of one panel, s. */
function lengthsOn(panel: Panel, request: SlotRequest, chamber: Chamber): Lengths {
  const estimate = buildEstimate(request, {
    chamber: { idleTemperatureC: chamber.idleTemperatureC, rampKPerMin: chamber.rampKPerMin },
    wiring: {
      label: panel.name,
      leadResistanceOhm: panel.leadResistanceOhm ?? Number.NaN,
      sourceOutputOhm: 0.01,
      burdenOhm: 10,
      burdenInsideLoop: true,
      meterNoiseA: 1e-8,
      meterResolutionA: 1e-9,
      sampleIntervalS: 1,
    },
  });
  if (estimate.outcome !== 'ok') {
    throw new Error(`The brute search wants lengths; this estimate is ${estimate.outcome}.`);
  }
  return Object.fromEntries(estimate.phases.map(({ phase, safeS }) => [phase, safeS]));
}

function sum(lengths: Lengths): number {
  return Object.values(lengths).reduce((total, length) => total + length, 0);
}

function longest(all: readonly Lengths[]): Lengths {
  const result: Lengths = {};
  for (const lengths of all) {
    for (const phase of ['connect', ...inner, 'unload'] as const) {
      result[phase] = Math.max(result[phase] ?? 0, lengths[phase] ?? 0);
    }
  }
  return result;
}

function quarters(lengthS: number): number {
  return Math.ceil(lengthS / 900) * quarterMs;
}

function stack(startMs: number, lengths: Lengths, chamber: Chamber, setC: number): PhaseSpan[] {
  const idle = chamber.idleTemperatureC;
  const connectedMs = startMs + quarters(lengths.connect ?? 0);
  const phases: PhaseSpan[] = [
    { phase: 'connect', startMs, endMs: connectedMs, setTemperatureC: idle },
  ];
  let cursorMs = connectedMs;
  for (const phase of inner) {
    const lengthMs = (lengths[phase] ?? 0) * 1000;
    if (lengthMs > 0) {
      phases.push({ phase, startMs: cursorMs, endMs: cursorMs + lengthMs, setTemperatureC: setC });
      cursorMs += lengthMs;
    }
  }
  return phases;
}

function mayOpenDoor(
  chamber: Chamber,
  door: { readonly startMs: number; readonly endMs: number },
  joined: Load | null,
): boolean {
  return (
    !chamber.strictDoor ||
    !chamber.loads
      .filter((load) => load.id !== joined?.id && load.state !== 'cancelled')
      .flatMap((load) => load.phases)
      .some(
        (phase) => ['soak', 'match', 'hold', 'measure'].includes(phase.phase) && meets(phase, door),
      )
  );
}

function finish(
  facility: Facility,
  chamber: Chamber,
  stacked: readonly PhaseSpan[],
  unload: { readonly lengthMs: number; readonly horizonMs: number },
): PhaseSpan[] | null {
  const setTemperatureC = chamber.idleTemperatureC;
  const returnedMs = stacked.at(-1)?.endMs ?? Number.NaN;
  const { lengthMs, horizonMs } = unload;
  for (
    let startMs = Math.ceil(returnedMs / quarterMs) * quarterMs;
    startMs + lengthMs <= horizonMs;
    startMs += quarterMs
  ) {
    const door = { startMs, endMs: startMs + lengthMs };
    if (isStaffed(facility, door) && mayOpenDoor(chamber, door, null)) {
      const wait: readonly PhaseSpan[] =
        returnedMs < startMs
          ? [{ phase: 'wait', startMs: returnedMs, endMs: startMs, setTemperatureC }]
          : [];
      return [...stacked, ...wait, { phase: 'unload', ...door, setTemperatureC }];
    }
  }
  return null;
}

function finishJoined(
  facility: Facility,
  chamber: Chamber,
  stacked: readonly PhaseSpan[],
  join: { readonly load: Load; readonly lengthMs: number },
): PhaseSpan[] | null {
  const endMs = join.load.phases.at(-1)?.endMs ?? Number.NaN;
  const door = { startMs: endMs - join.lengthMs, endMs };
  const returnedMs = stacked.at(-1)?.endMs ?? Number.NaN;
  const setTemperatureC = chamber.idleTemperatureC;
  const fits = returnedMs <= door.startMs && isStaffed(facility, door);
  return fits && mayOpenDoor(chamber, door, join.load)
    ? [
        ...stacked,
        { phase: 'wait', startMs: returnedMs, endMs: door.startMs, setTemperatureC },
        { phase: 'unload', ...door, setTemperatureC },
      ]
    : null;
}

type Question = {
  readonly facility: Facility;
  readonly request: SlotRequest;
  readonly horizonMs: number;
};

function freePaths(
  { facility }: Question,
  panels: readonly Panel[],
  slot: { readonly startMs: number; readonly endMs: number },
): number {
  const count = (unitIds: readonly number[], validity: (unitId: number) => boolean): number =>
    unitIds.filter((unitId) => isFreeUnit(facility, unitId, slot) && validity(unitId)).length;
  return panels.reduce((total, panel) => {
    const sources = count(panel.sourceUnitIds, (unitId) =>
      facility.sourceChannels.some(
        (channel) =>
          channel.unitId === unitId &&
          channel.state === 'in-service' &&
          isVouchedFor(channel.validity, slot),
      ),
    );
    const meters = count(panel.meterUnitIds, (unitId) =>
      facility.meterChannels.some(
        (channel) =>
          channel.unitId === unitId && isVouchedFor(channel.ranges[0]?.validity ?? [], slot),
      ),
    );
    return (
      total +
      Math.min(
        sources,
        meters,
        count(panel.positionUnitIds, () => true),
      )
    );
  }, 0);
}

function cellsAtOnce(chamber: Chamber, request: SlotRequest, slot: PhaseSpan[]): number {
  const startMs = slot[0]?.startMs ?? Number.NaN;
  const endMs = slot.at(-1)?.endMs ?? Number.NaN;
  let most = 0;
  for (let atMs = startMs; atMs < endMs; atMs += quarterMs) {
    const inside = chamber.loads
      .filter((load) => load.state !== 'cancelled')
      .filter((load) => load.phases.some((phase) => phase.startMs <= atMs && atMs < phase.endMs))
      .flatMap((load) => load.members)
      .reduce((total, member) => total + member.cells, request.cellCount);
    most = Math.max(most, inside);
  }
  return most;
}

function trySlot(
  question: Question,
  chamber: Chamber,
  start: { readonly startMs: number; readonly join: Load | null },
): PhaseSpan[] | null {
  const { facility, request, horizonMs } = question;
  const { startMs, join } = start;
  const panels = facility.panels
    .filter((panel) => panel.chamberId === chamber.id)
    .map((panel) => ({ panel, lengths: lengthsOn(panel, request, chamber) }))
    .toSorted((first, second) => sum(first.lengths) - sum(second.lengths));
  for (let most = 1; most <= panels.length; most += 1) {
    const allowed = panels.filter(
      ({ lengths }) => sum(lengths) <= sum(panels[most - 1]?.lengths ?? {}),
    );
    const own = longest(allowed.map(({ lengths }) => lengths));
    const cells = (join?.members ?? []).reduce((n, member) => n + member.cells, request.cellCount);
    const door = { connect: 60 * (10 + 3 * cells), unload: 60 * (10 + 3 * cells) };
    const lengths =
      join === null ? own : longest([own, door, ...join.members.map(({ needsS }) => needsS)]);
    const stacked = stack(startMs, lengths, chamber, request.setTemperatureC);
    const lengthMs = quarters(lengths.unload ?? 0);
    const phases =
      join === null
        ? finish(facility, chamber, stacked, { lengthMs, horizonMs })
        : finishJoined(facility, chamber, stacked, { load: join, lengthMs });
    if (phases !== null && isGood(question, chamber, { phases, join, allowed })) {
      return phases;
    }
  }
  return null;
}

function isGood(
  question: Question,
  chamber: Chamber,
  slot: {
    readonly phases: PhaseSpan[];
    readonly join: Load | null;
    readonly allowed: readonly { readonly panel: Panel }[];
  },
): boolean {
  const { facility, request, horizonMs } = question;
  const first = slot.phases[0];
  const last = slot.phases.at(-1);
  if (first === undefined || last === undefined || last.endMs > horizonMs) {
    return false;
  }
  const whole = { startMs: first.startMs, endMs: last.endMs };
  const panels = slot.allowed.map(({ panel }) => panel);
  return (
    isStaffed(facility, first) &&
    isVouchedFor(chamber.validity, whole) &&
    (chamber.unattended.length > 0 || isStaffed(facility, whole)) &&
    cellsAtOnce(chamber, request, slot.phases) <= chamber.maxCells &&
    chamberFaults(chamber, slot.phases, slot.join?.id ?? null).length === 0 &&
    freePaths(question, panels, whole) >= request.cellCount
  );
}

/** For every chamber and site day the earliest valid slot, in order; at most as many as asked. */
export function bruteSearch(
  facility: Facility,
  request: SlotRequest,
  limits: { readonly nowMs: number; readonly horizonMs: number; readonly options: number },
): readonly BruteSlot[] {
  const question = { facility, request, horizonMs: limits.horizonMs };
  const found = new Map<string, BruteSlot>();
  const firstMs = Math.max(limits.nowMs, request.earliestStartMs);
  for (
    let startMs = Math.ceil(firstMs / quarterMs) * quarterMs;
    startMs < limits.horizonMs;
    startMs += quarterMs
  ) {
    for (const chamber of facility.chambers) {
      const day = DateTime.fromMillis(startMs, { zone: facility.calendar.zone }).toISODate() ?? '';
      const key = `${chamber.tag} ${day}`;
      if (found.has(key) || !isStaffed(facility, { startMs, endMs: startMs + quarterMs })) {
        continue;
      }
      const joins = chamber.loads
        .filter(
          (load) =>
            load.state === 'open' &&
            load.phases[0]?.startMs === startMs &&
            startMs > limits.nowMs &&
            load.setTemperatureC === request.setTemperatureC,
        )
        .toSorted((first, second) => first.id - second.id);
      for (const join of [...joins, null]) {
        const phases = trySlot(question, chamber, { startMs, join });
        const endMs = phases?.at(-1)?.endMs;
        if (endMs !== undefined && !found.has(key)) {
          found.set(key, { startMs, endMs, chamberTag: chamber.tag });
        }
      }
    }
  }
  return [...found.values()]
    .toSorted(
      (first, second) =>
        first.startMs - second.startMs ||
        first.endMs - second.endMs ||
        first.chamberTag.localeCompare(second.chamberTag),
    )
    .slice(0, limits.options);
}
