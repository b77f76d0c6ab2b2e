import type { Deps } from '#server/deps.ts';
import { recordAudit } from '#server/features/audit/audit.service.ts';
import { listSites } from '#server/features/settings/settings.service.ts';
import type { Identity } from '#server/integrations/identity.ts';
import { problem } from '#server/problem.ts';
import { parseRoleClaim } from '#shared/domain/policies/parse-role-claim.ts';
import type { Grant } from '#shared/domain/policies/types.ts';
import { deleteGrant, insertGrant, listGrantRows, upsertPerson } from './people.repository.ts';

/**
 * Takes a person the provider vouches for into the register and makes their claimed roles follow the
 * claim. Roles given here stay untouched. Returns the person's number.
 */
export async function admitPerson(
  deps: Pick<Deps, 'clock' | 'config' | 'db' | 'log' | 'requestId' | 'transact'>,
  identity: Identity,
): Promise<number> {
  const sites = await listSites(deps);
  const claimed = readClaim(
    deps,
    identity.roles,
    sites.map((site) => site.code),
  );
  return deps.transact(async (tx) => {
    const at = deps.clock.now();
    const person = await upsertPerson(tx, {
      providerKey: deps.config.oidc.providerKey,
      sub: identity.sub,
      name: identity.name,
      email: identity.email,
      at,
    });
    if (person.barredAt !== null) {
      throw problem('access.refused', {
        detail: 'An administrator has barred this account. Ask them if you think this is wrong.',
      });
    }
    const grants = await listGrantRows(tx, [person.id]);
    const held = grants.filter((grant) => grant.origin === 'claim');
    const gone = held.filter((grant) => !claimed.some((claim) => isSame(claim, grant)));
    const added = claimed.filter((claim) => !held.some((grant) => isSame(claim, grant)));
    for (const grant of gone) {
      await deleteGrant(tx, grant.id);
    }
    for (const claim of added) {
      const siteId = sites.find((site) => site.code === claim.siteCode)?.id ?? null;
      await insertGrant(tx, {
        personId: person.id,
        role: claim.role,
        siteId,
        origin: 'claim',
        grantedById: null,
        at,
      });
    }
    if (gone.length + added.length > 0) {
      await recordAudit(deps, tx, {
        actor: { personId: person.id },
        site: null,
        action: 'grant.follow-claim',
        subjectKind: 'person',
        subjectId: person.id,
        before: held.map(({ role, siteCode }) => ({ role, siteCode })),
        after: claimed,
      });
    }
    return person.id;
  });
}

/** Entries that name no role or no site of ours are ignored and counted in the log. */
function readClaim(
  deps: Pick<Deps, 'log' | 'requestId'>,
  entries: readonly string[],
  siteCodes: readonly string[],
): Grant[] {
  const read = entries.map((entry) => parseRoleClaim(entry, siteCodes));
  const known = read.filter((grant) => grant !== null);
  if (known.length < read.length) {
    const ignoredCount = read.length - known.length;
    deps.log.warn({ requestId: deps.requestId, ignoredCount }, 'unknown roles in a claim');
  }
  return known.filter((grant, index) => known.findIndex((other) => isSame(grant, other)) === index);
}

function isSame(left: Grant, right: Grant): boolean {
  return left.role === right.role && left.siteCode === right.siteCode;
}
