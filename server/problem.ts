import { problems } from '#shared/contracts/problems.ts';
import type { ProblemCode } from '#shared/contracts/problems.ts';

export type InputFault = { readonly detail: string; readonly pointer: string };

/** An expected "no": its detail is written for the person who asked and is sent to them. */
export class ProblemError extends Error {
  override readonly name = 'ProblemError';
  readonly code: ProblemCode;
  readonly status: number;
  readonly title: string;
  readonly detail: string;
  readonly extension: Readonly<Record<string, unknown>>;

  constructor(
    code: ProblemCode,
    detail: string,
    extension: Readonly<Record<string, unknown>>,
    cause?: unknown,
  ) {
    super(`${code}: ${detail}`, { cause });
    this.code = code;
    this.status = problems[code].status;
    this.title = problems[code].title;
    this.detail = detail;
    this.extension = extension;
  }
}

type ProblemInput = { readonly detail: string; readonly cause?: unknown } & Readonly<
  Record<string, unknown>
>;

/**
 * Makes the error a service throws for an expected "no". Every member beyond `detail` and `cause`
 * travels as an extension member of the problem document.
 */
export function problem(code: ProblemCode, input: ProblemInput): ProblemError {
  const { detail, cause, ...extension } = input;
  return new ProblemError(code, detail, extension, cause);
}

/** The refusal of a record that is not there, or not the caller's to know about. */
export function notFound(what: string): ProblemError {
  return problem('not-found', {
    detail: `There is no ${what} here, or it is not yours to see. Check the number and the site.`,
  });
}

/** The refusal of an update that names an old version; `current` is the row as it stands now. */
export function staleVersion(what: string, current: unknown): ProblemError {
  return problem('version.stale', {
    detail: `Somebody changed ${what} while you had it open. Look at the current state, then save again.`,
    current,
  });
}

/** The refusal of something the person's roles do not allow. */
export function refused(detail: string): ProblemError {
  return problem('access.refused', { detail });
}
