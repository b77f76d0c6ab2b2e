import type { Candidate, LaidOut, SearchContext } from './candidate.ts';
import { layOutJoinedLoad } from './lay-out-joined-load.ts';
import { layOutLoad } from './lay-out-load.ts';
import type { WiringClass } from './prepared.ts';
import { findStillClash } from '#shared/domain/checks/find-still-clash.ts';
import { findTemperatureClash } from '#shared/domain/checks/find-temperature-clash.ts';
import { otherLoads } from '#shared/domain/checks/other-loads.ts';
import type { PlacementFacts } from '#shared/domain/checks/types.ts';
import type { Load, PhaseSpan } from '#shared/domain/facility/types.ts';
import type { Span } from '#shared/domain/intervals/types.ts';

/**
 * Lays a candidate out with one kind of wiring (and all faster ones), without paths.
 *
 * @param place of the wiring in the chamber's list
 * @example layOutCandidate(context, candidate, 0).kind // 'laid-out'
 */
export function layOutCandidate(
  context: SearchContext,
  candidate: Candidate,
  place: number,
): LaidOut {
  const { prepared, joins } = candidate;
  const { chamber } = prepared;
  const { ignoreBookingId } = context;
  const wiring = prepared.wirings[place];
  if (wiring === undefined) {
    return { kind: 'no-time' };
  }
  const others = otherLoads({ chamber, joins, ignoreBookingId });
  const phases = layOut(context, candidate, { wiring, others });
  const span = phases === null ? null : spanOf(phases);
  if (phases === null || span === null || span.endMs > context.horizonMs) {
    return { kind: 'no-time' };
  }
  const facts = makeFacts(context, candidate, { phases, wiring, span });
  const code = findClash(facts, others);
  return code === null ? { kind: 'laid-out', facts } : { kind: 'clash', facts, code };
}

function spanOf(phases: readonly PhaseSpan[]): Span | null {
  const first = phases[0];
  const last = phases.at(-1);
  return first === undefined || last === undefined
    ? null
    : { startMs: first.startMs, endMs: last.endMs };
}

function findClash(
  facts: PlacementFacts,
  others: readonly Load[],
): 'shared-temperature' | 'still-phase' | null {
  if (findTemperatureClash(facts.phases, others) !== null) {
    return 'shared-temperature';
  }
  const isClash = findStillClash(facts.phases, others, facts.chamber.strictDoor) !== null;
  return isClash ? 'still-phase' : null;
}

function layOut(
  context: SearchContext,
  candidate: Candidate,
  input: { readonly wiring: WiringClass; readonly others: readonly Load[] },
): readonly PhaseSpan[] | null {
  const { prepared, joins, startMs } = candidate;
  const { chamber, setTemperatureC } = prepared;
  const { calendar, facility } = context.index;
  const { others } = input;
  const { needsS } = input.wiring;
  if (joins === null) {
    const untilMs = context.horizonMs;
    return layOutLoad({ calendar, chamber, others, startMs, needsS, setTemperatureC, untilMs });
  }
  return layOutJoinedLoad({
    calendar,
    policy: facility.policy,
    chamber,
    load: joins,
    others,
    needsS,
    cellCount: context.request.cellCount,
    ignoreBookingId: context.ignoreBookingId,
  });
}

function makeFacts(
  context: SearchContext,
  candidate: Candidate,
  input: {
    readonly phases: readonly PhaseSpan[];
    readonly wiring: WiringClass;
    readonly span: Span;
  },
): PlacementFacts {
  return {
    facility: context.index.facility,
    index: context.index,
    request: context.request,
    chamber: candidate.prepared.chamber,
    joins: candidate.joins,
    paths: [],
    phases: input.phases,
    span: input.span,
    setTemperatureC: candidate.prepared.setTemperatureC,
    estimate: input.wiring.estimate,
    nowMs: context.nowMs,
    ignoreBookingId: context.ignoreBookingId,
  };
}
