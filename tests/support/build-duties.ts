import { randomBytes, randomUUID } from 'node:crypto';
import type { Db } from '#server/db/client.ts';
import { dutiesTable } from '#server/db/tables/calibration.table.ts';
import { instrumentsTable } from '#server/db/tables/instrument.table.ts';
import { grantsTable, personsTable } from '#server/db/tables/person.table.ts';
import type { Role } from '#shared/domain/policies/actions.ts';
import { first } from './build-bookable.ts';

const at = new Date('2026-01-05T09:00:00Z');
const stamps = { createdAt: at, updatedAt: at };

/** Somebody who gets mail; a metrologist at the site unless the test says otherwise. */
export async function buildMailPerson(
  db: Db,
  siteId: number,
  wish: {
    readonly role?: Role | null;
    readonly email?: string | null;
    readonly everywhere?: boolean;
  } = {},
) {
  const { role = 'metrologist' } = wish;
  const sub = randomUUID();
  const email = wish.email === undefined ? `${sub}@larkfen.example` : wish.email;
  const id = first(
    await db
      .insert(personsTable)
      .values({ providerKey: 'local', sub, name: `Person ${sub.slice(0, 6)}`, email, ...stamps })
      .returning({ id: personsTable.id }),
  );
  if (role !== null) {
    await db.insert(grantsTable).values({
      personId: id,
      role,
      siteId: wish.everywhere === true ? null : siteId,
      origin: 'local',
      createdAt: at,
    });
  }
  return { id, email: email ?? '' };
}

/** An instrument with one duty of its own. */
export async function buildDuty(
  db: Db,
  siteId: number,
  wish: {
    readonly dueOn: string | null;
    readonly tag?: string;
    readonly model?: string;
    readonly custodianId?: number;
    readonly instrumentCustodianId?: number;
  },
) {
  const instrumentId = first(
    await db
      .insert(instrumentsTable)
      .values({
        tag: wish.tag ?? `M-${randomBytes(4).toString('hex').toUpperCase()}`,
        kind: 'meter',
        model: wish.model ?? 'bench meter',
        siteId,
        state: 'in-service',
        custodianId: wish.instrumentCustodianId ?? null,
        ...stamps,
      })
      .returning({ id: instrumentsTable.id }),
  );
  const id = first(
    await db
      .insert(dutiesTable)
      .values({
        instrumentId,
        kind: 'calibration',
        intervalMonths: 12,
        nextDueOn: wish.dueOn,
        custodianId: wish.custodianId ?? null,
        ...stamps,
      })
      .returning({ id: dutiesTable.id }),
  );
  return { id, instrumentId };
}
