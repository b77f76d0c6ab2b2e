import { z } from 'zod';
import type { AuditEventDto } from '#shared/contracts/audit.contract.ts';
import type { BookingDto, BookingRow } from '#shared/contracts/bookings.contract.ts';
import { checkResultSchema } from '#shared/contracts/check.schemas.ts';
import type { CheckResultDto, PathDto, PhaseSpanDto } from '#shared/contracts/check.schemas.ts';
import type { PersonRef } from '#shared/contracts/common.ts';
import { slotEstimateSchema } from '#shared/contracts/estimate.schemas.ts';
import type { SlotEstimateDto } from '#shared/contracts/estimate.schemas.ts';
import { estimateModelVersion } from '#shared/domain/hold-estimate/types.ts';
import type {
  BookingPathRow,
  BookingRecord,
  CheckResultRow,
  LoadPhaseRecord,
} from './bookings.repository.ts';

/** What the caller may not look into is "taken": its place and time, nothing else. */
export function presentBookingRow(record: BookingRecord, isVisible: boolean): BookingRow {
  const { booking } = record;
  return {
    id: booking.id,
    isVisible,
    state: booking.state,
    isAtRisk: booking.atRisk,
    atRiskReason: isVisible ? booking.atRiskReason : null,
    requestId: isVisible ? booking.requestId : null,
    projectName: isVisible ? record.projectName : null,
    cellTypeName: isVisible ? record.cellTypeName : null,
    cellCount: record.cellCount ?? 0,
    chamberTag: record.chamberTag,
    loadId: booking.loadId,
    setTemperatureC: record.setTempMdegc / 1000,
    grade: booking.grade,
    startAt: new Date(booking.during.startMs).toISOString(),
    endAt: new Date(booking.during.endMs).toISOString(),
  };
}

export type BookingDetails = {
  readonly record: BookingRecord;
  readonly isVisible: boolean;
  readonly paths: readonly BookingPathRow[];
  readonly phases: readonly LoadPhaseRecord[];
  readonly checks: readonly CheckResultRow[];
  readonly deviations: BookingDto['deviations'];
  readonly events: readonly AuditEventDto[];
  readonly confirmedBy: PersonRef | null;
};

export function presentBooking(details: BookingDetails): BookingDto {
  const { record, isVisible, paths } = details;
  const { booking } = record;
  const place = {
    ...presentBookingRow(record, isVisible),
    paths: paths.map(presentPath),
    phases: details.phases.map(presentPhase),
    version: booking.version,
  };
  if (!isVisible) {
    return { ...place, ...nothingToSee };
  }
  return {
    ...place,
    kind: record.kind,
    requester: { id: record.requesterId, name: record.requesterName },
    lotId: booking.lotId,
    cells: paths.map(({ cellId, serial, positionTag }) => ({ id: cellId, serial, positionTag })),
    likelyS: booking.likelyS,
    safeS: booking.safeS,
    noShowAt: booking.noShowAt?.toISOString() ?? null,
    cancelReason: booking.cancelReason,
    checks: details.checks.map(presentCheck),
    checkedAt: details.checks[0]?.runAt.toISOString() ?? null,
    estimate: presentEstimate(record),
    deviations: details.deviations,
    history: details.events.map(presentEvent),
    confirmedBy: details.confirmedBy,
    confirmedAt: booking.confirmedAt?.toISOString() ?? null,
  };
}

const nothingToSee = {
  kind: null,
  requester: null,
  lotId: null,
  cells: [],
  likelyS: null,
  safeS: null,
  noShowAt: null,
  cancelReason: null,
  checks: [],
  checkedAt: null,
  estimate: null,
  deviations: [],
  history: [],
  confirmedBy: null,
  confirmedAt: null,
};

function presentPath(row: BookingPathRow): PathDto {
  return {
    panelId: row.panelId,
    panelName: row.panelName,
    sourceUnitId: row.sourceUnitId,
    sourceTag: row.sourceTag,
    meterUnitId: row.meterUnitId,
    meterTag: row.meterTag,
    meterRangeId: row.meterRangeId,
    meterRangeLabel: row.meterRangeLabel,
    positionUnitId: row.positionUnitId,
    positionTag: row.positionTag,
  };
}

export function presentPhase(row: LoadPhaseRecord): PhaseSpanDto {
  return {
    phase: row.phase,
    startAt: new Date(row.during.startMs).toISOString(),
    endAt: new Date(row.during.endMs).toISOString(),
    setTemperatureC: row.setTempMdegc / 1000,
  };
}

const storedEvidence = checkResultSchema.pick({
  evidence: true,
  waysOut: true,
  used: true,
  liftedByDeviationId: true,
});

function presentCheck(row: CheckResultRow): CheckResultDto {
  const { code, outcome, sentence } = row;
  return { code, outcome, sentence, ...storedEvidence.parse(row.evidence) };
}

/** An estimate frozen by another revision of the model stays stored, but is not drawn as if by this one. */
function presentEstimate({ booking }: BookingRecord): SlotEstimateDto | null {
  return booking.modelVersion === estimateModelVersion
    ? slotEstimateSchema.parse(booking.estimateResult)
    : null;
}

const eventDetail = z.looseObject({
  reason: z.string().nullish(),
  state: z.string().nullish(),
  chamberTag: z.string().nullish(),
});

function presentEvent(event: AuditEventDto): BookingDto['history'][number] {
  const detail = eventDetail.safeParse(event.after).data;
  return {
    at: event.at,
    actor: event.actor?.name ?? 'Millpond',
    what: wordsFor(event.action, detail),
    reason: detail?.reason ?? null,
  };
}

function wordsFor(action: string, detail: z.infer<typeof eventDetail> | undefined): string {
  const where = detail?.chamberTag ?? null;
  switch (action) {
    case 'booking.confirm': {
      const how = detail?.state === 'tentative' ? 'Booked tentatively' : 'Confirmed';
      return where === null ? how : `${how} in ${where}`;
    }
    case 'booking.move':
      return where === null ? 'Moved' : `Moved to ${where}`;
    case 'booking.cancel':
      return 'Cancelled';
    case 'booking.at-risk':
      return 'Put at risk';
    case 'booking.risk-cleared':
      return 'No longer at risk';
    default:
      return action;
  }
}
