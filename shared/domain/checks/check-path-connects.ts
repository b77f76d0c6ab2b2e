import { findPathFault } from './find-path-fault.ts';
import { makeResult } from './make-result.ts';
import type { CheckResult, PlacementFacts } from './types.ts';

/**
 * Is there one path as wired for every cell, each on one panel of the chamber, pairs kept together?
 *
 * @example checkPathConnects(facts).outcome // 'stop' with five paths for six cells
 */
export function checkPathConnects(facts: PlacementFacts): CheckResult {
  const code = 'path-connects';
  const wanted = facts.request.cellCount;
  const otherPath = {
    kind: 'other-path',
    sentence: 'Choose paths that one panel connects.',
    subject: facts.chamber.tag,
  } as const;
  if (facts.paths.length !== wanted) {
    return makeResult(
      code,
      'stop',
      `${wanted} cells need ${wanted} paths; ${facts.paths.length} are chosen in ${facts.chamber.tag}.`,
      { waysOut: [otherPath] },
    );
  }
  for (const path of facts.paths) {
    const fault = findPathFault(path, facts.chamber);
    if (fault !== null) {
      return makeResult(code, 'stop', fault, { waysOut: [otherPath] });
    }
  }
  const panels = [...new Set(facts.paths.map((path) => path.panel.name))];
  return makeResult(
    code,
    'pass',
    wanted === 1 ? 'The path is wired.' : `All ${wanted} paths are wired.`,
    {
      evidence: panels.map((name) => ({ label: 'Panel', value: name, source: name })),
    },
  );
}
