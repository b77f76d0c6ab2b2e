import { roles } from './actions.ts';
import type { Role } from './actions.ts';
import type { Actor } from './types.ts';

/**
 * The roles a person holds at a site: the union of grants for that site and for every site, each once,
 * in the order of {@link roles}.
 *
 * @example
 * rolesAt({ personId: 1, grants: [{ role: 'auditor', siteCode: null }], projectIds: [] }, 'larkfen'); // ['auditor']
 */
export function rolesAt(actor: Pick<Actor, 'grants'>, siteCode: string): Role[] {
  return roles.filter((role) =>
    actor.grants.some(
      (grant) => grant.role === role && (grant.siteCode === null || grant.siteCode === siteCode),
    ),
  );
}
