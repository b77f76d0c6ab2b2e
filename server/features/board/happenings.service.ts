import type { SignedIn, SiteScope } from '#server/actor.ts';
import type { Deps } from '#server/deps.ts';
import { groupBy } from '#server/features/availability/group-by.ts';
import { maySeeRequest } from '#server/features/availability/slot-request.service.ts';
import { findUnavailabilities } from '#server/features/availability/validity.service.ts';
import type { Today } from '#shared/contracts/board.contract.ts';
import type { DutyRow } from '#shared/contracts/calibrations.contract.ts';
import { formatSiteTime } from '#shared/domain/calendar/format-site-time.ts';
import { startOfDayMs } from '#shared/domain/calendar/start-of-day-ms.ts';
import type { CalendarIndex } from '#shared/domain/calendar/types.ts';
import { formatTemperature } from '#shared/domain/checks/words/format-temperature.ts';
import type { Span } from '#shared/domain/intervals/types.ts';
import { listUnits } from './board.repository.ts';
import { listBookingsOfLoads, listOutageEdges } from './today.repository.ts';
import type { DoorRow, LoadBookingRow } from './today.repository.ts';

type Happening = Today['happenings'][number];

type Day = {
  readonly day: string;
  readonly span: Span;
  readonly calendar: CalendarIndex;
  readonly doors: readonly DoorRow[];
  readonly duties: readonly DutyRow[];
  readonly nowMs: number;
};

/** What happens at the site during the day, as planned and as reported, in order. */
export async function listHappenings(
  deps: Pick<Deps, 'db'>,
  actor: SignedIn,
  site: SiteScope,
  day: Day,
): Promise<Happening[]> {
  const happenings = [
    ...(await loadHappenings(deps, actor, site, day)),
    ...(await outageHappenings(deps, site, day)),
    ...(await breakdownHappenings(deps, site, day)),
    ...dueHappenings(day),
  ];
  return happenings.toSorted((first, second) => first.at.localeCompare(second.at));
}

async function loadHappenings(
  deps: Pick<Deps, 'db'>,
  actor: SignedIn,
  site: SiteScope,
  { doors, nowMs }: Day,
): Promise<Happening[]> {
  const bookings = groupBy(
    await listBookingsOfLoads(deps.db, [...new Set(doors.map(({ loadId }) => loadId))]),
    ({ loadId }) => loadId,
  );
  return doors.map((row): Happening => {
    const inside = bookings.get(row.loadId) ?? [];
    const isOver = row.during.startMs <= nowMs;
    const { kind, say } = steps[row.phase];
    return {
      at: new Date(row.during.startMs).toISOString(),
      kind,
      what: `${say(row.chamberTag)}${numbersOf(inside, actor, site)}`,
      touches: contentsOf(inside, row.setTempMdegc, actor, site),
      state: isOver ? 'was planned' : 'planned',
      tone: isOver ? 'ink' : 'heron',
      href: `/loads/${row.loadId}`,
    };
  });
}

type Step = { readonly kind: Happening['kind']; readonly say: (tag: string) => string };

const steps: { readonly [Phase in DoorRow['phase']]: Step } = {
  connect: { kind: 'load', say: (tag) => `${tag} is loaded` },
  measure: { kind: 'settled', say: (tag) => `Measuring begins in ${tag}` },
  unload: { kind: 'unload', say: (tag) => `${tag} is unloaded` },
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
  const temperature = formatTemperature(mdegc / 1000);
  if (inside.length === 0) {
    return `other work, ${temperature}`;
  }
  const seen = inside
    .filter((booking) => maySeeRequest(actor, site.code, booking))
    .map(({ cellCount, cellTypeName }) => `${cellCount ?? 0} × ${cellTypeName ?? ''}`);
  const hidden = inside.length - seen.length;
  const others = hidden === 0 ? [] : [hidden === 1 ? '1 other' : `${hidden} others`];
  return [...seen, ...others, temperature].join(', ');
}

/** Planned outages that begin or end today; one that does both is said twice. */
async function outageHappenings(
  deps: Pick<Deps, 'db'>,
  site: SiteScope,
  { span, calendar }: Day,
): Promise<Happening[]> {
  const isToday = (atMs: number) => span.startMs <= atMs && atMs < span.endMs;
  const edges = await listOutageEdges(deps.db, site.id, span);
  return [...groupBy(edges, ({ id }) => id).values()].flatMap((rows): Happening[] => {
    const [first] = rows;
    if (first === undefined) {
      return [];
    }
    const { during } = first;
    const what = `${rows.map(({ tag }) => tag).join(', ')}: ${first.title}`;
    const base = { kind: 'outage' as const, href: `/equipment/${first.tag}` };
    const begin: Happening = {
      ...base,
      at: new Date(during.startMs).toISOString(),
      what: `${what} begins`,
      touches: `until ${formatSiteTime(calendar, during.endMs)}`,
      state: 'out of use',
      tone: 'marigold',
    };
    const end: Happening = {
      ...base,
      at: new Date(during.endMs).toISOString(),
      what: `${what} ends`,
      touches: 'can be booked again',
      state: 'back',
      tone: 'reed',
    };
    return [...(isToday(during.startMs) ? [begin] : []), ...(isToday(during.endMs) ? [end] : [])];
  });
}

/** What was reported as broken or withdrawn today. */
async function breakdownHappenings(
  deps: Pick<Deps, 'db'>,
  site: SiteScope,
  { span }: Day,
): Promise<Happening[]> {
  const units = await listUnits(deps.db, site.id);
  const reported = await findUnavailabilities(deps.db, {
    instrumentIds: [...new Set(units.map(({ instrumentId }) => instrumentId))],
    unitIds: units.map(({ unitId }) => unitId),
    window: span,
  });
  return reported
    .filter(({ startMs }) => startMs >= span.startMs)
    .flatMap((report): Happening[] => {
      const unit = units.find(({ instrumentId, unitId }) =>
        report.instrumentId === null
          ? unitId === report.unitId
          : instrumentId === report.instrumentId,
      );
      return unit === undefined
        ? []
        : [
            {
              at: new Date(report.startMs).toISOString(),
              kind: 'outage',
              what: `${report.unitId === null ? unit.tag : unit.label} cannot be used`,
              touches: report.note,
              state: 'reported',
              tone: 'brick',
              href: `/equipment/${unit.tag}`,
            },
          ];
    });
}

/** A due day ends at its midnight: it happens then. */
function dueHappenings({ duties, calendar, day }: Day): Happening[] {
  return duties
    .filter(({ dueOn }) => dueOn === day)
    .map((duty) => ({
      at: new Date(startOfDayMs(calendar, day, 1) - 1000).toISOString(),
      kind: 'due',
      what: `${duty.tag} falls due`,
      touches: pastDue(duty.bookingsPastDue),
      state: 'due today',
      tone: 'marigold',
      href: `/equipment/${duty.tag}`,
    }));
}

function pastDue(count: number): string {
  if (count === 0) {
    return 'no booking runs past it';
  }
  return count === 1 ? '1 booking runs past it' : `${count} bookings run past it`;
}
