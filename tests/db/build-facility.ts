import type { Db } from '#server/db/client.ts';
import { chamberPositionsTable, chamberSpecsTable } from '#server/db/tables/chamber.table.ts';
import { instrumentsTable } from '#server/db/tables/instrument.table.ts';
import { outagesTable } from '#server/db/tables/outage.table.ts';
import { personsTable } from '#server/db/tables/person.table.ts';
import { sitesTable } from '#server/db/tables/site.table.ts';
import { unitsTable } from '#server/db/tables/unit.table.ts';

const at = new Date('2030-01-01T00:00:00Z');
const stamps = { createdAt: at, updatedAt: at };

export type TestFacility = {
  readonly siteId: number;
  readonly personId: number;
  readonly secondPersonId: number;
  readonly strictChamberId: number;
  readonly tolerantChamberId: number;
  readonly secondTolerantChamberId: number;
  /** Positions of the strict chamber. */
  readonly unitIds: readonly number[];
  /** What allocations are made for where the reason does not matter. */
  readonly outageId: number;
};

/** One site with a strict and two tolerant chambers, all idle at 25 °C, and eight positions. */
export async function buildFacility(db: Db): Promise<TestFacility> {
  const siteId = first(
    await db
      .insert(sitesTable)
      .values({
        code: 'millrace',
        name: 'Millrace',
        zone: 'Europe/Dublin',
        workingHours: {},
        ...stamps,
      })
      .returning({ id: sitesTable.id }),
  );
  const personId = await buildPerson(db, 'ada');
  const secondPersonId = await buildPerson(db, 'ben');
  const strictChamberId = await buildChamber(db, siteId, 'C01', true);
  const tolerantChamberId = await buildChamber(db, siteId, 'C02', false);
  const secondTolerantChamberId = await buildChamber(db, siteId, 'C03', false);
  const unitIds: number[] = [];
  for (let n = 1; n <= 8; n += 1) {
    unitIds.push(await buildPosition(db, strictChamberId, `C01/${n}`));
  }
  const outageId = first(
    await db
      .insert(outagesTable)
      .values({
        siteId,
        title: 'Cleaning',
        state: 'planned',
        during: { startMs: at.getTime(), endMs: at.getTime() + 3_600_000 },
        plannedById: personId,
        ...stamps,
      })
      .returning({ id: outagesTable.id }),
  );
  return {
    siteId,
    personId,
    secondPersonId,
    strictChamberId,
    tolerantChamberId,
    secondTolerantChamberId,
    unitIds,
    outageId,
  };
}

async function buildPerson(db: Db, sub: string): Promise<number> {
  return first(
    await db
      .insert(personsTable)
      .values({ providerKey: 'local', sub, name: sub, ...stamps })
      .returning({ id: personsTable.id }),
  );
}

async function buildChamber(db: Db, siteId: number, tag: string, strict: boolean): Promise<number> {
  const instrumentId = first(
    await db
      .insert(instrumentsTable)
      .values({ tag, kind: 'chamber', model: 'K 240', siteId, state: 'in-service', ...stamps })
      .returning({ id: instrumentsTable.id }),
  );
  await db.insert(chamberSpecsTable).values({
    instrumentId,
    minSetTempMdegc: -20_000,
    maxSetTempMdegc: 80_000,
    rampKPerMin: 1,
    strict,
    protectionLevel: 4,
    maxEnergyWh: 2000,
    maxCells: 16,
    ...stamps,
  });
  return instrumentId;
}

async function buildPosition(db: Db, chamberId: number, label: string): Promise<number> {
  const positionId = first(
    await db
      .insert(chamberPositionsTable)
      .values({ chamberId, label, formats: ['18650', '21700'], maxAh: 6, maxHazard: 4, ...stamps })
      .returning({ id: chamberPositionsTable.id }),
  );
  return first(
    await db
      .insert(unitsTable)
      .values({ kind: 'chamber-position', instrumentId: chamberId, positionId })
      .returning({ id: unitsTable.id }),
  );
}

export function first(rows: readonly { readonly id: number }[]): number {
  const [row] = rows;
  if (row === undefined) {
    throw new Error('The insert returned no row.');
  }
  return row.id;
}
