import type { Db } from '#server/db/client.ts';
import {
  calibrationScopesTable,
  calibrationsTable,
  dutiesTable,
} from '#server/db/tables/calibration.table.ts';
import { chamberPositionsTable, chamberSpecsTable } from '#server/db/tables/chamber.table.ts';
import {
  channelsTable,
  meterRangesTable,
  sourceSpecsTable,
} from '#server/db/tables/channel.table.ts';
import { instrumentsTable } from '#server/db/tables/instrument.table.ts';
import { panelMembersTable, panelsTable } from '#server/db/tables/panel.table.ts';
import { stabilityAssessmentsTable } from '#server/db/tables/stability-assessment.table.ts';
import { unattendedPermissionsTable, unitsTable } from '#server/db/tables/unit.table.ts';
import type { Placement } from '#shared/contracts/check.schemas.ts';
import type { CalibratedFunction, InstrumentKind } from '#shared/domain/states.ts';

const at = new Date('2026-01-12T09:00:00Z');
const stamps = { createdAt: at, updatedAt: at };

export type Keepers = {
  readonly siteId: number;
  /** Who recorded things, and the second person who approved them. */
  readonly authorId: number;
  readonly approverId: number;
};
export type BookableChamber = {
  readonly chamberId: number;
  readonly chamberTag: string;
  readonly sourceInstrumentId: number;
  readonly meterInstrumentId: number;
  readonly paths: Placement['paths'];
};
export type ChamberWish = {
  /** Two digits: chamber C<n>, source S<n>, meter M<n>. */
  readonly number: string;
  readonly size?: number;
  readonly isStrict?: boolean;
  readonly roomId?: number;
};

/**
 * A chamber with one wired panel in which everything is in service, in date until 10 January 2027 and
 * logged at 25 and 45 °C in the middle of February 2026. Nothing is booked in it.
 */
export async function buildBookableChamber(
  db: Db,
  keepers: Keepers,
  wish: ChamberWish,
): Promise<BookableChamber> {
  const { number, size = 4 } = wish;
  const chamberTag = `C${number}`;
  const chamberId = await buildInstrument(db, keepers, chamberTag, 'chamber', wish.roomId);
  await buildChamberRecords(db, keepers, chamberId, wish.isStrict ?? true);
  const sourceInstrumentId = await buildInstrument(db, keepers, `S${number}`, 'source');
  const meterInstrumentId = await buildInstrument(db, keepers, `M${number}`, 'meter');
  await db.insert(sourceSpecsTable).values({
    instrumentId: sourceInstrumentId,
    minV: 0,
    maxV: 6,
    stabilityVPerH: 5e-8,
    noiseV: 1e-6,
    outputOhm: 0.01,
    tempcoVPerK: 1e-6,
    ...stamps,
  });
  const meterRangeId = await buildRange(db, meterInstrumentId);
  await calibrate(db, keepers, sourceInstrumentId, 'source');
  await calibrate(db, keepers, meterInstrumentId, 'measure');
  const panelId = first(
    await db
      .insert(panelsTable)
      .values({
        name: `P${number}`,
        chamberId,
        leadResistanceOhm: 0.05,
        guarded: true,
        recablingAllowed: false,
        ...stamps,
      })
      .returning({ id: panelsTable.id }),
  );
  const paths: Placement['paths'] = [];
  for (let place = 1; place <= size; place += 1) {
    const source = await buildChannel(db, sourceInstrumentId, `S${number}/${place}`, 'source');
    const meter = await buildChannel(db, meterInstrumentId, `M${number}/${place}`, 'measure');
    const position = await buildPosition(db, chamberId, `${chamberTag}/${place}`);
    await db
      .insert(panelMembersTable)
      .values([source, meter, position].map((unitId) => ({ panelId, unitId })));
    paths.push({
      panelId,
      sourceUnitId: source,
      meterUnitId: meter,
      meterRangeId,
      positionUnitId: position,
    });
  }
  return { chamberId, chamberTag, sourceInstrumentId, meterInstrumentId, paths };
}

async function buildInstrument(
  db: Db,
  keepers: Keepers,
  tag: string,
  kind: InstrumentKind,
  roomId?: number,
): Promise<number> {
  const { siteId } = keepers;
  return first(
    await db
      .insert(instrumentsTable)
      .values({
        tag,
        kind,
        model: 'bench',
        siteId,
        state: 'in-service',
        ...(roomId === undefined ? {} : { roomId }),
        ...stamps,
      })
      .returning({ id: instrumentsTable.id }),
  );
}

