import { z } from 'zod';
import type { SignedIn, SiteScope } from '#server/actor.ts';
import type { Reader, Tx } from '#server/db/client.ts';
import type { Deps } from '#server/deps.ts';
import { recordAudit } from '#server/features/audit/audit.service.ts';
import { findSiteByCode } from '#server/features/settings/settings.service.ts';
import { decodeCursor, encodeCursor, rowsToRead, toPage } from '#server/paging.ts';
import type { Page, PageQuery } from '#server/paging.ts';
import { notFound, problem, refused } from '#server/problem.ts';
import type { PersonDto } from '#shared/contracts/people.contract.ts';
import type { Role } from '#shared/domain/policies/actions.ts';
import { may } from '#shared/domain/policies/may.ts';
import type { Grant } from '#shared/domain/policies/types.ts';
import { presentPerson } from './people.presenter.ts';
import {
  deleteGrant,
  findPersonRow,
  findWholePersonRow,
  insertGrant,
  listGrantRows,
  listPersonRows,
  listProjectIds,
} from './people.repository.ts';
import type { GrantRow } from './people.repository.ts';

type Changing = Pick<Deps, 'clock' | 'db' | 'requestId' | 'transact'>;

/** The person of a session as of now; null where they are gone or barred. */
export async function findSignedIn(
  deps: Pick<Deps, 'db'>,
  personId: number,
): Promise<SignedIn | null> {
  const person = await findPersonRow(deps.db, personId);
  if (person === undefined) {
    return null;
  }
  const [grants, projectIds] = await Promise.all([
    listGrantRows(deps.db, [personId]),
    listProjectIds(deps.db, personId),
  ]);
  return { personId, name: person.name, grants: grants.map(toGrant), projectIds };
}

const sort = 'name';

export async function listPeople(
  deps: Pick<Deps, 'db'>,
  actor: SignedIn,
  query: PageQuery & { readonly text?: string },
): Promise<Page<PersonDto>> {
  const after = decodeCursor(sort, z.tuple([z.string(), z.int()]), query.cursor);
  const siteCodes = administeredSites(actor);
  const filter = { siteCodes, ...(query.text === undefined ? {} : { text: query.text }) };
  const rows = await listPersonRows(deps.db, filter, after, rowsToRead(query));
  const grants = await listGrantRows(
    deps.db,
    rows.map((row) => row.id),
  );
  return toPage(
    rows,
    query,
    (row) => presentPerson(row, grants),
    (row) => encodeCursor(sort, [row.name, row.id]),
  );
}

export async function addGrant(
  deps: Changing,
  actor: SignedIn,
  personId: number,
  wish: { readonly role: Role; readonly siteCode: string | null },
): Promise<PersonDto> {
  requireAdministration(actor, wish.siteCode);
  const site = await findNamedSite(deps, wish.siteCode);
  return deps.transact(async (tx) => {
    await requirePerson(tx, personId);
    const grantId = await insertGrant(tx, {
      personId,
      role: wish.role,
      siteId: site?.id ?? null,
      origin: 'local',
      grantedById: actor.personId,
      at: deps.clock.now(),
    });
    if (grantId !== null) {
      await audit(deps, tx, { actor, site, personId, action: 'grant.add', after: wish });
    }
    return getPerson(tx, personId);
  });
}

export async function revokeGrant(
  deps: Changing,
  actor: SignedIn,
  personId: number,
  grantId: number,
): Promise<PersonDto> {
  return deps.transact(async (tx) => {
    const grants = await listGrantRows(tx, [personId]);
    const grant = grants.find((row) => row.id === grantId);
    if (grant === undefined) {
      throw notFound('such role');
    }
    requireAdministration(actor, grant.siteCode);
    requireRevocable(actor, grant);
    await deleteGrant(tx, grantId);
    const site = await findNamedSite({ db: tx }, grant.siteCode);
    const before = toGrant(grant);
    await audit(deps, tx, { actor, site, personId, action: 'grant.revoke', before });
    return getPerson(tx, personId);
  });
}

function requireRevocable(actor: SignedIn, grant: GrantRow): void {
  if (grant.origin === 'claim') {
    throw problem('person.claim', {
      detail:
        'This role comes from the identity provider and returns at the next sign-in. Have it taken away there.',
    });
  }
  if (grant.personId === actor.personId && grant.role === 'admin') {
    throw problem('person.self', {
      detail:
        'You cannot take your own administration away, so that somebody is always left to manage people. Ask another administrator.',
    });
  }
}

/** Giving a role at every site takes an administrator of every site. */
function requireAdministration(actor: SignedIn, siteCode: string | null): void {
  const isAllowed =
    siteCode === null ? administeredSites(actor) === 'all' : may(actor, 'people.manage', siteCode);
  if (!isAllowed) {
    throw refused('You manage people at other sites only. Ask an administrator of this one.');
  }
}

function administeredSites(actor: SignedIn): string[] | 'all' {
  const own = actor.grants.filter((grant) => grant.role === 'admin');
  const codes = own.map((grant) => grant.siteCode).filter((code) => code !== null);
  return codes.length < own.length ? 'all' : codes;
}

async function findNamedSite(
  deps: { readonly db: Reader },
  code: string | null,
): Promise<SiteScope | null> {
  const site = code === null ? null : await findSiteByCode(deps, code);
  if (code !== null && site === null) {
    throw notFound('such site');
  }
  return site;
}

async function requirePerson(db: Reader, personId: number) {
  const person = await findWholePersonRow(db, personId);
  if (person === undefined) {
    throw notFound('such person');
  }
  return person;
}

async function getPerson(db: Reader, personId: number): Promise<PersonDto> {
  return presentPerson(await requirePerson(db, personId), await listGrantRows(db, [personId]));
}

async function audit(
  deps: Changing,
  tx: Tx,
  entry: {
    readonly actor: SignedIn;
    readonly site: SiteScope | null;
    readonly personId: number;
    readonly action: string;
    readonly before?: unknown;
    readonly after?: unknown;
  },
): Promise<void> {
  const { personId, ...rest } = entry;
  await recordAudit(deps, tx, { ...rest, subjectKind: 'person', subjectId: personId });
}

function toGrant(row: GrantRow): Grant {
  return { role: row.role, siteCode: row.siteCode };
}
