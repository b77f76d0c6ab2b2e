import type { ProblemCode } from '#shared/contracts/problems.ts';
import { errorText } from '#src/lib/error-text.ts';
import { isProblem } from '#src/lib/problem.ts';
import { t } from '#src/texts/t.ts';

/** What helps after a refusal; the page has fetched everything anew by then. */
const next: Partial<Record<ProblemCode, string>> = {
  'booking.clash': t.request.after.taken,
  'booking.checks': t.request.after.checks,
  'offer.expired': t.request.after.expired,
  'version.stale': t.request.after.stale,
};

/** Why it did not work and what to do about it; undefined where nothing failed. */
export function refusalText(error: unknown): string | undefined {
  const said = errorText(error);
  if (said === undefined || !isProblem(error)) {
    return said;
  }
  const hint = next[error.document.code];
  return hint === undefined ? said : `${said} ${hint}`;
}
