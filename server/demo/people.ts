import type { Role } from '#shared/domain/policies/actions.ts';
import { stamped, type DemoContext } from './demo-context.ts';
import { dayMs } from './demo-days.ts';

/** Whom the rest of the demo speaks of. */
export type PersonKey =
  | 'engineer'
  | 'secondEngineer'
  | 'otterholmEngineer'
  | 'scheduler'
  | 'metrologist'
  | 'secondMetrologist'
  | 'manager'
  | 'safety'
  | 'auditor'
  | 'admin';
export type People = Readonly<Record<PersonKey, number>>;

type DemoPerson = {
  readonly sub: string;
  readonly name: string;
  readonly grants: readonly {
    readonly role: Role;
    readonly site: 'larkfen' | 'otterholm' | null;
  }[];
};

/** The same people as the local identity stand-in signs in; found by provider key and subject. */
export const demoPeople: Readonly<Record<PersonKey, DemoPerson>> = {
  engineer: {
    sub: 'hallowe',
    name: 'B. Hallowe',
    grants: [{ role: 'engineer', site: 'larkfen' }],
  },
  secondEngineer: {
    sub: 'crandle',
    name: 'E. Crandle',
    grants: [{ role: 'engineer', site: 'larkfen' }],
  },
  otterholmEngineer: {
    sub: 'vessant',
    name: 'N. Vessant',
    grants: [{ role: 'engineer', site: 'otterholm' }],
  },
  scheduler: {
    sub: 'osmery',
    name: 'T. Osmery',
    grants: [{ role: 'scheduler', site: null }],
  },
  metrologist: {
    sub: 'fennick',
    name: 'I. Fennick',
    grants: [{ role: 'metrologist', site: null }],
  },
  secondMetrologist: {
    sub: 'dunmarle',
    name: 'P. Dunmarle',
    grants: [{ role: 'metrologist', site: null }],
  },
  manager: { sub: 'marwhin', name: 'S. Marwhin', grants: [{ role: 'manager', site: null }] },
  safety: { sub: 'yelland', name: 'A. Yelland', grants: [{ role: 'safety', site: null }] },
  auditor: { sub: 'quenby', name: 'L. Quenby', grants: [{ role: 'auditor', site: null }] },
  admin: { sub: 'tarn', name: 'R. Tarn', grants: [{ role: 'admin', site: null }] },
};

/** People sign in through the stand-in, whose key is `local`. */
export const demoProviderKey = 'local';

export function layPeople(
  context: DemoContext,
  siteIds: Readonly<Record<'larkfen' | 'otterholm', number>>,
): People {
  const joinedMs = context.nowMs - 1100 * dayMs;
  function enter(person: DemoPerson): number {
    const id = context.number('persons');
    context.rows.persons.push({
      id,
      providerKey: demoProviderKey,
      sub: person.sub,
      name: person.name,
      email: `${person.sub}@larkfen.example`,
      ...stamped(joinedMs),
    });
    for (const grant of person.grants) {
      context.rows.grants.push({
        id: context.number('grants'),
        personId: id,
        role: grant.role,
        siteId: grant.site === null ? null : siteIds[grant.site],
        origin: 'claim',
        createdAt: new Date(joinedMs),
      });
    }
    return id;
  }
  return {
    engineer: enter(demoPeople.engineer),
    secondEngineer: enter(demoPeople.secondEngineer),
    otterholmEngineer: enter(demoPeople.otterholmEngineer),
    scheduler: enter(demoPeople.scheduler),
    metrologist: enter(demoPeople.metrologist),
    secondMetrologist: enter(demoPeople.secondMetrologist),
    manager: enter(demoPeople.manager),
    safety: enter(demoPeople.safety),
    auditor: enter(demoPeople.auditor),
    admin: enter(demoPeople.admin),
  };
}
