import { formatSiteTime } from '#shared/domain/calendar/format-site-time.ts';
import type { CalendarIndex } from '#shared/domain/calendar/types.ts';
import type { Load, LoadMember, PhaseSpan, TakenSpan } from '#shared/domain/facility/types.ts';
import type { Span } from '#shared/domain/intervals/types.ts';
import { groupBy } from './group-by.ts';
import { openEndMs } from './open-end.ts';
import { readOwnPhases } from './own-phases.ts';
import type {
  AllocationRow,
  LoadMemberRow,
  LoadPhaseRow,
  OtherWorkRow,
  UnavailabilityRow,
} from './plan.repository.ts';

/** Highest voltage of a charged lithium-ion cell in common use; bounds the energy of unknown cells. */
const highestCellV = 4.4;

export function toTaken(row: AllocationRow): TakenSpan {
  const { unitId, during } = row;
  if (row.bookingId !== null) {
    const label = `booking ${row.bookingId}`;
    return { unitId, ...during, by: 'booking', recordId: row.bookingId, label };
  }
  if (row.outageId !== null) {
    const label = `outage ${row.outageId} (${row.outageTitle ?? 'planned'})`;
    return { unitId, ...during, by: 'outage', recordId: row.outageId, label };
  }
  const label = `${row.otherWorkKind ?? 'other'} work ${row.otherWorkId ?? 'without number'}`;
  return { unitId, ...during, by: 'outage', recordId: row.otherWorkId, label };
}

/** One breakdown of an instrument takes all units of it and of everything mounted in it. */
export function toUnavailable(
  row: UnavailabilityRow,
  unitIds: readonly number[],
  calendar: CalendarIndex,
): readonly TakenSpan[] {
  const span: Span = { startMs: row.startsAt.getTime(), endMs: row.endsAt?.getTime() ?? openEndMs };
  const until =
    row.endsAt === null ? 'end not known' : `until ${formatSiteTime(calendar, span.endMs)}`;
  const label = `${row.note.replace(/[.;,\s]+$/, '')}; ${until}`;
  return unitIds.map((unitId) => ({
    unitId,
    ...span,
    by: 'unavailability',
    recordId: null,
    label,
  }));
}

export function toLoads(
  phases: readonly LoadPhaseRow[],
  members: readonly LoadMemberRow[],
  otherWork: readonly OtherWorkRow[],
): Map<number, Load[]> {
  const membersOf = groupBy(members, (row) => row.loadId);
  const workIn = groupBy(otherWork, (row) => row.loadId);
  const loads = new Map<number, Load[]>();
  for (const [loadId, rows] of groupBy(phases, (row) => row.loadId)) {
    const [first] = rows;
    if (first === undefined) {
      continue;
    }
    const load: Load = {
      id: loadId,
      state: first.state,
      closesAtMs: first.closesAt?.getTime() ?? null,
      setTemperatureC: first.setTempMdegc / 1000,
      phases: rows.map(toPhase),
      members: [
        ...(membersOf.get(loadId) ?? []).map(toMember),
        ...(workIn.get(loadId) ?? []).map(toWorkMember),
      ],
    };
    loads.set(first.chamberId, [...(loads.get(first.chamberId) ?? []), load]);
  }
  return loads;
}

function toPhase(row: LoadPhaseRow): PhaseSpan {
  return { ...row.during, phase: row.phase, setTemperatureC: row.phaseTempMdegc / 1000 };
}

function toMember(row: LoadMemberRow): LoadMember {
  return {
    bookingId: row.bookingId,
    cells: row.cells,
    energyWh: row.energyWh,
    needsS: readOwnPhases(row.ownPhases, row.bookingId),
  };
}

/**
 * Other work counts against the limits of chamber and room too. Its cells are not registered, so their
 * energy is bounded by what its positions take; its number is negative to be no booking's.
 */
function toWorkMember(row: OtherWorkRow): LoadMember {
  return {
    bookingId: -row.id,
    cells: row.cells,
    energyWh: row.positionsMaxAh * highestCellV,
    needsS: {},
  };
}