async function buildChamberRecords(
  db: Db,
  keepers: Keepers,
  chamberId: number,
  strict: boolean,
): Promise<void> {
  await db.insert(chamberSpecsTable).values({
    instrumentId: chamberId,
    minSetTempMdegc: -20_000,
    maxSetTempMdegc: 80_000,
    rampKPerMin: 1,
    strict,
    protectionLevel: 5,
    maxEnergyWh: 2000,
    maxCells: 100,
    ...stamps,
  });
  await calibrate(db, keepers, chamberId, 'temperature');
  await db.insert(dutiesTable).values({
    instrumentId: chamberId,
    kind: 'mapping',
    intervalMonths: 12,
    nextDueOn: '2027-01-09',
    ...stamps,
  });
  await db.insert(unattendedPermissionsTable).values({
    chamberId,
    maxHazard: 5,
    maxTemperatureC: 60,
    maxStateOfChargePct: 100,
    contact: 'the duty phone',
    startsAt: at,
    note: 'holds at night',
    grantedById: keepers.approverId,
    ...stamps,
  });
  await db.insert(stabilityAssessmentsTable).values(
    [25_000, 45_000].map((setTempMdegc) => ({
      chamberId,
      setTempMdegc,
      assessedOn: '2026-02-16',
      logFromAt: new Date('2026-02-12T12:00:00Z'),
      logToAt: new Date('2026-02-15T12:00:00Z'),
      hoursLogged: 72,
      driftKPerH: 0.0005,
      halfBandK: 0.0005,
      periodS: 600,
      resolutionK: 0.001,
      sensorPlace: 'air',
      doorTolerant: !strict,
      assessedById: keepers.authorId,
      ...stamps,
    })),
  );
}

/** An approved calibration of everything the instrument does, due on 9 January 2027. */
export async function calibrate(
  db: Db,
  keepers: Keepers,
  instrumentId: number,
  calibrated: CalibratedFunction,
  change: Partial<typeof calibrationsTable.$inferInsert> = {},
): Promise<number> {
  return db.transaction(async (tx) => {
    const calibrationId = first(
      await tx
        .insert(calibrationsTable)
        .values({
          instrumentId,
          state: 'approved',
          performedOn: '2026-01-10',
          dueOn: '2027-01-09',
          inHouse: true,
          provider: 'own bench',
          certificateNumber: `N-${instrumentId}`,
          conformityAsFound: 'conforms',
          conformityAsLeft: 'conforms',
          recordedById: keepers.authorId,
          decidedById: keepers.approverId,
          decidedAt: at,
          ...stamps,
          ...change,
        })
        .returning({ id: calibrationsTable.id }),
    );
    await tx.insert(calibrationScopesTable).values({ calibrationId, function: calibrated });
    return calibrationId;
  });
}

async function buildRange(db: Db, instrumentId: number): Promise<number> {
  return first(
    await db
      .insert(meterRangesTable)
      .values({
        instrumentId,
        label: '100 µA',
        fullScaleA: 1e-4,
        resolutionA: 1e-9,
        noiseA: 1e-8,
        accuracyPpmReading: 500,
        accuracyPpmRange: 100,
        accuracyA: 0,
        burdenOhm: 10,
        burdenInsideLoop: true,
        sampleIntervalS: 1,
        ...stamps,
      })
      .returning({ id: meterRangesTable.id }),
  );
}

async function buildChannel(
  db: Db,
  instrumentId: number,
  label: string,
  does: 'source' | 'measure',
): Promise<number> {
  const channelId = first(
    await db
      .insert(channelsTable)
      .values({ instrumentId, label, function: does, ...stamps })
      .returning({ id: channelsTable.id }),
  );
  const kind = does === 'source' ? 'source-channel' : 'meter-channel';
  return first(
    await db
      .insert(unitsTable)
      .values({ kind, instrumentId, channelId })
      .returning({ id: unitsTable.id }),
  );
}

async function buildPosition(db: Db, chamberId: number, label: string): Promise<number> {
  const positionId = first(
    await db
      .insert(chamberPositionsTable)
      .values({ chamberId, label, formats: ['18650', '21700'], maxAh: 6, maxHazard: 5, ...stamps })
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
