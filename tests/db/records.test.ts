import { and, eq } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { connectDatabase, type Database } from '#server/db/client.ts';
import { calibrationScopesTable, calibrationsTable } from '#server/db/tables/calibration.table.ts';
import { channelsTable } from '#server/db/tables/channel.table.ts';
import { deviationsTable } from '#server/db/tables/check-result.table.ts';
import { instrumentsTable } from '#server/db/tables/instrument.table.ts';
import { unavailabilitiesTable } from '#server/db/tables/outage.table.ts';
import { grantsTable } from '#server/db/tables/person.table.ts';
import { projectsTable } from '#server/db/tables/project.table.ts';
import { requestsTable } from '#server/db/tables/request.table.ts';
import { sitesTable } from '#server/db/tables/site.table.ts';
import { unitsTable } from '#server/db/tables/unit.table.ts';
import { createTestDatabase, type TestDatabase } from '#tests/support/test-database.ts';
import { buildFacility, first, type TestFacility } from './build-facility.ts';
import { refusalOf } from './refusal-of.ts';

const at = new Date('2030-01-01T00:00:00Z');
const stamps = { createdAt: at, updatedAt: at };
let home: TestDatabase;
let database: Database;
let facility: TestFacility;

beforeAll(async () => {
  home = await createTestDatabase();
  database = connectDatabase({ url: home.url });
  facility = await buildFacility(database.db);
});
afterAll(async () => {
  await database.close();
  await home.drop();
});

describe('a versioned row', () => {
  test('is edited by one of two people who saw the same version', async () => {
    const edit = (name: string) =>
      database.db
        .update(sitesTable)
        .set({ name, version: 2 })
        .where(and(eq(sitesTable.id, facility.siteId), eq(sitesTable.version, 1)))
        .returning({ version: sitesTable.version });
    const outcomes = await Promise.all([edit('Upper race'), edit('Lower race')]);
    expect(outcomes.map((rows) => rows.length).sort()).toEqual([0, 1]);
  });
});

describe('a site', () => {
  test('keeps its working hours as they were given', async () => {
    const workingHours = { '1': [{ fromMin: 480, toMin: 1020 }], '2': [] };
    await database.db
      .update(sitesTable)
      .set({ workingHours })
      .where(eq(sitesTable.id, facility.siteId));
    const [row] = await database.db.select().from(sitesTable);
    expect(row?.workingHours).toEqual(workingHours);
  });

  test('never stores hours that end before they start', async () => {
    const write = async () =>
      database.db
        .update(sitesTable)
        .set({ workingHours: { '1': [{ fromMin: 1020, toMin: 480 }] } })
        .where(eq(sitesTable.id, facility.siteId));
    await expect(write()).rejects.toThrow('Hours must end after they start.');
  });
});

describe('a grant', () => {
  test('for every site is held once, although its site is empty', async () => {
    const grant = () =>
      database.db.insert(grantsTable).values({
        personId: facility.personId,
        role: 'auditor',
        origin: 'local',
        createdAt: at,
      });
    await grant();
    await expect(refusalOf(grant())).resolves.toEqual({
      code: '23505',
      constraint: 'role_grant_once',
    });
  });
});

describe('a unit', () => {
  test('is refused without the thing it stands for', async () => {
    const write = database.db
      .insert(unitsTable)
      .values({ kind: 'source-channel', instrumentId: facility.strictChamberId });
    await expect(refusalOf(write)).resolves.toMatchObject({ constraint: 'unit_is_one_thing' });
  });

  test('is refused for a channel of another instrument', async () => {
    const instrumentId = await buildSource('S01');
    const channelId = first(
      await database.db
        .insert(channelsTable)
        .values({ instrumentId, label: 'S01/1', function: 'source', ...stamps })
        .returning({ id: channelsTable.id }),
    );
    const write = database.db
      .insert(unitsTable)
      .values({ kind: 'source-channel', instrumentId: facility.strictChamberId, channelId });
    await expect(refusalOf(write)).resolves.toEqual({
      code: '23503',
      constraint: 'unit_channel_of_instrument',
    });
  });
});

