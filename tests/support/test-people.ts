import { createHmac, randomBytes, randomUUID } from 'node:crypto';
import session from 'express-session';
import type { Store } from 'express-session';
import { eq } from 'drizzle-orm';
import type { Config } from '#server/config.ts';
import type { Db } from '#server/db/client.ts';
import { grantsTable, personsTable } from '#server/db/tables/person.table.ts';
import { sitesTable } from '#server/db/tables/site.table.ts';
import { sessionCookie } from '#server/http/sessions.ts';
import type { Role } from '#shared/domain/policies/actions.ts';

/** `scheduler` at the site the test signs in at, or `scheduler@otterholm`, or `admin@*` everywhere. */
export type RoleWish = Role | `${Role}@${string}`;

export type TestPerson = {
  readonly personId: number;
  readonly name: string;
  /** Value of the Cookie header. */
  readonly cookie: string;
  readonly csrfToken: string;
};

export type PersonWish = {
  readonly roles?: readonly RoleWish[];
  readonly name?: string;
  readonly site?: string;
};

type Places = {
  readonly db: Db;
  readonly config: Config;
  readonly store: Store;
  readonly at: Date;
};

/** Makes a person with local grants and a session of theirs, through the store the server uses. */
export async function signInPerson(places: Places, wish: PersonWish): Promise<TestPerson> {
  const { db, at } = places;
  const name = wish.name ?? `Person ${randomBytes(3).toString('hex')}`;
  const [person] = await db
    .insert(personsTable)
    .values({ providerKey: 'local', sub: randomUUID(), name, createdAt: at, updatedAt: at })
    .returning({ id: personsTable.id });
  if (person === undefined) {
    throw new Error('No person was made.');
  }
  for (const text of wish.roles ?? []) {
    await grant(places, person.id, text, wish.site ?? 'larkfen');
  }
  return { ...(await openSession(places, person.id)), personId: person.id, name };
}

async function grant(places: Places, personId: number, text: RoleWish, site: string) {
  const [role, place = site] = text.split('@');
  const [row] = await places.db
    .select({ id: sitesTable.id })
    .from(sitesTable)
    .where(eq(sitesTable.code, place));
  if (row === undefined && place !== '*') {
    throw new Error(`There is no site ${place}; make it with buildSite first.`);
  }
  await places.db.insert(grantsTable).values({
    personId,
    role: requireRole(role),
    siteId: row?.id ?? null,
    origin: 'local',
    createdAt: places.at,
  });
}

function requireRole(name: string | undefined): Role {
  const role = grantsTable.role.enumValues.find((known) => known === name);
  if (role === undefined) {
    throw new Error(`There is no role ${name ?? ''}.`);
  }
  return role;
}

async function openSession(places: Places, personId: number) {
  const csrfToken = randomBytes(24).toString('base64url');
  const id = randomUUID();
  const cookie = new session.Cookie();
  cookie.maxAge = 3_600_000;
  await new Promise<void>((resolve, reject) => {
    places.store.set(id, { cookie, personId, csrfToken }, (error: unknown) => {
      if (error === undefined || error === null) {
        resolve();
      } else {
        reject(error instanceof Error ? error : new Error('The session was not stored.'));
      }
    });
  });
  return { csrfToken, cookie: `${sessionCookie}=${sign(id, places.config.session.secret)}` };
}

/** As the `cookie-signature` package writes it: `s:<value>.<HMAC-SHA256 in base64 without padding>`. */
function sign(value: string, secret: string): string {
  const mac = createHmac('sha256', secret).update(value).digest('base64').replace(/=+$/, '');
  return encodeURIComponent(`s:${value}.${mac}`);
}
