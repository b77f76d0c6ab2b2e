import type { SignedIn, SiteScope } from '#server/actor.ts';
import type { Deps } from '#server/deps.ts';
import { listWaitingDeviations } from '#server/features/registers/deviations.service.ts';
import type { Today } from '#shared/contracts/board.contract.ts';
import { formatSiteDay } from '#shared/domain/calendar/format-site-day.ts';
import { siteDay } from '#shared/domain/calendar/site-day.ts';
import type { CalendarIndex } from '#shared/domain/calendar/types.ts';
import { checkRules } from '#shared/domain/checks/check-rules.ts';
import { may } from '#shared/domain/policies/may.ts';
import {
  listAwaitingRelease,
  listOpenRequests,
  listUnsigned,
  listWatchedBookings,
} from './today.repository.ts';
import type { OpenRequestRow } from './today.repository.ts';

type Wait = Today['waits'][number];
const dayMs = 86_400_000;

/** The work that waits for this person, by what their roles allow; oldest first. */
export async function listWaits(
  deps: Pick<Deps, 'clock' | 'db'>,
  actor: SignedIn,
  site: SiteScope,
  calendar: CalendarIndex,
): Promise<Wait[]> {
  const now = deps.clock.now();
  const requests = await listOpenRequests(deps.db, site.id);
  const watched = await listWatchedBookings(
    deps.db,
    site.id,
    now,
    new Date(now.getTime() + 2 * dayMs),
  );
  const waits = [
    ...requests.flatMap((row) => requestWait(row, actor, site, calendar)),
    ...bookingWaits(watched, actor, site),
    ...(await signatureWaits(deps, actor, site)),
    ...(await deviationWaits(deps, actor, site)),
    ...(await releaseWaits(deps, actor, site)),
  ];
  return waits.toSorted((first, second) => first.since.localeCompare(second.since));
}

function requestWait(
  { request, requesterName }: OpenRequestRow,
  actor: SignedIn,
  site: SiteScope,
  calendar: CalendarIndex,
): Wait[] {
  const href = `/requests/${request.id}`;
  if (request.state === 'draft') {
    const why =
      request.declineReason === null
        ? 'Nobody but you sees it as asked yet.'
        : `Sent back: ${request.declineReason}`;
    return request.requesterId === actor.personId
      ? [
          {
            kind: 'draft',
            what: `Request ${request.id} is a draft`,
            why,
            since: request.updatedAt.toISOString(),
            action: 'Go on',
            href,
          },
        ]
      : [];
  }
  if (!may(actor, 'booking.move', site.code)) {
    return [];
  }
  const since = (request.proposedAt ?? request.submittedAt ?? request.updatedAt).toISOString();
  return request.proposedOffer === null
    ? [
        {
          kind: 'request',
          what: `Request ${request.id} wants a slot`,
          why: `${requesterName} asked${neededBy(request.neededByAt, calendar)}.`,
          since,
          action: 'Find a slot',
          href,
        },
      ]
    : [
        {
          kind: 'proposal',
          what: `Request ${request.id} proposes a slot`,
          why: `${requesterName} would like it; it reserves nothing.`,
          since,
          action: 'Look and book',
          href,
        },
      ];
}

function neededBy(at: Date | null, calendar: CalendarIndex): string {
  return at === null ? '' : ` and needs it by ${formatSiteDay(siteDay(calendar, at.getTime()))}`;
}

function bookingWaits(
  watched: Awaited<ReturnType<typeof listWatchedBookings>>,
  actor: SignedIn,
  site: SiteScope,
): Wait[] {
  const schedules = may(actor, 'booking.move', site.code);
  return watched.flatMap(({ booking, requesterId }): Wait[] => {
    const isOwn = requesterId === actor.personId;
    const base = { since: booking.updatedAt.toISOString(), href: `/bookings/${booking.id}` };
    if (booking.atRisk && (isOwn || schedules)) {
      return [
        {
          ...base,
          kind: 'at-risk',
          what: `Booking ${booking.id} is at risk`,
          why: booking.atRiskReason ?? 'It no longer passes a rule.',
          action: schedules ? 'Move or cancel' : 'Look',
        },
      ];
    }
    return isOwn && !booking.atRisk
      ? [
          {
            ...base,
            kind: 'booking',
            what: `Booking ${booking.id} starts soon`,
            why: 'Bring the cells to the door in time.',
            action: 'Look',
          },
        ]
      : [];
  });
}

async function signatureWaits(
  deps: Pick<Deps, 'db'>,
  actor: SignedIn,
  site: SiteScope,
): Promise<Wait[]> {
  const rows = await listUnsigned(deps.db, site.id);
  return rows
    .filter(({ recordedById }) =>
      may(actor, 'calibration.approve', site.code, { authorId: recordedById }),
    )
    .map((row) => ({
      kind: 'second-signature',
      what: `Calibration ${row.id} of ${row.tag}, ${row.certificateNumber}`,
      why: `${row.recordedBy} recorded it; it counts once you have signed.`,
      since: row.createdAt.toISOString(),
      action: 'Read and sign',
      href: `/metrology/calibrations/${row.id}`,
    }));
}

async function deviationWaits(
  deps: Pick<Deps, 'db'>,
  actor: SignedIn,
  site: SiteScope,
): Promise<Wait[]> {
  const rows = await listWaitingDeviations(deps.db, site, actor);
  return rows.map(({ deviation, askedBy }) => ({
    kind: 'deviation',
    what: `Request ${deviation.requestId ?? ''} asks to lift: ${checkRules[deviation.checkCode].title}`,
    why: `${askedBy}: ${deviation.reason}`,
    since: deviation.requestedAt.toISOString(),
    action: 'Answer',
    href: `/requests/${deviation.requestId ?? ''}`,
  }));
}

async function releaseWaits(
  deps: Pick<Deps, 'db'>,
  actor: SignedIn,
  site: SiteScope,
): Promise<Wait[]> {
  if (!may(actor, 'equipment.release', site.code)) {
    return [];
  }
  return (await listAwaitingRelease(deps.db, site.id)).map((row) => ({
    kind: 'release',
    what: `${row.tag}, ${row.model}, awaits release`,
    why: row.note ?? 'It cannot be booked before.',
    since: row.updatedAt.toISOString(),
    action: 'Look',
    href: `/equipment/${row.tag}`,
  }));
}