describe('an unavailability', () => {
  test('is never refused over another one', async () => {
    const report = () =>
      database.db
        .insert(unavailabilitiesTable)
        .values({
          instrumentId: facility.strictChamberId,
          reason: 'breakdown',
          note: 'The fan stands still.',
          startsAt: at,
          reportedById: facility.personId,
          ...stamps,
        })
        .returning({ id: unavailabilitiesTable.id });
    await report();
    await expect(report()).resolves.toHaveLength(1);
  });

  test('is of an instrument or of a unit, not of both', async () => {
    const write = database.db.insert(unavailabilitiesTable).values({
      instrumentId: facility.strictChamberId,
      unitId: facility.unitIds[0] ?? 0,
      reason: 'other',
      note: 'Both.',
      startsAt: at,
      reportedById: facility.personId,
      ...stamps,
    });
    await expect(refusalOf(write)).resolves.toMatchObject({ constraint: 'unavailability_of_one' });
  });
});

describe('a request', () => {
  test('may be an open draft, but not be submitted incomplete', async () => {
    const id = first(
      await database.db
        .insert(requestsTable)
        .values({
          siteId: facility.siteId,
          requesterId: facility.personId,
          state: 'draft',
          kind: 'settled',
          grade: 'reported',
          ...stamps,
        })
        .returning({ id: requestsTable.id }),
    );
    const submit = (rest: Partial<typeof requestsTable.$inferInsert>) =>
      database.db
        .update(requestsTable)
        .set({ state: 'submitted', submittedAt: at, ...rest })
        .where(eq(requestsTable.id, id));
    await expect(refusalOf(submit({}))).resolves.toMatchObject({ constraint: 'request_complete' });

    const projectId = first(
      await database.db
        .insert(projectsTable)
        .values({ code: 'P1', name: 'Sluice', ...stamps })
        .returning({ id: projectsTable.id }),
    );
    await submit({
      projectId,
      setTempMdegc: 25_000,
      toleranceKind: 'relative',
      toleranceFraction: 0.1,
    });
    const [row] = await database.db.select().from(requestsTable).where(eq(requestsTable.id, id));
    expect(row?.state).toBe('submitted');
  });

  test('with a relative tolerance names the fraction', async () => {
    const write = database.db.insert(requestsTable).values({
      siteId: facility.siteId,
      requesterId: facility.personId,
      state: 'draft',
      kind: 'settled',
      grade: 'reported',
      toleranceKind: 'relative',
      toleranceFraction: 1.5,
      ...stamps,
    });
    await expect(refusalOf(write)).resolves.toMatchObject({ constraint: 'request_tolerance' });
  });
});

describe('a deviation', () => {
  test('is not granted by the one who asked', async () => {
    const requestId = first(
      await database.db
        .insert(requestsTable)
        .values({
          siteId: facility.siteId,
          requesterId: facility.personId,
          state: 'draft',
          kind: 'screening',
          grade: 'indicative',
          ...stamps,
        })
        .returning({ id: requestsTable.id }),
    );
    const write = database.db.insert(deviationsTable).values({
      requestId,
      checkCode: 'rest-time',
      state: 'granted',
      reason: 'One batch of equal history.',
      requestedById: facility.personId,
      requestedAt: at,
      decidedById: facility.personId,
      decidedAt: at,
      ...stamps,
    });
    await expect(refusalOf(write)).resolves.toMatchObject({ constraint: 'deviation_by_another' });
  });
});

