import { z } from 'zod';
import type { SiteScope } from '#server/actor.ts';
import type { Deps } from '#server/deps.ts';
import { decodeCursor, encodeCursor, rowsToRead, toPage } from '#server/paging.ts';
import { notFound } from '#server/problem.ts';
import type {
  CalibrationDto,
  listCalibrations as listContract,
} from '#shared/contracts/calibrations.contract.ts';
import { presentRecord, presentRecordRow } from './calibrations.presenter.ts';
import { findRecord, listRecords, listScopes } from './calibrations.repository.ts';
import type { RecordRow } from './calibrations.repository.ts';

type Reading = Pick<Deps, 'db'>;
const sort = 'newest';

export async function listCalibrations(
  deps: Reading,
  site: SiteScope,
  query: z.output<typeof listContract.query>,
): Promise<z.output<typeof listContract.response>> {
  const after = decodeCursor(sort, z.tuple([z.int()]), query.cursor);
  const { state, tag, text } = query;
  const rows = await listRecords(
    deps.db,
    {
      siteId: site.id,
      ...(state === undefined ? {} : { states: state }),
      ...(tag === undefined ? {} : { tag }),
      ...(text === undefined ? {} : { text }),
    },
    after?.[0],
    rowsToRead(query),
  );
  return toPage(rows, query, presentRecordRow, ({ record }) => encodeCursor(sort, [record.id]));
}

export async function getCalibration(
  deps: Reading,
  site: SiteScope,
  id: number,
): Promise<CalibrationDto> {
  return describeRecord(deps, await requireRecord(deps, site, id));
}

export async function requireRecord(
  deps: Reading,
  site: SiteScope,
  id: number,
): Promise<RecordRow> {
  const row = await findRecord(deps.db, site.id, id);
  if (row === undefined) {
    throw notFound('such calibration');
  }
  return row;
}

export async function describeRecord(deps: Reading, row: RecordRow): Promise<CalibrationDto> {
  return presentRecord(row, await listScopes(deps.db, row.record.id));
}
