import { roles } from './actions.ts';
import type { Role } from './actions.ts';
import type { Grant } from './types.ts';

/**
 * Reads one entry of the identity provider's `roles` claim: `role` holds at every site, `role@site`
 * at one. Anything else (unknown role, unknown site) is null and must be ignored, never guessed at.
 *
 * @example
 * parseRoleClaim('scheduler@larkfen', ['larkfen']); // { role: 'scheduler', siteCode: 'larkfen' }
 * parseRoleClaim('wizard', ['larkfen']); // null
 */
export function parseRoleClaim(entry: string, knownSites: readonly string[]): Grant | null {
  const [name = '', site, ...rest] = entry.split('@');
  const role = roles.find((known): known is Role => known === name);
  if (role === undefined || rest.length > 0) {
    return null;
  }
  if (site === undefined) {
    return { role, siteCode: null };
  }
  return knownSites.includes(site) ? { role, siteCode: site } : null;
}
