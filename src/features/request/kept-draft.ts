import { z } from 'zod';
import { requestDraftSchema } from './request-draft.view.ts';

/** What was typed, and on which version of the request; 0 for one that is not saved yet. */
const keptSchema = z.object({ version: z.int().min(0), draft: requestDraftSchema });
export type Kept = z.infer<typeof keptSchema>;

/**
 * What is kept in this window under the key; null where there is nothing, or nothing of the present
 * form: an older program may have written it.
 */
export function readKept(key: string): Kept | null {
  try {
    const parsed = keptSchema.safeParse(JSON.parse(sessionStorage.getItem(key) ?? 'null'));
    return parsed.success ? parsed.data : null;
  } catch (error) {
    if (error instanceof SyntaxError || error instanceof DOMException) {
      return null;
    }
    throw error;
  }
}

/** False where the browser keeps nothing: the form then lives as long as the page. */
export function keep(key: string, kept: Kept): boolean {
  try {
    sessionStorage.setItem(key, JSON.stringify(kept));
    return true;
  } catch (error) {
    if (error instanceof DOMException) {
      return false;
    }
    throw error;
  }
}

export function forgetKept(key: string): void {
  try {
    sessionStorage.removeItem(key);
  } catch (error) {
    // Storage is shut off in this browser: there is nothing to forget.
    if (!(error instanceof DOMException)) {
      throw error;
    }
  }
}
