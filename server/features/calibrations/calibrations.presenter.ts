import type {
  CalibrationDto,
  DutyRow,
  listCalibrations,
} from '#shared/contracts/calibrations.contract.ts';
import type { z } from 'zod';
import type { BadgeState } from '#shared/domain/calibration-validity/calibration-badge.ts';
import type { DutyRecord, RecordRow, ScopeRow } from './calibrations.repository.ts';

type RecordListRow = z.output<typeof listCalibrations.response>['items'][number];

export type DutyFacts = {
  readonly badge: BadgeState | null;
  /** From today at the site to the due day; negative when overdue. */
  readonly daysLeft: number | null;
  readonly lastCalibrationId: number | null;
  readonly awaitingApprovalId: number | null;
  readonly bookingsPastDue: number;
  readonly atRisk: number;
};

export function presentDuty(row: DutyRecord, facts: DutyFacts): DutyRow {
  const { duty } = row;
  return {
    dutyId: duty.id,
    tag: row.tag,
    instrumentKind: row.kind,
    model: row.model,
    kind: 'calibration',
    scope:
      [row.channelLabel, row.rangeLabel].filter((part) => part !== null).join(', ') ||
      'whole instrument',
    badge: facts.badge?.word ?? 'not-calibrated',
    dueOn: facts.badge?.dueOn ?? duty.nextDueOn,
    daysLeft: facts.daysLeft,
    intervalMonths: duty.intervalMonths,
    custodian:
      duty.custodianId === null || row.custodianName === null
        ? null
        : { id: duty.custodianId, name: row.custodianName },
    lastCalibrationId: facts.lastCalibrationId,
    awaitingApprovalId: facts.awaitingApprovalId,
    bookingsPastDue: facts.bookingsPastDue,
    atRisk: facts.atRisk,
  };
}

export function presentRecordRow(row: RecordRow): RecordListRow {
  const { record } = row;
  return {
    id: record.id,
    tag: row.tag,
    model: row.model,
    state: record.state,
    performedOn: record.performedOn,
    dueOn: record.dueOn,
    provider: record.provider,
    certificateNumber: record.certificateNumber,
    conformityAsFound: record.conformityAsFound,
    conformityAsLeft: record.conformityAsLeft,
    recordedBy: { id: record.recordedById, name: row.recordedBy },
    recordedAt: record.createdAt.toISOString(),
  };
}

export function presentRecord(row: RecordRow, scopes: readonly ScopeRow[]): CalibrationDto {
  const { record, file } = row;
  return {
    ...presentRecordRow(row),
    note: record.note ?? '',
    scopes: [...scopes],
    file,
    decidedBy:
      record.decidedById === null || row.decidedBy === null
        ? null
        : { id: record.decidedById, name: row.decidedBy },
    decidedAt: record.decidedAt?.toISOString() ?? null,
    refusalReason: record.refusalReason,
    replacesId: record.replacesId,
    replacedById: row.replacedById,
    version: record.version,
  };
}
