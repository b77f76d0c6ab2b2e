import { DateTime } from 'luxon';
import type { Offer, SlotRequest } from '#shared/domain/availability/types.ts';
import type { Chamber, Facility, Load, PhaseSpan } from '#shared/domain/facility/types.ts';

// A second, plain reading of the rules. It shares no code with checks and availability and is slow
// on purpose: every question is asked minute by minute or pair by pair.
type Stretch = { readonly startMs: number; readonly endMs: number };
const quarterMs = 900_000;
const stillNames = ['soak', 'match', 'hold', 'measure'];

export function meets(first: Stretch, second: Stretch): boolean {
  return first.startMs < second.endMs && second.startMs < first.endMs;
}

/** Is somebody at work in every quarter hour of a stretch? Asked of the wall clock itself. */
export function isStaffed(facility: Facility, stretch: Stretch): boolean {
  const { zone, weekly, exceptions } = facility.calendar;
  for (let atMs = stretch.startMs; atMs < stretch.endMs; atMs += quarterMs) {
    const shown = DateTime.fromMillis(atMs, { zone });
    const minute = shown.hour * 60 + shown.minute;
    const exception = exceptions.find(({ day }) => day === shown.toISODate());
    const hours = exception?.hours ?? weekly[shown.weekday] ?? [];
    if (!hours.some(({ fromMin, toMin }) => fromMin <= minute && minute + 15 <= toMin)) {
      return false;
    }
  }
  return true;
}

export function isFreeUnit(facility: Facility, unitId: number, stretch: Stretch): boolean {
  return ![...facility.allocations, ...facility.unavailabilities].some(
    (taken) => taken.unitId === unitId && meets(taken, stretch),
  );
}

/** Valid in every quarter hour of a stretch. */
export function isVouchedFor(validity: readonly Stretch[], stretch: Stretch): boolean {
  for (let atMs = stretch.startMs; atMs < stretch.endMs; atMs += quarterMs) {
    const quarter = { startMs: atMs, endMs: atMs + quarterMs };
    if (!validity.some((span) => span.startMs <= quarter.startMs && quarter.endMs <= span.endMs)) {
      return false;
    }
  }
  return true;
}

function disturbs(phase: PhaseSpan, chamber: Chamber): boolean {
  return (
    phase.phase === 'ramp' ||
    phase.phase === 'return' ||
    (chamber.strictDoor && (phase.phase === 'connect' || phase.phase === 'unload'))
  );
}

/** What is wrong between a slot's phases and the other loads of its chamber. */
export function chamberFaults(
  chamber: Chamber,
  phases: readonly PhaseSpan[],
  joinedLoadId: number | null,
): readonly string[] {
  const faults: string[] = [];
  for (const load of chamber.loads) {
    if (load.id === joinedLoadId || load.state === 'cancelled') {
      continue;
    }
    for (const own of phases) {
      for (const other of load.phases.filter((phase) => meets(phase, own))) {
        if (own.setTemperatureC !== other.setTemperatureC) {
          faults.push(`two temperatures: ${own.phase} and ${other.phase} of load ${load.id}`);
        }
        const isDisturbed =
          (stillNames.includes(own.phase) && disturbs(other, chamber)) ||
          (stillNames.includes(other.phase) && disturbs(own, chamber));
        if (isDisturbed) {
          faults.push(`disturbed: ${own.phase} and ${other.phase} of load ${load.id}`);
        }
      }
    }
  }
  return faults;
}

function phaseFaults(facility: Facility, offer: Offer): readonly string[] {
  const faults: string[] = [];
  const { phases } = offer;
  phases.forEach((phase, place) => {
    const next = phases[place + 1];
    if (phase.endMs <= phase.startMs || (next !== undefined && next.startMs !== phase.endMs)) {
      faults.push(`${phase.phase} is empty or does not lead to the next`);
    }
    const isDoor = phase.phase === 'connect' || phase.phase === 'unload';
    if (isDoor && !isStaffed(facility, phase)) {
      faults.push(`${phase.phase} outside working hours`);
    }
    if (isDoor && (phase.startMs % quarterMs !== 0 || phase.endMs % quarterMs !== 0)) {
      faults.push(`${phase.phase} off the grid`);
    }
    if ((phase.endMs - phase.startMs) % 60_000 !== 0) {
      faults.push(`${phase.phase} is not whole minutes`);
    }
  });
  const isFramed = phases[0]?.phase === 'connect' && phases.at(-1)?.phase === 'unload';
  return isFramed ? faults : [...faults, 'does not begin with connect and end with unload'];
}

