import { and, asc, eq, exists, gt, ilike, inArray, isNull, or, sql } from 'drizzle-orm';
import type { Reader, Tx } from '#server/db/client.ts';
import { grantsTable, personsTable } from '#server/db/tables/person.table.ts';
import { projectMembersTable } from '#server/db/tables/project.table.ts';
import { sitesTable } from '#server/db/tables/site.table.ts';
import type { Role } from '#shared/domain/policies/actions.ts';

/** Undefined where there is no such person or an administrator barred them. */
export async function findPersonRow(db: Reader, personId: number) {
  const [row] = await db
    .select({ id: personsTable.id, name: personsTable.name })
    .from(personsTable)
    .where(and(eq(personsTable.id, personId), isNull(personsTable.barredAt)));
  return row;
}

export async function listGrantRows(db: Reader, personIds: readonly number[]) {
  return db
    .select({
      id: grantsTable.id,
      personId: grantsTable.personId,
      role: grantsTable.role,
      siteCode: sitesTable.code,
      origin: grantsTable.origin,
    })
    .from(grantsTable)
    .leftJoin(sitesTable, eq(sitesTable.id, grantsTable.siteId))
    .where(inArray(grantsTable.personId, [...personIds]))
    .orderBy(asc(grantsTable.id));
}
export type GrantRow = Awaited<ReturnType<typeof listGrantRows>>[number];

export async function listProjectIds(db: Reader, personId: number): Promise<number[]> {
  const rows = await db
    .select({ projectId: projectMembersTable.projectId })
    .from(projectMembersTable)
    .where(eq(projectMembersTable.personId, personId))
    .orderBy(asc(projectMembersTable.projectId));
  return rows.map((row) => row.projectId);
}

export type PeopleFilter = {
  readonly text?: string;
  /** Only people with a role at one of these sites, or at every site, or none at all. */
  readonly siteCodes: readonly string[] | 'all';
};

/** By name, then number. */
export async function listPersonRows(
  db: Reader,
  filter: PeopleFilter,
  after: readonly [string, number] | undefined,
  limit: number,
) {
  const t = personsTable;
  return db
    .select()
    .from(t)
    .where(
      and(
        filter.text === undefined ? undefined : ilike(t.name, `%${escapeLike(filter.text)}%`),
        after === undefined
          ? undefined
          : or(gt(t.name, after[0]), and(eq(t.name, after[0]), gt(t.id, after[1]))),
        filter.siteCodes === 'all' ? undefined : isKnownAt(db, filter.siteCodes),
      ),
    )
    .orderBy(asc(t.name), asc(t.id))
    .limit(limit);
}
export type PersonRow = Awaited<ReturnType<typeof listPersonRows>>[number];

function isKnownAt(db: Reader, siteCodes: readonly string[]) {
  const ownGrants = eq(grantsTable.personId, personsTable.id);
  const anyGrant = db
    .select({ one: sql`1` })
    .from(grantsTable)
    .where(ownGrants);
  const grantHere = db
    .select({ one: sql`1` })
    .from(grantsTable)
    .leftJoin(sitesTable, eq(sitesTable.id, grantsTable.siteId))
    .where(
      and(ownGrants, or(isNull(grantsTable.siteId), inArray(sitesTable.code, [...siteCodes]))),
    );
  return or(exists(grantHere), sql`not ${exists(anyGrant)}`);
}

/** What a person typed is looked for as it stands: `%` and `_` are letters to them. */
function escapeLike(text: string): string {
  return text.replaceAll(/[\\%_]/g, (letter) => `\\${letter}`);
}

export async function findWholePersonRow(db: Reader, personId: number) {
  const [row] = await db.select().from(personsTable).where(eq(personsTable.id, personId));
  return row;
}

/** Known by provider and subject; name and mail follow the provider at each sign-in. */
export async function upsertPerson(
  tx: Tx,
  person: {
    readonly providerKey: string;
    readonly sub: string;
    readonly name: string;
    readonly email: string | null;
    readonly at: Date;
  },
) {
  const { at, ...identity } = person;
  const [row] = await tx
    .insert(personsTable)
    .values({ ...identity, lastSignedInAt: at, createdAt: at, updatedAt: at })
    .onConflictDoUpdate({
      target: [personsTable.providerKey, personsTable.sub],
      set: { name: person.name, email: person.email, lastSignedInAt: at, updatedAt: at },
    })
    .returning();
  if (row === undefined) {
    throw new Error('The database returned no person after writing one.');
  }
  return row;
}

type NewGrant = {
  readonly personId: number;
  readonly role: Role;
  readonly siteId: number | null;
  readonly origin: 'claim' | 'local';
  readonly grantedById: number | null;
  readonly at: Date;
};

/** Null where the person holds exactly this grant already. */
export async function insertGrant(tx: Tx, grant: NewGrant): Promise<number | null> {
  const { at, ...values } = grant;
  const [row] = await tx
    .insert(grantsTable)
    .values({ ...values, createdAt: at })
    .onConflictDoNothing()
    .returning({ id: grantsTable.id });
  return row?.id ?? null;
}

export async function deleteGrant(tx: Tx, grantId: number): Promise<void> {
  await tx.delete(grantsTable).where(eq(grantsTable.id, grantId));
}
