import type { BookingRow, LoadDto } from '#shared/contracts/bookings.contract.ts';
import type { LoadContents, LoadRecord, listPhases } from './loads.repository.ts';

export function presentLoad(input: {
  readonly record: LoadRecord;
  readonly phases: Awaited<ReturnType<typeof listPhases>>;
  readonly bookings: readonly BookingRow[];
  readonly contents: LoadContents;
}): LoadDto {
  const { record, phases, contents } = input;
  const { load } = record;
  const startMs = phases[0]?.during.startMs ?? load.createdAt.getTime();
  const cellCount = contents.cells + contents.otherCells;
  return {
    id: load.id,
    chamberTag: record.chamberTag,
    state: load.state,
    setTemperatureC: load.setTempMdegc / 1000,
    closesAt: load.closesAt?.toISOString() ?? null,
    startAt: new Date(startMs).toISOString(),
    endAt: new Date(phases.at(-1)?.during.endMs ?? startMs).toISOString(),
    isStrictDoor: load.strict,
    phases: phases.map((phase) => ({
      phase: phase.phase,
      startAt: new Date(phase.during.startMs).toISOString(),
      endAt: new Date(phase.during.endMs).toISOString(),
      setTemperatureC: phase.setTempMdegc / 1000,
    })),
    bookings: [...input.bookings],
    positionsTaken: cellCount,
    positions: contents.positions,
    cellCount,
    energyWh: contents.energyWh,
    maxEnergyWh: record.maxEnergyWh,
    maxCells: record.maxCells,
    version: load.version,
  };
}
