import { toStabilityFact } from '#server/features/availability/to-equipment.ts';
import type { ScopeFacts, SiteValidity } from '#server/features/availability/validity.service.ts';
import type { BookingRow } from '#shared/contracts/bookings.contract.ts';
import type {
  InstrumentDto,
  InstrumentRow,
  ScopeState,
} from '#shared/contracts/equipment.contract.ts';
import type {
  AssessmentRecord,
  CalibrationRecord,
  RegisterRow,
  Specs,
  UnavailabilityRecord,
} from './equipment.repository.ts';
import { presentFacts } from './facts.presenter.ts';

export function presentInstrumentRow(
  { instrument, roomName, custodianName, unitCount }: RegisterRow,
  validity: SiteValidity,
): InstrumentRow {
  const badge = validity.badgeOf(instrument.id);
  return {
    tag: instrument.tag,
    kind: instrument.kind,
    model: instrument.model,
    serial: instrument.serial ?? '',
    roomName,
    state: instrument.state,
    badge: badge?.word ?? null,
    dueOn: badge?.dueOn ?? null,
    channelCount: unitCount,
    custodian:
      instrument.custodianId === null || custodianName === null
        ? null
        : { id: instrument.custodianId, name: custodianName },
  };
}

export type InstrumentDetails = {
  readonly row: RegisterRow;
  readonly validity: SiteValidity;
  readonly relatives: { readonly parentTag: string | null; readonly childTags: string[] };
  readonly specs: Specs;
  readonly calibrations: readonly CalibrationRecord[];
  readonly assessments: readonly AssessmentRecord[];
  /** Logs that ended before this instant no longer count. */
  readonly oldestCountingMs: number;
  readonly unavailability: readonly UnavailabilityRecord[];
  readonly nextBookings: readonly BookingRow[];
};

export function presentInstrument(details: InstrumentDetails): InstrumentDto {
  const { instrument } = details.row;
  return {
    ...presentInstrumentRow(details.row, details.validity),
    firmware: instrument.firmware,
    ...details.relatives,
    note: instrument.note ?? '',
    facts: presentFacts(details.specs),
    scopes: details.validity.scopesOf(instrument.id).map(presentScope),
    calibrations: details.calibrations.map((record) => ({
      id: record.id,
      performedOn: record.performedOn,
      dueOn: record.dueOn,
      certificateNumber: record.certificateNumber,
      state: record.state,
      conformityAsLeft: record.conformityAsLeft,
      provider: record.provider,
    })),
    assessments: details.assessments.map(({ assessment, assessedBy }) => ({
      id: assessment.id,
      setTemperatureC: assessment.setTempMdegc / 1000,
      assessedOn: assessment.assessedOn,
      hoursLogged: assessment.hoursLogged,
      driftKPerH: assessment.driftKPerH,
      halfBandK: assessment.halfBandK,
      periodS: assessment.periodS,
      resolutionK: assessment.resolutionK,
      sensorPlace: assessment.sensorPlace,
      isTooOld:
        toStabilityFact(assessment, details.validity.calendar).assessedAtMs <
        details.oldestCountingMs,
      assessedBy,
    })),
    unavailability: details.unavailability.map(({ row, reportedBy }) => ({
      id: row.id,
      kind: row.reason,
      from: row.startsAt.toISOString(),
      until: row.endsAt?.toISOString() ?? null,
      reason: row.note,
      reportedBy,
    })),
    nextBookings: [...details.nextBookings],
    version: instrument.version,
  };
}

function presentScope(scope: ScopeFacts): ScopeState {
  const { badge, spans } = scope;
  const current = spans.find((span) => span.endMs === badge.validUntilMs) ?? spans.at(-1);
  return {
    channelLabel: scope.channelLabel,
    function: scope.function,
    rangeLabel: scope.rangeLabel,
    meterRangeId: scope.meterRangeId,
    channelId: scope.channelId,
    badge: badge.word,
    dueOn: badge.dueOn,
    calibrationId: current?.calibrationId ?? null,
    limitation: current?.limitation ?? null,
  };
}
