import type { CheckCode, CheckOutcome, CheckResult, Evidence, WayOut } from './types.ts';

/**
 * One check's result; what is not said is empty.
 *
 * @example makeResult('needed-by', 'pass', 'No date was asked for.').waysOut // []
 */
export function makeResult(
  code: CheckCode,
  outcome: CheckOutcome,
  sentence: string,
  details: {
    readonly evidence?: readonly Evidence[];
    readonly waysOut?: readonly WayOut[];
    readonly used?: number | null;
  } = {},
): CheckResult {
  return {
    code,
    outcome,
    sentence,
    evidence: details.evidence ?? [],
    waysOut: outcome === 'pass' ? [] : (details.waysOut ?? []),
    used: details.used ?? null,
    liftedByDeviationId: null,
  };
}
