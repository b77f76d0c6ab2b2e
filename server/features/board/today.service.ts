import type { SignedIn, SiteScope } from '#server/actor.ts';
import type { Deps } from '#server/deps.ts';
import { groupBy } from '#server/features/availability/group-by.ts';
import { maySeeRequest } from '#server/features/availability/slot-request.service.ts';
import { describeDuties } from '#server/features/calibrations/duties.service.ts';
import { getWorkingCalendar } from '#server/features/settings/settings.service.ts';
import type { Today } from '#shared/contracts/board.contract.ts';
import type { DutyRow } from '#shared/contracts/calibrations.contract.ts';
import { buildCalendarIndex } from '#shared/domain/calendar/build-calendar-index.ts';
import { findCalendarDay } from '#shared/domain/calendar/find-calendar-day.ts';
import { formatSiteTime } from '#shared/domain/calendar/format-site-time.ts';
import { startOfDayMs } from '#shared/domain/calendar/start-of-day-ms.ts';
import type { CalendarIndex } from '#shared/domain/calendar/types.ts';
import { formatTemperature } from '#shared/domain/checks/words/format-temperature.ts';
import type { Span } from '#shared/domain/intervals/types.ts';
import { staffedSpans } from './board.service.ts';
import { listTaken, listUnits } from './board.repository.ts';
import { isInUse, takenSteps } from './tides.presenter.ts';
import {
  listBookedSpans,
  listBookingsOfLoads,
  listDoorPhases,
  listOutageEdges,
} from './today.repository.ts';
import type { DoorRow, LoadBookingRow } from './today.repository.ts';
import { listWaits } from './waits.service.ts';

type Happening = Today['happenings'][number];
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
    happenings: [
      ...(await loadHappenings(deps, actor, site, { doors, nowMs, calendar })),
      ...(await outageHappenings(deps, site, span, calendar)),
      ...dueHappenings(duties, calendar, day),
    ].toSorted((first, second) => first.at.localeCompare(second.at)),
    waits: await listWaits(deps, actor, site, calendar),
    fallsDue: await describeFallsDue(deps, site, duties, nowMs),
  };
}

async function loadHappenings(
  deps: Pick<Deps, 'db'>,
  actor: SignedIn,
  site: SiteScope,
  facts: {
    readonly doors: readonly DoorRow[];
    readonly nowMs: number;
    readonly calendar: CalendarIndex;
  },
): Promise<Happening[]> {
  const bookings = groupBy(
    await listBookingsOfLoads(deps.db, [...new Set(facts.doors.map(({ loadId }) => loadId))]),
    ({ loadId }) => loadId,
  );
  return facts.doors.map((row): Happening => {
    const inside = bookings.get(row.loadId) ?? [];
    const isOver = row.during.startMs <= facts.nowMs;
    return {
      at: new Date(row.during.startMs).toISOString(),
      kind: kinds[row.phase],
      what: `${verbs[row.phase](row.chamberTag)}${numbersOf(inside, actor, site)}`,
      touches: contentsOf(inside, row.setTempMdegc, actor, site),
      state: isOver ? 'was planned' : 'planned',
      tone: isOver ? 'ink' : 'heron',
      href: `/loads/${row.loadId}`,
    };
  });
}

const kinds: { readonly [Phase in DoorRow['phase']]: Happening['kind'] } = {
  connect: 'load',
  ramp: 'load',
  soak: 'load',
  match: 'load',
  hold: 'settled',
  measure: 'settled',
  return: 'unload',
  wait: 'unload',
  unload: 'unload',
};

const verbs: { readonly [Phase in DoorRow['phase']]: (tag: string) => string } = {
  connect: (tag) => `${tag} is loaded`,
  ramp: (tag) => `${tag} changes temperature`,
  soak: (tag) => `${tag} soaks`,
  match: (tag) => `Voltages are matched in ${tag}`,
  hold: (tag) => `Hold begins in ${tag}`,
  measure: (tag) => `Currents in ${tag} have settled`,
  return: (tag) => `${tag} returns to idle`,
  wait: (tag) => `${tag} waits for staff`,
  unload: (tag) => `${tag} is unloaded`,
};

/** Numbers only of bookings the reader may look into. */
function numbersOf(inside: readonly LoadBookingRow[], actor: SignedIn, site: SiteScope): string {
  const seen = inside.filter((booking) => maySeeRequest(actor, site.code, booking));
  return seen.length === 0 ? '' : ` (${seen.map(({ id }) => id).join(', ')})`;
}

function contentsOf(
  inside: readonly LoadBookingRow[],
  mdegc: number,
  actor: SignedIn,
  site: SiteScope,
): string {
  const seen = inside
    .filter((booking) => maySeeRequest(actor, site.code, booking))
    .map(({ cellCount, cellTypeName }) => `${cellCount ?? 0} × ${cellTypeName ?? ''}`);
  const hidden = inside.length - seen.length;
  const others = hidden === 0 ? [] : [hidden === 1 ? '1 other' : `${hidden} others`];
  return [...seen, ...others, formatTemperature(mdegc / 1000)].join(', ');
}

async function outageHappenings(
  deps: Pick<Deps, 'db'>,
  site: SiteScope,
  span: Span,
  calendar: CalendarIndex,
): Promise<Happening[]> {
  const edges = await listOutageEdges(deps.db, site.id, span);
  return [...groupBy(edges, ({ id }) => id).values()].flatMap((rows): Happening[] => {
    const [first] = rows;
    if (first === undefined) {
      return [];
    }
    const tags = rows.map(({ tag }) => tag).join(', ');
    const begins = first.during.startMs >= span.startMs && first.during.startMs < span.endMs;
    return [
      {
        at: new Date(begins ? first.during.startMs : first.during.endMs).toISOString(),
        kind: 'outage',
        what: begins ? `${tags}: ${first.title} begins` : `${tags}: ${first.title} ends`,
        touches: begins
          ? `until ${formatSiteTime(calendar, first.during.endMs)}`
          : 'can be booked again',
        state: begins ? 'out of use' : 'back',
        tone: begins ? 'marigold' : 'reed',
        href: `/equipment/${first.tag}`,
      },
    ];
  });
}

/** A due day ends at its midnight: it happens then. */
function dueHappenings(
  duties: readonly DutyRow[],
  calendar: CalendarIndex,
  day: string,
): Happening[] {
  return duties
    .filter(({ dueOn }) => dueOn === day)
    .map((duty) => ({
      at: new Date(startOfDayMs(calendar, day, 1) - 1000).toISOString(),
      kind: 'due',
      what: `${duty.tag} falls due`,
      touches:
        duty.bookingsPastDue === 0
          ? 'no booking runs past it'
          : `${duty.bookingsPastDue} bookings run past it`,
      state: 'due today',
      tone: 'marigold',
      href: `/equipment/${duty.tag}`,
    }));
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
