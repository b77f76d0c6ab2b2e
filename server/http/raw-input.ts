import type { z } from 'zod';
import type { Contract } from '#shared/contracts/define-contract.ts';
import { problem } from '#server/problem.ts';
import type { InputFault } from '#server/problem.ts';

export type RawInput = {
  readonly params: unknown;
  readonly query: unknown;
  readonly body: unknown;
};
export type ParsedInput<Params, Query, Body> = {
  readonly params: Params;
  readonly query: Query;
  readonly body: Body;
};

/** Parses the three parts of a call and reports every fault of all of them at once. */
export async function parseInput<
  Params extends z.ZodType,
  Query extends z.ZodType,
  Body extends z.ZodType,
>(
  contract: Contract<Params, Query, Body>,
  raw: RawInput,
): Promise<ParsedInput<z.output<Params>, z.output<Query>, z.output<Body>>> {
  const params = await contract.params.safeParseAsync(raw.params);
  const query = await contract.query.safeParseAsync(raw.query);
  const body = await contract.body.safeParseAsync(raw.body);
  if (params.success && query.success && body.success) {
    return { params: params.data, query: query.data, body: body.data };
  }
  const errors = [
    ...faultsOf('#/path', params.error),
    ...faultsOf('#/query', query.error),
    ...faultsOf('#', body.error),
  ];
  const count = errors.length === 1 ? 'One entry' : `${errors.length} entries`;
  throw problem('input.invalid', {
    detail: `${count} cannot be accepted. Correct what is marked and send it again.`,
    errors,
  });
}

function faultsOf(root: string, error: z.ZodError | undefined): InputFault[] {
  return (error?.issues ?? []).map((issue) => ({
    detail: issue.message,
    pointer: [root, ...issue.path.map((step) => escapeStep(String(step)))].join('/'),
  }));
}

/** RFC 6901: `~` and `/` inside a step are written `~0` and `~1`. */
function escapeStep(step: string): string {
  return step.replaceAll('~', '~0').replaceAll('/', '~1');
}
