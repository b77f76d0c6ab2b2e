import type { SignedIn, SiteScope } from '#server/actor.ts';
import type { Deps } from '#server/deps.ts';
import { groupBy } from '#server/features/availability/group-by.ts';
import { describeDuties } from '#server/features/calibrations/duties.service.ts';
import { getWorkingCalendar } from '#server/features/settings/settings.service.ts';
import type { Today } from '#shared/contracts/board.contract.ts';
import type { DutyRow } from '#shared/contracts/calibrations.contract.ts';
import { buildCalendarIndex } from '#shared/domain/calendar/build-calendar-index.ts';
import { findCalendarDay } from '#shared/domain/calendar/find-calendar-day.ts';
import { staffedSpans } from './board.service.ts';
import { listTaken, listUnits } from './board.repository.ts';
import { isInUse, takenSteps } from './tides.presenter.ts';
import { listHappenings } from './happenings.service.ts';
import { listBookedSpans, listDoorPhases } from './today.repository.ts';
import { listWaits } from './waits.service.ts';

const dayMs = 86_400_000;
const shownDuties = 8;
const weeksAhead = 8;

/** The day at the site and the work that waits for this person. */
export async function getToday(
  deps: Pick<Deps, 'clock' | 'db'>,
  actor: SignedIn,
  site: SiteScope,
): Promise<Today> {
  const nowMs = deps.clock.now().getTime();
  const calendar = buildCalendarIndex(await getWorkingCalendar(deps, site.id));
  const { day, span } = findCalendarDay(calendar, nowMs);
  const positions = (await listUnits(deps.db, site.id)).filter(
    ({ kind }) => kind === 'chamber-position',
  );
  const taken = await listTaken(
    deps.db,
    positions.map(({ unitId }) => unitId),
    span,
  );
  const doors = await listDoorPhases(deps.db, site.id, span);
  const duties = await describeDuties(deps, site);
  return {
    day,
    staffed: staffedSpans(calendar, span),
    positions: positions.length,
    tide: takenSteps(taken.filter(isInUse), span),
    doors: doors
      .filter(({ phase }) => phase !== 'measure')
      .map((row) => ({
        at: new Date(row.during.startMs).toISOString(),
        chamberTag: row.chamberTag,
        what: row.phase === 'connect' ? 'load' : 'unload',
      })),
    happenings: await listHappenings(deps, actor, site, {
      day,
      span,
      calendar,
      doors,
      duties,
      nowMs,
    }),
    waits: await listWaits(deps, actor, site, calendar),
    fallsDue: await describeFallsDue(deps, site, duties, nowMs),
  };
}

async function describeFallsDue(
  deps: Pick<Deps, 'db'>,
  site: SiteScope,
  duties: readonly DutyRow[],
  nowMs: number,
): Promise<Today['fallsDue']> {
  const horizonDays = weeksAhead * 7;
  const soon = duties
    .flatMap((duty) =>
      duty.dueOn !== null && duty.daysLeft !== null && duty.daysLeft <= horizonDays
        ? [{ duty, dueOn: duty.dueOn }]
        : [],
    )
    .toSorted((first, second) => first.dueOn.localeCompare(second.dueOn))
    .slice(0, shownDuties);
  const window = { startMs: nowMs - 3 * dayMs, endMs: nowMs + horizonDays * dayMs };
  const spans = groupBy(
    await listBookedSpans(
      deps.db,
      soon.map(({ duty }) => duty.tag),
      site.id,
      window,
    ),
    ({ tag }) => tag,
  );
  return soon.map(({ duty, dueOn }) => ({
    tag: duty.tag,
    name: duty.model,
    badge: duty.badge,
    dueOn,
    bookings: (spans.get(duty.tag) ?? []).map(({ during }) => ({
      startAt: new Date(during.startMs).toISOString(),
      endAt: new Date(during.endMs).toISOString(),
    })),
    bookingsPastDue: duty.bookingsPastDue,
    atRisk: duty.atRisk,
  }));
}
