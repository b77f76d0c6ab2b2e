import { judgeSourceSpan } from './judge-source-span.ts';
import { makeResult } from './make-result.ts';
import type { CheckResult, PlacementFacts } from './types.ts';

/**
 * Can every source reach the cell's voltage?
 *
 * @example checkSourceSpan(facts).outcome // 'stop' for a 2 V source and a 3.7 V cell
 */
export function checkSourceSpan(facts: PlacementFacts): CheckResult {
  const { limits } = facts.request;
  const wanted =
    limits.openCircuitVoltageV === null
      ? `${limits.minVoltageV} to ${limits.maxVoltageV} V`
      : `${limits.openCircuitVoltageV} V`;
  const judged = facts.paths.map(({ source }) => ({
    source,
    outcome: judgeSourceSpan(source, limits),
  }));
  const worst =
    judged.find(({ outcome }) => outcome === 'stop') ??
    judged.find(({ outcome }) => outcome === 'caution');
  if (worst === undefined) {
    return makeResult('source-span', 'pass', `The sources reach ${wanted}.`);
  }
  const { source, outcome } = worst;
  const spans = `${source.tag} spans ${source.minVoltageV} to ${source.maxVoltageV} V`;
  return makeResult(
    'source-span',
    outcome,
    outcome === 'stop'
      ? `${spans}; the cell is held at ${wanted}.`
      : `${spans}, a part of ${wanted}; state the cell's open-circuit voltage.`,
    {
      evidence: [
        {
          label: 'Span',
          value: `${source.minVoltageV} to ${source.maxVoltageV} V`,
          source: source.tag,
        },
      ],
      waysOut: [{ kind: 'other-path', sentence: 'Choose another source.', subject: source.tag }],
    },
  );
}
