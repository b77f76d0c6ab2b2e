import type { Db } from '#server/db/client.ts';
import { instrumentsTable } from '#server/db/tables/instrument.table.ts';
import { first } from './build-bookable.ts';

const at = new Date('2026-01-05T09:00:00Z');

type InstrumentWish = Partial<Omit<typeof instrumentsTable.$inferInsert, 'id'>> &
  Pick<typeof instrumentsTable.$inferInsert, 'tag' | 'kind' | 'siteId'>;

/** An instrument without channels; in service unless the test says otherwise. */
export async function buildInstrument(db: Db, wish: InstrumentWish): Promise<number> {
  return first(
    await db
      .insert(instrumentsTable)
      .values({ model: 'bench', state: 'in-service', createdAt: at, updatedAt: at, ...wish })
      .returning({ id: instrumentsTable.id }),
  );
}
