import { randomUUID } from 'node:crypto';
import type { Db } from '#server/db/client.ts';
import { personsTable } from '#server/db/tables/person.table.ts';
import { first } from './build-bookable.ts';

const at = new Date('2026-01-05T09:00:00Z');

/** A person who is only named by records and never signs in. */
export async function buildPersonRow(db: Db, name: string): Promise<number> {
  return first(
    await db
      .insert(personsTable)
      .values({ providerKey: 'local', sub: randomUUID(), name, createdAt: at, updatedAt: at })
      .returning({ id: personsTable.id }),
  );
}
