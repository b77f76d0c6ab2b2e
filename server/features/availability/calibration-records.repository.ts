import { and, asc, eq, inArray, sql } from 'drizzle-orm';
import type { Reader } from '#server/db/client.ts';
import { calibrationScopesTable, calibrationsTable } from '#server/db/tables/calibration.table.ts';
import { limitationsTable } from '#server/db/tables/unit.table.ts';

/**
 * Approved calibrations that can still decide a day from `sinceDay` on: per instrument everything
 * since the oldest record that is not yet due then, because a later one takes over whatever it found.
 */
export async function listApprovedCalibrations(
  reader: Reader,
  instrumentIds: readonly number[],
  sinceDay: string,
) {
  const t = calibrationsTable;
  return reader
    .select({
      id: t.id,
      instrumentId: t.instrumentId,
      performedOn: t.performedOn,
      dueOn: t.dueOn,
      decidedAt: t.decidedAt,
      replacesId: t.replacesId,
      conformityAsLeft: t.conformityAsLeft,
    })
    .from(t)
    .where(
      and(
        inArray(t.instrumentId, [...instrumentIds]),
        eq(t.state, 'approved'),
        sql`${t.performedOn} >= (select min(older.performed_on) from ${t} older where older.instrument_id = calibration.instrument_id and older.state = 'approved' and older.due_on >= ${sinceDay})`,
      ),
    )
    .orderBy(asc(t.instrumentId), asc(t.performedOn), asc(t.id));
}
export type CalibrationRow = Awaited<ReturnType<typeof listApprovedCalibrations>>[number];

export async function listCalibrationScopes(reader: Reader, calibrationIds: readonly number[]) {
  const t = calibrationScopesTable;
  if (calibrationIds.length === 0) {
    return [];
  }
  return reader
    .select({
      calibrationId: t.calibrationId,
      channelId: t.channelId,
      function: t.function,
      meterRangeId: t.meterRangeId,
      limitation: t.limitation,
    })
    .from(t)
    .where(inArray(t.calibrationId, [...calibrationIds]));
}
export type CalibrationScopeRow = Awaited<ReturnType<typeof listCalibrationScopes>>[number];

export async function listLimitations(reader: Reader, unitIds: readonly number[]) {
  const t = limitationsTable;
  if (unitIds.length === 0) {
    return [];
  }
  return reader
    .select({
      unitId: t.unitId,
      note: t.note,
      maxCurrentA: t.maxCurrentA,
      startsAt: t.startsAt,
      endsAt: t.endsAt,
    })
    .from(t)
    .where(inArray(t.unitId, [...unitIds]))
    .orderBy(asc(t.startsAt), asc(t.id));
}
export type LimitationRow = Awaited<ReturnType<typeof listLimitations>>[number];
