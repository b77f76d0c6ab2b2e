import {
  problemSchema,
  type ProblemCode,
  type ProblemDocument,
} from '#shared/contracts/problems.ts';

/** What `callApi` throws: the server's problem document, or one made here when no answer came. */
export class ProblemError extends Error {
  readonly document: ProblemDocument;

  constructor(document: ProblemDocument) {
    super(document.detail);
    this.name = 'ProblemError';
    this.document = document;
  }

  get code(): string {
    return this.document.code;
  }

  /** Sentences by field, from the JSON pointers of a 422. */
  get fieldErrors(): ReadonlyMap<string, string> {
    return new Map((this.document.errors ?? []).map((error) => [error.pointer, error.detail]));
  }
}

export function isProblem(error: unknown, code?: ProblemCode): error is ProblemError {
  return error instanceof ProblemError && (code === undefined || error.code === code);
}

/** Reads a problem document; anything else becomes a plain sentence with the status. */
export function readProblem(status: number, body: unknown): ProblemError {
  const parsed = problemSchema.safeParse(body);
  if (parsed.success) {
    return new ProblemError(parsed.data);
  }
  return new ProblemError({
    type: '/problems/internal',
    title: 'Something failed on the server',
    status,
    detail: `The server answered ${status} without saying why. Try again; what you typed is still here.`,
    instance: '',
    code: 'internal',
  });
}

export function unreachable(): ProblemError {
  return new ProblemError({
    type: '/problems/service.unavailable',
    title: 'No answer',
    status: 0,
    detail:
      'Millpond does not answer. Check the connection and try again; what you typed is still here.',
    instance: '',
    code: 'service.unavailable',
  });
}