function pathFaults(facility: Facility, request: SlotRequest, offer: Offer): readonly string[] {
  const faults: string[] = [];
  const units = offer.paths.flatMap((path) => [path.source, path.meter, path.position]);
  if (offer.paths.length !== request.cellCount) {
    faults.push('not one path for every cell');
  }
  if (new Set(units.map(({ unitId }) => unitId)).size !== units.length) {
    faults.push('a unit is used twice');
  }
  for (const unit of units) {
    if (!isFreeUnit(facility, unit.unitId, offer) || unit.state !== 'in-service') {
      faults.push(`${unit.tag} is not free`);
    }
  }
  return [...faults, ...offer.paths.flatMap((path) => wiringFaults(path, offer))];
}

function wiringFaults(
  { panel, source, meter, range, position }: Offer['paths'][number],
  offer: Offer,
): readonly string[] {
  const faults: string[] = [];
  const isWired =
    panel.chamberId === offer.chamberId &&
    position.chamberId === offer.chamberId &&
    panel.sourceUnitIds.includes(source.unitId) &&
    panel.meterUnitIds.includes(meter.unitId) &&
    panel.positionUnitIds.includes(position.unitId);
  const isPaired =
    (source.pairedUnitId ?? meter.unitId) === meter.unitId &&
    (meter.pairedUnitId ?? source.unitId) === source.unitId;
  if (!isWired || !isPaired) {
    faults.push(`${position.tag} is not wired`);
  }
  if (!isVouchedFor(source.validity, offer) || !isVouchedFor(range.validity, offer)) {
    faults.push(`${source.tag} or ${meter.tag} is not in calibration to the end`);
  }
  return faults;
}

function joinFaults(load: Load, offer: Offer): readonly string[] {
  const faults: string[] = [];
  if (load.state !== 'open') {
    faults.push('the load is not open');
  }
  if (load.phases[0]?.startMs !== offer.startMs || load.phases.at(-1)?.endMs !== offer.endMs) {
    faults.push('joining moves the load');
  }
  for (const member of load.members) {
    for (const [name, neededS] of Object.entries(member.needsS)) {
      const phase = offer.phases.find((candidate) => candidate.phase === name);
      const lengthS = phase === undefined ? 0 : (phase.endMs - phase.startMs) / 1000;
      if (lengthS < neededS) {
        faults.push(`${name} is too short for booking ${member.bookingId}`);
      }
    }
  }
  return faults;
}

/** Everything that is wrong with an offer; empty where it is right. */
export function offerFaults(
  facility: Facility,
  request: SlotRequest,
  offer: Offer,
  limits: { readonly nowMs: number; readonly horizonMs: number },
): readonly string[] {
  const chamber = facility.chambers.find(({ id }) => id === offer.chamberId);
  if (chamber === undefined) {
    return ['no such chamber'];
  }
  const faults = [
    ...phaseFaults(facility, offer),
    ...pathFaults(facility, request, offer),
    ...chamberFaults(chamber, offer.phases, offer.joinsLoadId),
  ];
  const joined = chamber.loads.find(({ id }) => id === offer.joinsLoadId);
  if (joined !== undefined) {
    faults.push(...joinFaults(joined, offer));
  }
  if (offer.startMs < limits.nowMs || offer.startMs < request.earliestStartMs) {
    faults.push('starts too early');
  }
  if (offer.endMs > limits.horizonMs) {
    faults.push('ends after the horizon');
  }
  if (Math.abs(offer.setTemperatureC - request.setTemperatureC) > request.setToleranceK + 1e-9) {
    faults.push('wrong temperature');
  }
  if (!isVouchedFor(chamber.validity, offer)) {
    faults.push('the chamber is not in calibration to the end');
  }
  if (chamber.unattended.length === 0 && !isStaffed(facility, offer)) {
    faults.push('runs unattended without permission');
  }
  return faults;
}
