import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useRef } from 'react';
import type { z } from 'zod';
import type { Contract } from '#shared/contracts/define-contract.ts';
import { callApi, type ApiInput } from '#src/lib/call-api.ts';
import { isProblem } from '#src/lib/problem.ts';

/**
 * A change through its contract. One idempotency key is kept from the first try until it succeeds or
 * its input changes, so that pressing again after a lost answer cannot do the thing twice.
 */
export function useApiMutation<
  P extends z.ZodType,
  Q extends z.ZodType,
  B extends z.ZodType,
  R extends z.ZodType,
>(
  contract: Contract<P, Q, B, R>,
  options: {
    /** Everything read from these endpoints is fetched again. */
    readonly refreshes?: readonly Contract[];
    readonly onDone?: (answer: z.output<R>) => void;
  } = {},
) {
  const client = useQueryClient();
  const attempt = useRef<{ key: string; input: string } | null>(null);
  const refresh = async () => {
    const paths = new Set((options.refreshes ?? []).map((each) => each.path));
    await client.invalidateQueries({
      predicate: (query) => paths.has(String(query.queryKey[0])),
    });
  };
  return useMutation({
    mutationFn: (input: ApiInput<P, Q, B>) => {
      const said = JSON.stringify([input.params, input.query, input.body]);
      if (attempt.current?.input !== said) {
        attempt.current = { key: crypto.randomUUID(), input: said };
      }
      return callApi(contract, { ...input, idempotencyKey: attempt.current.key });
    },
    onSuccess: async (answer) => {
      attempt.current = null;
      options.onDone?.(answer);
      await refresh();
    },
    onError: async (error) => {
      // A conflict means that the page shows something that is no longer so.
      if (isProblem(error) && error.document.status === 409) {
        await refresh();
      }
    },
  });
}
