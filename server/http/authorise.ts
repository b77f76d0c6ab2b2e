import type { SignedIn, SiteScope } from '#server/actor.ts';
import { notFound, problem, refused } from '#server/problem.ts';
import type { Contract } from '#shared/contracts/define-contract.ts';
import { may } from '#shared/domain/policies/may.ts';
import { mayAnywhere } from '#shared/domain/policies/may-anywhere.ts';
import { rolesAt } from '#shared/domain/policies/roles-at.ts';

/** Answers 401, 404 (a site the caller has no role at) or 403, in this order. */
export function authorise(
  contract: Contract,
  actor: SignedIn | null,
  site: SiteScope | null,
): void {
  if (contract.access.kind === 'public') {
    return;
  }
  if (actor === null) {
    throw problem('session.missing', { detail: 'Sign in, then do this again.' });
  }
  if (isSiteScoped(contract) && (site === null || rolesAt(actor, site.code).length === 0)) {
    throw notFound('such site');
  }
  if (contract.access.kind === 'action') {
    const { action } = contract.access;
    const isAllowed = site === null ? mayAnywhere(actor, action) : may(actor, action, site.code);
    if (!isAllowed) {
      throw refused('None of your roles allows this. Ask somebody who holds the role for it.');
    }
  }
}

export function isSiteScoped(contract: Contract): boolean {
  return contract.path.includes('/:site');
}
