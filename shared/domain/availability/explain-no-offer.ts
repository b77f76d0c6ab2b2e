import type { Candidate, SearchContext } from './candidate.ts';
import { checkBits } from './check-bits.ts';
import { choosePaths } from './choose-paths.ts';
import { disturbanceTest } from './disturbance-test.ts';
import { layOutCandidate } from './lay-out-candidate.ts';
import { pathCodes } from './path-codes.ts';
import type { PreparedChamber } from './prepared.ts';
import { takePaths } from './take-paths.ts';
import type { NoOfferReason } from './types.ts';
import { firstStop } from '#shared/domain/checks/first-stop.ts';
import { checkCodes } from '#shared/domain/checks/types.ts';
import type { CheckCode, PlacementFacts } from '#shared/domain/checks/types.ts';
import { formatList } from '#shared/domain/checks/words/format-list.ts';

type Reason = Pick<NoOfferReason, 'code' | 'sentence'>;

const placeOnly = checkCodes.filter(
  (code) =>
    code !== 'double-use' && code !== 'path-connects' && !pathCodes.some((path) => path === code),
);

/**
 * Why there is no offer: for every candidate looked at the first rule that stops it, counted, the
 * most frequent first, each with a sentence for one example and the chambers it holds in.
 *
 * @param candidates a sample over chambers and days
 * @example explainNoOffer(context, candidates, chambers)[0]?.code // 'unattended'
 */
export function explainNoOffer(
  context: SearchContext,
  candidates: Iterable<Candidate>,
  chambers: readonly PreparedChamber[],
): readonly NoOfferReason[] {
  const found = new Map<string, { reason: Reason; count: number; chambers: Set<string> }>();
  const note = (reason: Reason, tag: string): void => {
    const entry = found.get(reason.code) ?? { reason, count: 0, chambers: new Set<string>() };
    entry.count += 1;
    entry.chambers.add(tag);
    found.set(reason.code, entry);
  };
  for (const candidate of candidates) {
    note(explainCandidate(context, candidate), candidate.prepared.chamber.tag);
  }
  if (found.size === 0) {
    for (const prepared of chambers) {
      note(explainWiring(context, prepared) ?? noTime(prepared), prepared.chamber.tag);
    }
  }
  return [...found.values()]
    .toSorted((first, second) => second.count - first.count)
    .map(({ reason, chambers: tags }) => ({ ...reason, chambers: [...tags].toSorted() }));
}

function noTime(prepared: PreparedChamber): Reason {
  return {
    code: 'no-time',
    sentence: `Nothing as long as this ends in ${prepared.chamber.tag} before the time that can be booked is over.`,
  };
}

function explainWiring(context: SearchContext, prepared: PreparedChamber): Reason | null {
  const { cellCount } = context.request;
  const { tag } = prepared.chamber;
  if (prepared.wiredCount < cellCount) {
    return {
      code: 'no-path',
      sentence: `${cellCount} cells need ${cellCount} paths; ${tag} has ${prepared.wiredCount} wired.`,
    };
  }
  if (prepared.wirings.length > 0) {
    return null;
  }
  const why = formatList(prepared.withoutLength);
  return { code: 'burden-known', sentence: `No path in ${tag} has a length: ${why}` };
}

function explainCandidate(context: SearchContext, candidate: Candidate): Reason {
  const { prepared } = candidate;
  const unwired = explainWiring(context, prepared);
  if (unwired !== null) {
    return unwired;
  }
  const wiring = prepared.wirings.length - 1;
  const laid = layOutCandidate(context, candidate, wiring);
  if (laid.kind === 'no-time') {
    return noTime(prepared);
  }
  const { facts } = laid;
  const stop = firstStop(facts, laid.kind === 'clash' ? [laid.code] : placeOnly);
  if (stop !== null) {
    return { code: stop.code, sentence: stop.sentence };
  }
  const placed = takePaths(context, candidate, { facts, wiring, lifted: 0 });
  return placed === null
    ? explainShortage(context, candidate, facts)
    : explainStop(placed, prepared);
}

function explainStop(facts: PlacementFacts, prepared: PreparedChamber): Reason {
  const stop = firstStop(facts);
  return stop === null ? noTime(prepared) : { code: stop.code, sentence: stop.sentence };
}

/** Adds the rules about paths one by one and blames the first that leaves too few. */
function explainShortage(
  context: SearchContext,
  candidate: Candidate,
  facts: PlacementFacts,
): Reason {
  const { prepared } = candidate;
  const { cellCount } = context.request;
  const { tag } = prepared.chamber;
  const stopping = context.stopping(facts.span.endMs);
  let applied = 0;
  for (const code of pathCodes) {
    applied |= checkBits([code]) & stopping;
    const { paths } = choosePaths({
      index: context.index,
      prepared,
      cellCount,
      span: facts.span,
      ignoreBookingId: context.ignoreBookingId,
      wiring: prepared.wirings.length - 1,
      stopping: applied,
      isDisturbing: disturbanceTest(context, facts),
      ignoreTaken: true,
    });
    if (paths.length < cellCount) {
      return explainUnable(context, candidate, { code, facts, count: paths.length });
    }
  }
  return {
    code: 'double-use',
    sentence: `Fewer than ${cellCount} paths of ${tag} are free together for so long.`,
  };
}

function explainUnable(
  context: SearchContext,
  candidate: Candidate,
  found: { readonly code: CheckCode; readonly facts: PlacementFacts; readonly count: number },
): Reason {
  const { cellCount } = context.request;
  const wiring = candidate.prepared.wirings.length - 1;
  const lifted = checkBits([found.code]);
  const placed = takePaths(context, candidate, { facts: found.facts, wiring, lifted });
  const example = placed === null ? null : firstStop(placed, [found.code]);
  const count = `${found.count} of ${cellCount} paths in ${candidate.prepared.chamber.tag} are left.`;
  return {
    code: found.code,
    sentence: example === null ? `After this rule only ${count}` : example.sentence,
  };
}
