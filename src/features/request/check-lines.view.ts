import type { CheckResultDto } from '#shared/contracts/check.schemas.ts';
import { checkRules } from '#shared/domain/checks/check-rules.ts';
import type { SlipLine } from '#src/components/ui/slip.tsx';
import { t } from '#src/texts/t.ts';

const order = { stop: 0, caution: 1, pass: 2 } as const;

/** The lines of a slip: each stop and caution by itself, the passes in one line. */
export function slipLines(checks: readonly CheckResultDto[]): readonly SlipLine[] {
  const told = checks
    .filter((check) => check.outcome !== 'pass')
    .toSorted((a, b) => order[a.outcome] - order[b.outcome]);
  const passes = checks.length - told.length;
  return [
    ...told.map((check): SlipLine => ({
      key: check.code,
      kind: check.outcome,
      title: `${checkRules[check.code].title}.`,
      text: check.sentence,
      code: check.code,
      ways: check.waysOut.map((way) => way.sentence).join(' ') || undefined,
    })),
    ...(passes === 0
      ? []
      : [{ key: 'passes', kind: 'pass', text: t.request.passes(passes) } as const]),
  ];
}

/** How many rules stop a placement; one that a deviation lifts stops nothing. */
export function countStops(checks: readonly CheckResultDto[]): number {
  return checks.filter((check) => check.outcome === 'stop' && check.liftedByDeviationId === null)
    .length;
}
