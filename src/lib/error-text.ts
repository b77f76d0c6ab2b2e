import { t } from '#src/texts/t.ts';
import { isProblem } from './problem.ts';

/** The sentence to show for a failed change; undefined where nothing failed. */
export function errorText(error: unknown): string | undefined {
  if (error === null || error === undefined) {
    return undefined;
  }
  return isProblem(error) ? error.document.detail : t.ui.failedTitle;
}
