import { z } from 'zod';
import type { SignedIn, SiteScope } from '#server/actor.ts';
import type { Deps } from '#server/deps.ts';
import { seesEveryProject } from '#server/features/requests/requests.service.ts';
import { decodeCursor, encodeCursor, rowsToRead, toPage } from '#server/paging.ts';
import type { Page } from '#server/paging.ts';
import type {
  CellRow,
  CellTypeDto,
  listCells as listCellsContract,
  listProjects as listProjectsContract,
} from '#shared/contracts/registers.contract.ts';
import { rolesAt } from '#shared/domain/policies/roles-at.ts';
import { listCellRows, listCellTypeRows, listProjectRows } from './registers.repository.ts';
import type { CellRecord, CellTypeRow } from './registers.repository.ts';

type Reading = Pick<Deps, 'db'>;
const highestHazardLevel = 7;

export async function listCellTypes(deps: Reading): Promise<CellTypeDto[]> {
  return (await listCellTypeRows(deps.db)).map(presentCellType);
}

function presentCellType(row: CellTypeRow): CellTypeDto {
  const measured = {
    capacitanceFPerAh: row.capacitanceFPerAh,
    resistanceOhm: row.resistanceOhm,
    thermalTimeConstantS: row.thermalTimeConstantS,
    entropicCoefficientVPerK: row.entropicCoefficientVPerK,
    massKg: row.massKg,
    surfaceM2: row.surfaceM2,
    selfDischargeAPerAh: row.selfDischargeAPerAh,
  };
  return {
    id: row.id,
    name: row.name,
    cellClass: row.cellClass,
    format: row.format,
    chemistry: row.chemistry,
    capacityAh: row.capacityAh,
    // Nobody has judged it yet: it counts as the most dangerous there is.
    hazardLevel: row.hazardLevel ?? highestHazardLevel,
    isReleased: row.state === 'released',
    minTemperatureC: row.minTestC,
    maxTemperatureC: row.maxTestC,
    minVoltageV: row.minV,
    maxVoltageV: row.maxV,
    maxHoldStateOfChargePct: row.maxHoldStateOfChargePct,
    energyWh: row.capacityAh * row.nominalV,
    measured: Object.values(measured).every((figure) => figure === null) ? null : measured,
  };
}

const sort = 'serial';

export async function listCells(
  deps: Reading,
  actor: SignedIn,
  site: SiteScope,
  query: z.output<typeof listCellsContract.query>,
): Promise<Page<CellRow>> {
  const after = decodeCursor(sort, z.tuple([z.string(), z.int()]), query.cursor);
  const { cellTypeId, projectId, text, isFree } = query;
  const rows = await listCellRows(
    deps.db,
    {
      siteId: site.id,
      projectIds: seesEveryProject(actor, site) ? null : actor.projectIds,
      ...(cellTypeId === undefined ? {} : { cellTypeId }),
      ...(projectId === undefined ? {} : { projectId }),
      ...(text === undefined ? {} : { text }),
      isFree: isFree === 'true',
    },
    after,
    rowsToRead(query),
  );
  return toPage(rows, query, presentCell, ({ cell }) =>
    encodeCursor(sort, [cell.serial ?? '', cell.id]),
  );
}

function presentCell({ cell, cellTypeName, projectName }: CellRecord): CellRow {
  return {
    id: cell.id,
    serial: cell.serial,
    cellTypeId: cell.cellTypeId,
    cellTypeName,
    projectName,
    status: cell.status,
    stateOfChargePct: cell.stateOfChargePct,
    lastChargedAt: cell.lastChargedAt?.toISOString() ?? null,
    storageTemperatureC: cell.storageTemperatureC,
    place: cell.place ?? '',
  };
}

/** Projects whose name the caller may read; schedulers ask for anybody's, others for their own. */
export async function listProjects(
  deps: Reading,
  actor: SignedIn,
  site: SiteScope,
): Promise<z.output<typeof listProjectsContract.response>['items']> {
  const seesAll = seesEveryProject(actor, site);
  const asksForAll = rolesAt(actor, site.code).includes('scheduler');
  const rows = await listProjectRows(deps.db, seesAll ? null : actor.projectIds);
  return rows.map(({ id, name, customer }) => ({
    id,
    name,
    customer: customer ?? '',
    isMember: asksForAll || actor.projectIds.includes(id),
  }));
}
