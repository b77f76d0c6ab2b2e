import { findConstraintError } from '#server/db/db-errors.ts';

/** The code and constraint a change was refused with; a change that passes is a failed test. */
export async function refusalOf(
  change: Promise<unknown>,
): Promise<{ readonly code: string; readonly constraint: string }> {
  try {
    await change;
  } catch (error) {
    const broken = findConstraintError(error);
    if (broken === undefined) {
      throw error;
    }
    return { code: broken.code, constraint: broken.constraint };
  }
  throw new Error('The database accepted what it must refuse.');
}
