import { eq } from 'drizzle-orm';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { cellsTable } from '#server/db/tables/cell.table.ts';
import { projectsTable } from '#server/db/tables/project.table.ts';
import { requestsTable } from '#server/db/tables/request.table.ts';
import { sitesTable } from '#server/db/tables/site.table.ts';
import { listCells, listCellTypes, listProjects } from '#shared/contracts/registers.contract.ts';
import type { CellRow } from '#shared/contracts/registers.contract.ts';
import { buildBench } from '#tests/support/build-bench.ts';
import type { Bench } from '#tests/support/build-bench.ts';
import { buildCellType, buildProject } from '#tests/support/build-request.ts';
import { startTestApp } from '#tests/support/test-app.ts';
import type { TestPerson } from '#tests/support/test-people.ts';

let bench: Bench;
beforeAll(async () => {
  bench = await buildBench(await startTestApp());
});
afterAll(() => bench.app.stop());

const cellsFor = async (
  query: Readonly<Record<string, string | number>>,
  person: TestPerson = bench.engineer,
) => (await bench.app.call(listCells, person, { query })).body;
const ids = (rows: readonly CellRow[]) => rows.map(({ id }) => id);

async function rename(cellId: number, change: Partial<typeof cellsTable.$inferInsert>) {
  await bench.app.db.update(cellsTable).set(change).where(eq(cellsTable.id, cellId));
}

test('a cell type comes with its limits and with what was measured of it, or with nothing', async () => {
  const { db } = bench.app;
  const measured = await buildCellType(db, bench.scheduler.personId, {
    name: 'AA-1',
    resistanceOhm: 0.021,
    hazardLevel: 2,
  });
  const draft = await buildCellType(db, bench.scheduler.personId, {
    name: 'AA-2',
    state: 'draft',
    hazardLevel: null,
    releasedById: null,
    releasedAt: null,
  });
  const { body } = await bench.app.call(listCellTypes, bench.engineer);
  expect(body.items.slice(0, 2)).toEqual([
    {
      id: measured,
      name: 'AA-1',
      cellClass: 'cylindrical',
      format: '18650',
      chemistry: 'nmc811',
      capacityAh: 3.5,
      hazardLevel: 2,
      isReleased: true,
      minTemperatureC: -10,
      maxTemperatureC: 60,
      minVoltageV: 2.5,
      maxVoltageV: 4.2,
      maxHoldStateOfChargePct: 80,
      energyWh: 12.6,
      measured: {
        capacitanceFPerAh: null,
        resistanceOhm: 0.021,
        thermalTimeConstantS: null,
        entropicCoefficientVPerK: null,
        massKg: null,
        surfaceM2: null,
        selfDischargeAPerAh: null,
      },
    },
    expect.objectContaining({ id: draft, isReleased: false, hazardLevel: 7, measured: null }),
  ]);
});

test('cells page by serial, announced ones without serial first, and every cell once', async () => {
  const projectId = await buildProject(bench.app.db, [bench.engineer.personId]);
  const known = await bench.request({ projectId, cellCount: 3 });
  const announced = await bench.request({ projectId, cellCount: 2, areCellsHere: false });
  const serials = ['ZZ-3', 'ZZ-1', 'ZZ-2'];
  for (const [place, cellId] of known.cellIds.entries()) {
    await rename(cellId, { serial: serials[place] ?? '' });
  }
  const found: number[] = [];
  let cursor: string | null = null;
  do {
    const page = await cellsFor({ projectId, limit: 2, ...(cursor === null ? {} : { cursor }) });
    found.push(...ids(page.items));
    cursor = page.nextCursor;
  } while (cursor !== null);
  const [third, first, second] = known.cellIds;
  expect(found).toEqual([...announced.cellIds, first, second, third]);
  const refused = await bench.app.callRefused(listCells, bench.engineer, {
    query: { cursor: 'nonsense' },
  });
  expect(refused.problem.errors?.[0]?.pointer).toBe('#/query/cursor');
});

test('cells announced for a request that was withdrawn are not offered', async () => {
  const projectId = await buildProject(bench.app.db, [bench.engineer.personId]);
  const made = await bench.request({ projectId, areCellsHere: false });
  expect(ids((await cellsFor({ projectId })).items)).toEqual(made.cellIds);
  await bench.app.db
    .update(requestsTable)
    .set({ state: 'withdrawn' })
    .where(eq(requestsTable.id, made.requestId));
  expect((await cellsFor({ projectId })).items).toEqual([]);
});

