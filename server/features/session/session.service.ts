import type { SignedIn } from '#server/actor.ts';
import type { Deps } from '#server/deps.ts';
import { listSites } from '#server/features/settings/settings.service.ts';
import type { SessionDto } from '#shared/contracts/session.contract.ts';
import { rolesAt } from '#shared/domain/policies/roles-at.ts';

export async function getSession(
  deps: Pick<Deps, 'config' | 'db'>,
  actor: SignedIn | null,
  csrfToken: string | null,
): Promise<SessionDto> {
  const sites = actor === null ? [] : await listSites(deps);
  return {
    organisation: deps.config.organisation,
    person: actor === null ? null : presentPerson(actor),
    sites: sites
      .map(({ code, name, zone }) => ({
        code,
        name,
        zone,
        roles: actor === null ? [] : rolesAt(actor, code),
      }))
      .filter((site) => site.roles.length > 0),
    csrfToken,
    demo: deps.config.oidc.isStandIn ? presentDemo(deps.config) : null,
  };
}

function presentPerson(actor: SignedIn): SessionDto['person'] {
  return {
    personId: actor.personId,
    name: actor.name,
    grants: [...actor.grants],
    projectIds: [...actor.projectIds],
  };
}

function presentDemo(config: Deps['config']): SessionDto['demo'] {
  return {
    people: config.oidc.demoPeople.map(({ sub, name, role, site, note }) => ({
      sub,
      name,
      role,
      site: site ?? null,
      note: note ?? null,
    })),
    mailUrl: config.mail.standInUrl,
  };
}
