import { findUnknownWiring } from './find-unknown-wiring.ts';
import { makeResult } from './make-result.ts';
import type { CheckResult, PlacementFacts } from './types.ts';
import { formatFigure } from './words/format-figure.ts';

/**
 * Are leads and burden of every path recorded? Without them no length can be computed. A burden
 * outside the sense loop is named as evidence, because it makes the slot long.
 *
 * @example checkBurdenKnown(facts).outcome // 'stop' where a panel's leads were never measured
 */
export function checkBurdenKnown(facts: PlacementFacts): CheckResult {
  const code = 'burden-known';
  for (const { panel, range, meter } of facts.paths) {
    const unknown = findUnknownWiring(panel, range, meter.tag);
    if (unknown !== null) {
      return makeResult(code, 'stop', `Nobody recorded ${unknown}; no length can be computed.`, {
        waysOut: [
          {
            kind: 'other-path',
            sentence: 'Choose a path whose wiring is known.',
            subject: meter.tag,
          },
        ],
      });
    }
  }
  const evidence = facts.paths.map(({ panel, range, meter }) => ({
    label: `${panel.name} and ${meter.tag}`,
    value: `leads ${formatFigure(panel.leadResistanceOhm ?? 0)} Ω, burden ${formatFigure(range.burdenOhm ?? 0)} Ω ${range.burdenInsideLoop === true ? 'inside' : 'outside'} the sense loop`,
    source: meter.instrumentTag,
  }));
  return makeResult(code, 'pass', 'Leads and burden of every path are recorded.', { evidence });
}
