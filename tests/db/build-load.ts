import type { Tx } from '#server/db/client.ts';
import { chamberLoadsTable, loadPhasesTable } from '#server/db/tables/load.table.ts';
import type { LoadPhase } from '#shared/domain/hold-estimate/types.ts';
import { first } from './build-facility.ts';

const at = new Date('2030-01-01T00:00:00Z');
const minuteMs = 60_000;

export type TestLoad = {
  readonly chamberId: number;
  readonly strict: boolean;
  readonly startMs: number;
  readonly setTempMdegc: number;
  /** Each phase with its minutes, one after the other; connect, wait and unload are at 25 °C. */
  readonly phases: readonly (readonly [LoadPhase, number])[];
};

/** Puts a load with its phases into a chamber and returns its id. */
export async function buildLoad(tx: Tx, load: TestLoad): Promise<number> {
  const loadId = first(
    await tx
      .insert(chamberLoadsTable)
      .values({
        chamberId: load.chamberId,
        strict: load.strict,
        state: 'open',
        setTempMdegc: load.setTempMdegc,
        live: true,
        createdAt: at,
        updatedAt: at,
      })
      .returning({ id: chamberLoadsTable.id }),
  );
  let startMs = load.startMs;
  const rows = load.phases.map(([phase, minutes], seq) => {
    const endMs = startMs + minutes * minuteMs;
    const during = { startMs, endMs };
    startMs = endMs;
    const isIdle = phase === 'connect' || phase === 'wait' || phase === 'unload';
    return {
      loadId,
      chamberId: load.chamberId,
      strict: load.strict,
      seq,
      phase,
      setTempMdegc: isIdle ? 25_000 : load.setTempMdegc,
      during,
      live: true,
    };
  });
  await tx.insert(loadPhasesTable).values(rows);
  return loadId;
}
