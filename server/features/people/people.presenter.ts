import type { PersonDto } from '#shared/contracts/people.contract.ts';
import type { GrantRow, PersonRow } from './people.repository.ts';

export function presentPerson(person: PersonRow, grants: readonly GrantRow[]): PersonDto {
  return {
    id: person.id,
    name: person.name,
    email: person.email,
    lastSignedInAt: person.lastSignedInAt?.toISOString() ?? null,
    grants: grants
      .filter((grant) => grant.personId === person.id)
      .map(({ id, role, siteCode, origin }) => ({ id, role, siteCode, origin })),
  };
}
