import type { z } from 'zod';
import type { SignedIn, SiteScope } from '#server/actor.ts';
import type { Deps } from '#server/deps.ts';
import { maySeeRequest } from '#server/features/availability/slot-request.service.ts';
import { seesEveryProject } from '#server/features/requests/requests.service.ts';
import type { searchHitSchema } from '#shared/contracts/board.contract.ts';
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
  const calibrations = await findCalibrations(deps.db, site.id, text);
  return [
    ...(await numbered(deps, actor, site, text)),
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

/** Records people say by number; those of projects one does not see are not found. */
async function numbered(
  deps: Pick<Deps, 'db'>,
  actor: SignedIn,
  site: SiteScope,
  text: string,
): Promise<Hit[]> {
  const match = /^(?:booking |request )?(\d{1,9})$/i.exec(text);
  if (match === null) {
    return [];
  }
  const id = Number(match[1]);
  const booking = await findBookingByNumber(deps.db, site.id, id);
  const request = await findRequestByNumber(deps.db, site.id, id);
  return [
    ...(booking !== undefined && maySeeRequest(actor, site.code, booking)
      ? [
          {
            kind: 'booking' as const,
            label: `booking ${id}`,
            detail: booking.state,
            href: `/bookings/${id}`,
          },
        ]
      : []),
    ...(request !== undefined && maySeeRequest(actor, site.code, request)
      ? [
          {
            kind: 'request' as const,
            label: `request ${id}`,
            detail: [request.state.replace('-', ' '), request.projectName ?? '']
              .filter(Boolean)
              .join(', '),
            href: `/requests/${id}`,
          },
        ]
      : []),
  ];
}