test('type, text and being free narrow the list of cells', async () => {
  const projectId = await buildProject(bench.app.db, [bench.engineer.personId]);
  const other = await buildCellType(bench.app.db, bench.scheduler.personId, { name: 'OT-9_b' });
  const good = await bench.request({ projectId, cellCount: 2 });
  const odd = await bench.request({ projectId, cellTypeId: other });
  const taken = await bench.request({ projectId });
  await bench.book(taken);
  const [plain = 0, damaged = 0] = good.cellIds;
  await rename(plain, {
    serial: 'QX%1',
    lotCode: 'L-77',
    stateOfChargePct: 48,
    lastChargedAt: new Date('2026-01-05T10:00:00Z'),
    storageTemperatureC: 20,
    place: 'shelf 4',
  });
  await rename(damaged, { condition: 'damaged' });
  const found = async (query: Readonly<Record<string, string>>) =>
    ids((await cellsFor({ projectId, ...query })).items).toSorted((a, b) => a - b);

  expect(await found({ cellTypeId: String(other) })).toEqual(odd.cellIds);
  expect(await found({ text: 'x%1' })).toEqual([plain]);
  expect(await found({ text: 'l-77' })).toEqual([plain]);
  expect(await found({ text: '9_B' })).toEqual(odd.cellIds);
  expect(await found({ text: '%' })).toEqual([plain]);
  expect(await found({ isFree: 'true' })).toEqual([plain, ...odd.cellIds]);
  const [row] = (await cellsFor({ projectId, text: 'QX' })).items;
  expect(row).toMatchObject({
    serial: 'QX%1',
    cellTypeId: bench.cellTypeId,
    status: 'received',
    stateOfChargePct: 48,
    lastChargedAt: '2026-01-05T10:00:00.000Z',
    storageTemperatureC: 20,
    place: 'shelf 4',
  });
});

test('cells of projects one is not in, and of another site, are not there', async () => {
  const { db } = bench.app;
  const foreign = await buildProject(db, []);
  const theirs = await bench.request({ projectId: foreign });
  const [elsewhere] = await db.select().from(sitesTable).where(eq(sitesTable.code, 'otterholm'));
  const away = await bench.request({ siteId: elsewhere?.id ?? 0 });
  const nobody = await bench.app.signInAs({ roles: ['engineer'] });
  const scheduler = await bench.app.signInAs({ roles: ['scheduler'] });
  expect((await cellsFor({}, nobody)).items).toEqual([]);
  expect((await cellsFor({ projectId: foreign })).items).toEqual([]);
  expect(ids((await cellsFor({ projectId: foreign }, scheduler)).items)).toEqual(theirs.cellIds);
  expect(ids((await cellsFor({ limit: 100 }, scheduler)).items)).not.toContain(away.cellIds[0]);
});

test('projects say for whom one may ask; closed ones are gone', async () => {
  const { db } = bench.app;
  const engineer = await bench.app.signInAs({ roles: ['engineer'] });
  const own = await buildProject(db, [engineer.personId]);
  const other = await buildProject(db, []);
  const closed = await buildProject(db, [engineer.personId]);
  await db
    .update(projectsTable)
    .set({ name: 'Alder', customer: 'Pellwick Grid Storage' })
    .where(eq(projectsTable.id, own));
  await db
    .update(projectsTable)
    .set({ closedAt: new Date('2026-01-01T00:00:00Z') })
    .where(eq(projectsTable.id, closed));
  const seen = async (person: TestPerson) =>
    (await bench.app.call(listProjects, person)).body.items;

  expect(await seen(engineer)).toEqual([
    { id: own, name: 'Alder', customer: 'Pellwick Grid Storage', isMember: true },
  ]);
  const auditor = await bench.app.signInAs({ roles: ['auditor'] });
  const forAuditor = await seen(auditor);
  expect(forAuditor.find(({ id }) => id === other)).toMatchObject({ isMember: false });
  expect(forAuditor.map(({ id }) => id)).not.toContain(closed);
  const forScheduler = await seen(bench.scheduler);
  expect(forScheduler.find(({ id }) => id === other)).toMatchObject({ isMember: true });
});
