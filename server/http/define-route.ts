import type { z } from 'zod';
import type { SignedIn, SiteScope } from '#server/actor.ts';
import type { Deps } from '#server/deps.ts';
import type { Contract } from '#shared/contracts/define-contract.ts';
import { parseInput } from './raw-input.ts';
import type { ParsedInput, RawInput } from './raw-input.ts';

/** What every handler is given beside its input. */
type CallScope<Actor, Site> = {
  readonly actor: Actor;
  readonly site: Site;
  readonly requestId: string;
  /**
   * Bound to this call. In an idempotent call the whole handler runs inside the transaction that holds
   * the idempotency key: `deps.transact` joins it and `deps.db` reads through it.
   */
  readonly deps: Deps;
  readonly transact: Deps['transact'];
  /** Of the caller's session; every change carries it. */
  readonly csrfToken: string | null;
  /** Aborted when the caller goes away: pass it to long computations. */
  readonly signal: AbortSignal;
};

export type RouteContext<Params, Query, Body, Actor, Site> = CallScope<Actor, Site> & {
  readonly input: ParsedInput<Params, Query, Body>;
};

/** A call whose sign-in, site and permission are settled; its input is still raw. */
export type OpenCall = CallScope<SignedIn | null, SiteScope | null> & { readonly raw: RawInput };

export type Route = {
  readonly contract: Contract;
  readonly answer: (call: OpenCall) => Promise<unknown>;
};

type Handler<
  P extends z.ZodType,
  Q extends z.ZodType,
  B extends z.ZodType,
  R extends z.ZodType,
  Actor,
  Site,
> = (
  context: RouteContext<z.output<P>, z.output<Q>, z.output<B>, Actor, Site>,
) => Promise<z.input<R>>;

/**
 * Joins a contract to its handler. Everything a call has in common (sign-in, site, permission, CSRF,
 * idempotency, parsing, status) is done around it; the handler only calls its service.
 */
export function defineRoute<
  P extends z.ZodType,
  Q extends z.ZodType,
  B extends z.ZodType,
  R extends z.ZodType,
>(contract: Contract<P, Q, B, R>, handler: Handler<P, Q, B, R, SignedIn, SiteScope>): Route {
  return {
    contract,
    answer: async ({ raw, actor, site, ...call }) => {
      if (actor === null) {
        throw new Error(`${contract.name} is public; join it with definePublicRoute.`);
      }
      const input = await parseInput(contract, raw);
      return handler({
        ...call,
        actor,
        input,
        get site() {
          return requireSite(contract, site);
        },
      });
    },
  };
}

/** A handler of a contract without `:site` in its path has no site to ask for. */
function requireSite(contract: Contract, site: SiteScope | null): SiteScope {
  if (site === null) {
    throw new Error(`${contract.name} belongs to no site; its handler must not ask for one.`);
  }
  return site;
}

/** The same for a contract that nobody needs to be signed in for. */
export function definePublicRoute<
  P extends z.ZodType,
  Q extends z.ZodType,
  B extends z.ZodType,
  R extends z.ZodType,
>(contract: Contract<P, Q, B, R>, handler: Handler<P, Q, B, R, SignedIn | null, null>): Route {
  return {
    contract,
    answer: async ({ raw, ...call }) =>
      handler({ ...call, site: null, input: await parseInput(contract, raw) }),
  };
}
