import type { CheckOutcome, CheckResult } from './types.ts';

export type CheckSummary = {
  readonly outcome: CheckOutcome;
  readonly stops: readonly CheckResult[];
  readonly cautions: readonly CheckResult[];
  readonly passes: readonly CheckResult[];
  /** The check that uses most of its limit; null where none has a measure. */
  readonly tightest: CheckResult | null;
};

/**
 * All checks of a placement in one word, sorted by outcome, and the tightest of them.
 *
 * @example summarise([]).outcome // 'pass'
 */
export function summarise(results: readonly CheckResult[]): CheckSummary {
  const stops = results.filter(({ outcome }) => outcome === 'stop');
  const cautions = results.filter(({ outcome }) => outcome === 'caution');
  const measured = results.filter(({ used }) => used !== null);
  const tightest = measured.reduce<CheckResult | null>(
    (best, result) => (best === null || (result.used ?? 0) > (best.used ?? 0) ? result : best),
    null,
  );
  return {
    outcome: stops.length > 0 ? 'stop' : cautions.length > 0 ? 'caution' : 'pass',
    stops,
    cautions,
    passes: results.filter(({ outcome }) => outcome === 'pass'),
    tightest,
  };
}