describe('a calibration', () => {
  async function record(instrumentId: number) {
    return first(
      await database.db
        .insert(calibrationsTable)
        .values({
          instrumentId,
          state: 'awaiting-approval',
          performedOn: '2030-01-10',
          dueOn: '2031-01-10',
          inHouse: true,
          provider: 'in-house',
          certificateNumber: 'MR-2030-7',
          conformityAsFound: 'conforms',
          conformityAsLeft: 'conforms',
          recordedById: facility.personId,
          ...stamps,
        })
        .returning({ id: calibrationsTable.id }),
    );
  }

  function change(id: number, values: Partial<typeof calibrationsTable.$inferInsert>) {
    return database.db.update(calibrationsTable).set(values).where(eq(calibrationsTable.id, id));
  }

  function decide(id: number, decidedById: number) {
    return change(id, { state: 'approved', decidedById, decidedAt: at, version: 2 });
  }

  test('is approved by a second person only', async () => {
    const id = await record(await buildSource('S11'));
    await expect(refusalOf(decide(id, facility.personId))).resolves.toMatchObject({
      constraint: 'calibration_second_person',
    });
    await expect(refusalOf(change(id, { state: 'approved' }))).resolves.toMatchObject({
      constraint: 'calibration_decided',
    });
    await decide(id, facility.secondPersonId);
  });

  test('is not edited once approved, only replaced', async () => {
    const id = await record(await buildSource('S12'));
    await change(id, { dueOn: '2030-12-01' });
    await decide(id, facility.secondPersonId);
    await expect(refusalOf(change(id, { dueOn: '2032-01-10' }))).resolves.toMatchObject({
      constraint: 'calibration_approved_is_final',
    });
    await expect(refusalOf(change(id, { state: 'draft' }))).resolves.toMatchObject({
      constraint: 'calibration_approved_is_final',
    });
    await change(id, { state: 'replaced', version: 3 });
    await expect(refusalOf(change(id, { note: 'afterthought' }))).resolves.toMatchObject({
      constraint: 'calibration_approved_is_final',
    });
  });

  test('keeps its scope once approved', async () => {
    const id = await record(await buildSource('S13'));
    const addScope = (calibratedFunction: 'source' | 'measure') =>
      database.db
        .insert(calibrationScopesTable)
        .values({ calibrationId: id, function: calibratedFunction });
    await addScope('source');
    await decide(id, facility.secondPersonId);
    await expect(refusalOf(addScope('measure'))).resolves.toMatchObject({
      constraint: 'calibration_approved_is_final',
    });
    const removal = database.db
      .delete(calibrationScopesTable)
      .where(eq(calibrationScopesTable.calibrationId, id));
    await expect(refusalOf(removal)).resolves.toMatchObject({
      constraint: 'calibration_approved_is_final',
    });
  });

  test('may be written whole, scope and all, in one transaction', async () => {
    const instrumentId = await buildSource('S14');
    const scopes = await database.transact(async (tx) => {
      const id = first(
        await tx
          .insert(calibrationsTable)
          .values({
            instrumentId,
            state: 'approved',
            performedOn: '2028-01-10',
            dueOn: '2029-01-10',
            inHouse: false,
            provider: 'Weir Metrology',
            certificateNumber: 'W-1',
            conformityAsFound: 'not-stated',
            conformityAsLeft: 'conforms',
            recordedById: facility.personId,
            decidedById: facility.secondPersonId,
            decidedAt: at,
            ...stamps,
          })
          .returning({ id: calibrationsTable.id }),
      );
      return tx
        .insert(calibrationScopesTable)
        .values({ calibrationId: id, function: 'source' })
        .returning({ id: calibrationScopesTable.id });
    });
    expect(scopes).toHaveLength(1);
  });
});

async function buildSource(tag: string): Promise<number> {
  return first(
    await database.db
      .insert(instrumentsTable)
      .values({
        tag,
        kind: 'source',
        model: 'V 10',
        siteId: facility.siteId,
        state: 'in-service',
        ...stamps,
      })
      .returning({ id: instrumentsTable.id }),
  );
}
