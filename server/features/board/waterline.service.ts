import type { SiteScope } from '#server/actor.ts';
import type { Deps } from '#server/deps.ts';
import { groupBy } from '#server/features/availability/group-by.ts';
import {
  findUnavailabilities,
  loadSiteValidity,
} from '#server/features/availability/validity.service.ts';
import type { SiteValidity } from '#server/features/availability/validity.service.ts';
import { getSitePolicy } from '#server/features/settings/settings.service.ts';
import type { Waterline } from '#shared/contracts/board.contract.ts';
import { siteDay } from '#shared/domain/calendar/site-day.ts';
import { formatTemperature } from '#shared/domain/checks/words/format-temperature.ts';
import { listNewestLogs, listTaken, listTemperaturePhases, listUnits } from './board.repository.ts';
import type { TakenRow, UnitRow } from './board.repository.ts';
import { isInUse } from './tides.presenter.ts';

type Vessel = Waterline['vessels'][number];
const dayMs = 86_400_000;

/** Every chamber with what is planned in it now. No live reading. */
export async function getWaterline(
  deps: Pick<Deps, 'clock' | 'db'>,
  site: SiteScope,
): Promise<Waterline> {
  const nowMs = deps.clock.now().getTime();
  const moment = { startMs: nowMs, endMs: nowMs + 1000 };
  const validity = await loadSiteValidity(deps.db, site, nowMs, []);
  const policy = await getSitePolicy(deps, site.id);
  const units = (await listUnits(deps.db, site.id)).filter(
    ({ kind }) => kind === 'chamber-position',
  );
  const chambers = groupBy(units, ({ instrumentId }) => instrumentId);
  const chamberIds = [...chambers.keys()];
  const unitIds = units.map(({ unitId }) => unitId);
  const taken = await listTaken(deps.db, unitIds, moment);
  const temperatures = new Map(
    (await listTemperaturePhases(deps.db, chamberIds, moment)).map(
      (row) => [row.chamberId, row.setTempMdegc] as const,
    ),
  );
  const newest = new Map(
    (await listNewestLogs(deps.db, chamberIds)).map(
      (row) => [row.chamberId, row.assessedOn] as const,
    ),
  );
  const broken = await findUnavailabilities(deps.db, {
    instrumentIds: chamberIds.flatMap((id) => validity.chainOf(id)),
    unitIds: [],
    window: moment,
  });
  const oldestDay = siteDay(validity.calendar, nowMs - policy.stabilityMaxAgeDays * dayMs);
  const vessels = [...chambers].flatMap(([chamberId, positions]): Vessel[] => {
    const [first] = positions;
    return first === undefined
      ? []
      : [
          describe({
            first,
            positions: positions.length,
            taken: taken.filter((row) => positions.some(({ unitId }) => unitId === row.unitId)),
            mdegc: temperatures.get(chamberId) ?? first.idleTempMdegc ?? 25_000,
            isStale: (newest.get(chamberId) ?? '') < oldestDay,
            outReason: outReason(validity, chamberId, broken),
          }),
        ];
  });
  return {
    at: new Date(nowMs).toISOString(),
    positionsTaken: vessels.reduce((sum, vessel) => sum + vessel.taken, 0),
    positions: vessels.reduce((sum, vessel) => sum + vessel.positions, 0),
    vessels,
  };
}

function outReason(
  validity: SiteValidity,
  chamberId: number,
  broken: Awaited<ReturnType<typeof findUnavailabilities>>,
): string | null {
  if (validity.stateOf(chamberId) !== 'in-service') {
    return 'not in service';
  }
  const chain = validity.chainOf(chamberId);
  const report = broken.find(({ instrumentId }) => chain.includes(instrumentId ?? 0));
  return report === undefined ? null : report.note;
}

function describe(chamber: {
  readonly first: UnitRow;
  readonly positions: number;
  readonly taken: readonly TakenRow[];
  readonly mdegc: number;
  readonly isStale: boolean;
  readonly outReason: string | null;
}): Vessel {
  const { first, positions } = chamber;
  const inUse = chamber.taken.filter(isInUse).length;
  const closed = chamber.taken.find(({ outageId }) => outageId !== null);
  const isClosed = closed !== undefined && inUse === 0;
  const outReason = chamber.outReason ?? (isClosed ? (closed.outageTitle ?? 'outage') : null);
  const setTemperatureC = chamber.mdegc / 1000;
  const share = `${first.tag}: ${inUse} of ${positions} positions taken`;
  const plan = `${formatTemperature(setTemperatureC)}, as planned`;
  const base = {
    tag: first.tag,
    setTemperatureC,
    taken: inUse,
    positions,
  };
  if (outReason !== null) {
    return { ...base, state: 'out', sentence: `${share}; out of use: ${outReason}` };
  }
  return chamber.isStale
    ? { ...base, state: 'stale', sentence: `${share} at ${plan}; the last judged log is too old` }
    : { ...base, state: 'ok', sentence: `${share} at ${plan}` };
}
