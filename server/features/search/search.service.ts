import type { z } from 'zod';
import type { SignedIn, SiteScope } from '#server/actor.ts';
import type { Deps } from '#server/deps.ts';
import { maySeeRequest } from '#server/features/availability/slot-request.service.ts';
import { seesEveryProject } from '#server/features/requests/requests.service.ts';
import { getWorkingCalendar } from '#server/features/settings/settings.service.ts';
import type { searchHitSchema } from '#shared/contracts/board.contract.ts';
import { buildCalendarIndex } from '#shared/domain/calendar/build-calendar-index.ts';
import { formatSiteTime } from '#shared/domain/calendar/format-site-time.ts';
import {
  findBookingByNumber,
  findCalibrations,
  findCells,
  findInstruments,
  findRequestByNumber,
} from './search.repository.ts';

type Hit = z.output<typeof searchHitSchema>;

/** A tag, a serial, a certificate or a number: whatever stands on what one has in hand. */
export async function searchSite(
  deps: Pick<Deps, 'db'>,
  actor: SignedIn,
  site: SiteScope,
  text: string,
): Promise<Hit[]> {
  const projectIds = seesEveryProject(actor, site) ? null : actor.projectIds;
  const instruments = await findInstruments(deps.db, site.id, text);
  const cells = await findCells(deps.db, site.id, projectIds, text);
  const record = parseRecord(text);
  const calibrations = await findCalibrations(deps.db, site.id, {
    text,
    id: isMeant(record, 'calibration') ? record.id : null,
  });
  return [
    ...(record === null ? [] : await numbered(deps, actor, site, record)),
    ...instruments.map(({ tag, kind, model }): Hit => ({
      kind: 'instrument',
      label: tag,
      detail: `${kind.replace('-', ' ')}, ${model}`,
      href: `/equipment/${tag}`,
    })),
    ...cells.map((cell): Hit => ({
      kind: 'cell',
      label: cell.serial ?? '',
      detail: [cell.typeName, cell.projectName, cell.place ?? ''].filter(Boolean).join(', '),
      href: cell.requestId === null ? '/requests' : `/requests/${cell.requestId}`,
    })),
    ...calibrations.map((record): Hit => ({
      kind: 'calibration',
      label: `calibration ${record.id}`,
      detail: `${record.tag}, ${record.certificateNumber}, performed ${record.performedOn}`,
      href: `/metrology/calibrations/${record.id}`,
    })),
  ];
}

const recordKinds = ['booking', 'request', 'calibration'] as const;
type RecordKind = (typeof recordKinds)[number];
/** `2418` may be any of them, `booking 2418` is only one. */
type NamedRecord = { readonly kind: RecordKind | null; readonly id: number };

function parseRecord(text: string): NamedRecord | null {
  const match = /^(?:(\p{L}+)\s+)?(\d{1,9})$/u.exec(text);
  const word = match?.[1]?.toLowerCase();
  const kind = recordKinds.find((each) => each === word);
  return match === null || (word !== undefined && kind === undefined)
    ? null
    : { kind: kind ?? null, id: Number(match[2]) };
}

function isMeant(record: NamedRecord | null, kind: RecordKind): record is NamedRecord {
  return record !== null && (record.kind === null || record.kind === kind);
}

/** Records people say by number; those of projects one does not see are not found. */
async function numbered(
  deps: Pick<Deps, 'db'>,
  actor: SignedIn,
  site: SiteScope,
  record: NamedRecord,
): Promise<Hit[]> {
  const { id } = record;
  const booking = isMeant(record, 'booking')
    ? await findBookingByNumber(deps.db, site.id, id)
    : undefined;
  const request = isMeant(record, 'request')
    ? await findRequestByNumber(deps.db, site.id, id)
    : undefined;
  const hits: Hit[] = [];
  if (booking !== undefined && maySeeRequest(actor, site.code, booking)) {
    const calendar = buildCalendarIndex(await getWorkingCalendar(deps, site.id));
    hits.push({
      kind: 'booking',
      label: `booking ${id}`,
      detail: `${booking.state}, ${booking.chamberTag}, ${formatSiteTime(calendar, booking.during.startMs)}`,
      href: `/bookings/${id}`,
    });
  }
  if (request !== undefined && maySeeRequest(actor, site.code, request)) {
    const state = request.state.replace('-', ' ');
    hits.push({
      kind: 'request',
      label: `request ${id}`,
      detail: request.projectName === null ? state : `${state}, ${request.projectName}`,
      href: `/requests/${id}`,
    });
  }
  return hits;
}
