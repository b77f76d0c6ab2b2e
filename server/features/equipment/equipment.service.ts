import { z } from 'zod';
import type { SignedIn, SiteScope } from '#server/actor.ts';
import type { Deps } from '#server/deps.ts';
import { loadSiteValidity } from '#server/features/availability/validity.service.ts';
import { listBookings } from '#server/features/bookings/bookings.service.ts';
import { getSitePolicy } from '#server/features/settings/settings.service.ts';
import { decodeCursor, encodeCursor, rowsToRead, toPage } from '#server/paging.ts';
import type { Page } from '#server/paging.ts';
import { notFound } from '#server/problem.ts';
import type {
  InstrumentDto,
  InstrumentRow,
  listInstruments as listContract,
} from '#shared/contracts/equipment.contract.ts';
import { presentInstrument, presentInstrumentRow } from './equipment.presenter.ts';
import {
  findByTag,
  getSpecs,
  listAssessmentRows,
  listCalibrationRows,
  listOpenUnavailability,
  listRegister,
  listRelatives,
} from './equipment.repository.ts';
import type { RegisterRow } from './equipment.repository.ts';

export type Reading = Pick<Deps, 'clock' | 'db'>;
type Query = z.output<typeof listContract.query>;

const dayMs = 86_400_000;
const noDue = '9999-12-31';

/** The register; badges are worked out, not stored, so filter and order are applied after reading. */
export async function listInstruments(
  deps: Reading,
  site: SiteScope,
  query: Query,
): Promise<Page<InstrumentRow>> {
  const sort = query.sort ?? 'tag';
  const after = decodeCursor(sort, z.tuple([z.string(), z.string()]), query.cursor);
  const validity = await loadSiteValidity(deps.db, site, deps.clock.now().getTime());
  const keyed = (await listRegister(deps.db, site.id))
    .map((row) => presentInstrumentRow(row, validity))
    .filter((row) => fits(row, query))
    .map((row) => ({ row, key: sortKey(row, sort) }))
    .toSorted((first, second) => compare(first.key, second.key))
    .filter(({ key }) => after === undefined || compare(key, after) > 0)
    .slice(0, rowsToRead(query));
  return toPage(
    keyed,
    query,
    ({ row }) => row,
    ({ key }) => encodeCursor(sort, [...key]),
  );
}

type Key = readonly [string, string];

function sortKey(row: InstrumentRow, sort: NonNullable<Query['sort']>): Key {
  switch (sort) {
    case 'tag':
      return [row.tag, row.tag];
    case 'kind':
      return [row.kind, row.tag];
    case 'due':
      return [row.dueOn ?? noDue, row.tag];
  }
}

function compare(first: Key, second: Key): number {
  return first[0].localeCompare(second[0], 'en') || first[1].localeCompare(second[1], 'en');
}

function fits(row: InstrumentRow, query: Query): boolean {
  const text = query.text?.trim().toLowerCase() ?? '';
  return (
    (query.kind?.includes(row.kind) ?? true) &&
    (query.state?.includes(row.state) ?? true) &&
    (query.badge === undefined || (row.badge !== null && query.badge.includes(row.badge))) &&
    [row.tag, row.model, row.serial].some((value) => value.toLowerCase().includes(text))
  );
}

export async function getInstrument(
  deps: Reading,
  actor: SignedIn,
  site: SiteScope,
  tag: string,
): Promise<InstrumentDto> {
  return describeInstrument(deps, actor, site, await requireInstrument(deps, site, tag));
}

/** The instrument with that tag at the site; another site's is not there. */
export async function requireInstrument(
  deps: Pick<Deps, 'db'>,
  site: SiteScope,
  tag: string,
): Promise<RegisterRow> {
  const row = await findByTag(deps.db, site.id, tag);
  if (row === undefined) {
    throw notFound('such instrument');
  }
  return row;
}

/** Everything about an instrument; also the answer of whatever changes it. */
export async function describeInstrument(
  deps: Reading,
  actor: SignedIn,
  site: SiteScope,
  row: RegisterRow,
): Promise<InstrumentDto> {
  const now = deps.clock.now();
  const { id, tag } = row.instrument;
  const validity = await loadSiteValidity(deps.db, site, now.getTime());
  const policy = await getSitePolicy(deps, site.id);
  const bookings = await listBookings(deps, actor, site, {
    tag,
    state: ['tentative', 'confirmed', 'running'],
    from: now.toISOString(),
    limit: 20,
  });
  return presentInstrument({
    row,
    validity,
    relatives: await listRelatives(deps.db, row.instrument),
    specs: await getSpecs(deps.db, id),
    calibrations: await listCalibrationRows(deps.db, id),
    assessments: await listAssessmentRows(deps.db, id),
    oldestCountingMs: now.getTime() - policy.stabilityMaxAgeDays * dayMs,
    unavailability: await listOpenUnavailability(deps.db, validity.chainOf(id), now),
    nextBookings: bookings.items,
  });
}
