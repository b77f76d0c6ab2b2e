import { ProblemError } from '#server/problem.ts';
import { problems } from '#shared/contracts/problems.ts';
import type { ProblemCode } from '#shared/contracts/problems.ts';

/** Members an extension may not overwrite. */
const reserved = new Set(['type', 'title', 'status', 'detail', 'instance', 'code']);

/** The RFC 9457 document of an expected problem; anything else becomes a bare 500. */
export function problemDocument(error: unknown, requestId: string) {
  if (!(error instanceof ProblemError)) {
    return document(
      'internal',
      `Something failed on the server. Try again; if it stays so, tell your administrator the number ${requestId}.`,
      requestId,
      {},
    );
  }
  return document(error.code, error.detail, requestId, error.extension);
}

function document(
  code: ProblemCode,
  detail: string,
  requestId: string,
  extension: Readonly<Record<string, unknown>>,
) {
  const additions = Object.entries(extension).filter(([name]) => !reserved.has(name));
  return {
    type: `/problems/${code}`,
    title: problems[code].title,
    status: problems[code].status,
    detail,
    instance: `urn:uuid:${requestId}`,
    code,
    ...Object.fromEntries(additions),
  };
}
