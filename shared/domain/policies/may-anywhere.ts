import type { Action } from './actions.ts';
import { permissions } from './permissions.ts';
import type { Actor } from './types.ts';

/**
 * Decides whether a person may do something at one site at least: the question for endpoints that
 * belong to no single site. The service then narrows to the sites in question with `may()`.
 *
 * @example
 * mayAnywhere({ personId: 1, grants: [{ role: 'admin', siteCode: 'larkfen' }], projectIds: [] }, 'people.manage'); // true
 */
export function mayAnywhere(actor: Actor, action: Action): boolean {
  return actor.grants.some((grant) => permissions[action].reach[grant.role] !== undefined);
}
