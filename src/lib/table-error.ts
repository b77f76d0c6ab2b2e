import { isProblem } from './problem.ts';

type Failed = { readonly error: unknown; readonly refetch: () => unknown };

/** What a table or panel shows when its query failed: the sentence, the request number, a retry. */
export function tableError(
  query: Failed,
): { detail: string; requestId?: string | undefined; onRetry: () => void } | undefined {
  if (query.error === null || query.error === undefined) {
    return undefined;
  }
  const isKnown = isProblem(query.error);
  return {
    detail: isKnown ? query.error.document.detail : 'The answer of the server could not be read.',
    requestId:
      isKnown && query.error.document.instance !== '' ? query.error.document.instance : undefined,
    onRetry: () => {
      void query.refetch();
    },
  };
}
