import { checkRules } from '#shared/domain/checks/check-rules.ts';
import type { CheckResultDto } from '#shared/contracts/check.schemas.ts';
import type { SlipLine } from '#src/components/ui/slip.tsx';
import { t } from '#src/texts/t.ts';

const order = { stop: 0, caution: 1, pass: 2 } as const;

/** Stops first, then cautions, then passes; the order of the rules inside each. */
export function sortChecks(checks: readonly CheckResultDto[]): readonly CheckResultDto[] {
  return [...checks].sort((a, b) => order[a.outcome] - order[b.outcome]);
}

/** The lines of a slip: each stop and caution by itself, the passes in one line. */
export function slipLines(checks: readonly CheckResultDto[]): readonly SlipLine[] {
  const told = sortChecks(checks).filter((check) => check.outcome !== 'pass');
  const passes = checks.length - told.length;
  return [
    ...told.map((check): SlipLine => ({
      key: check.code,
      kind: check.outcome,
      title: `${checkRules[check.code].title}.`,
      text: check.sentence,
      ways:
        check.waysOut.length === 0 ? undefined : check.waysOut.map((way) => way.sentence).join(' '),
    })),
    ...(passes === 0
      ? []
      : [{ key: 'passes', kind: 'pass', text: t.bookings.passes(passes) } as const]),
  ];
}

/** Why a placement cannot be taken, or undefined where it can. */
export function stopReason(checks: readonly CheckResultDto[]): string | undefined {
  const stops = checks.filter(
    (check) => check.outcome === 'stop' && check.liftedByDeviationId === null,
  );
  return stops.length === 0 ? undefined : t.bookings.moveStops(stops.length);
}
