import type { z } from 'zod';
import type { Action } from '#shared/domain/policies/actions.ts';
import type { ProblemCode } from './problems.ts';

/**
 * Who may call: nobody signed in, anybody signed in, anybody with any role at the site of the path,
 * or anybody whose roles allow the action there. Finer rules (own request, not the author) are the
 * service's, with the same `may()`.
 */
export type Access =
  | { readonly kind: 'public' }
  | { readonly kind: 'signed-in' }
  | { readonly kind: 'site-reader' }
  | { readonly kind: 'action'; readonly action: Action };

export type HttpMethod = 'GET' | 'POST' | 'PUT' | 'PATCH' | 'DELETE';

export type Contract<
  Params extends z.ZodType = z.ZodType,
  Query extends z.ZodType = z.ZodType,
  Body extends z.ZodType = z.ZodType,
  Response extends z.ZodType = z.ZodType,
> = {
  /** Verb-noun, kebab-case; also the operation id in the OpenAPI document. */
  readonly name: string;
  readonly method: HttpMethod;
  /** Express pattern, e.g. `/api/sites/:site/requests/:id`. */
  readonly path: string;
  readonly summary: string;
  readonly params: Params;
  readonly query: Query;
  readonly body: Body;
  readonly response: Response;
  readonly status: 200 | 201 | 202 | 204;
  readonly access: Access;
  /** `true`: the caller sends an Idempotency-Key; a repeat gets the first answer back. */
  readonly idempotent: boolean;
  /** Problems this endpoint can answer with beyond those every endpoint has. */
  readonly problems: readonly ProblemCode[];
};

/**
 * States one endpoint once; server, client, tests and the OpenAPI document all read it.
 *
 * A contract with `:site` in its path is scoped to that site: the route helper resolves the site,
 * answers 404 where the caller has no role there, and only then looks at `access`.
 */
export function defineContract<
  Params extends z.ZodType,
  Query extends z.ZodType,
  Body extends z.ZodType,
  Response extends z.ZodType,
>(contract: Contract<Params, Query, Body, Response>): Contract<Params, Query, Body, Response> {
  return contract;
}
