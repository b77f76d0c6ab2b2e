import { z } from 'zod';
import type { SignedIn, SiteScope } from '#server/actor.ts';
import type { Deps } from '#server/deps.ts';
import { groupBy } from '#server/features/availability/group-by.ts';
import { loadSiteValidity } from '#server/features/availability/validity.service.ts';
import type { ScopeFacts } from '#server/features/availability/validity.service.ts';
import { decodeCursor, encodeCursor, rowsToRead, toPage } from '#server/paging.ts';
import type { Page } from '#server/paging.ts';
import type { DutyRow, listDuties as contract } from '#shared/contracts/calibrations.contract.ts';
import { findCalendarDay } from '#shared/domain/calendar/find-calendar-day.ts';
import { startOfDayMs } from '#shared/domain/calendar/start-of-day-ms.ts';
import type { CalendarIndex } from '#shared/domain/calendar/types.ts';
import { presentDuty } from './calibrations.presenter.ts';
import {
  listBookingsByInstrument,
  listDutyRows,
  listNewestRecords,
} from './calibrations.repository.ts';
import type { DutyRecord } from './calibrations.repository.ts';

type Query = z.output<typeof contract.query>;
const sort = 'due';
/** What was never calibrated stands first: nothing is more overdue. */
const never = '0000-00-00';

/** What falls due, soonest first. Due days come from the records themselves, as everywhere. */
export async function listDuties(
  deps: Pick<Deps, 'clock' | 'db'>,
  actor: SignedIn,
  site: SiteScope,
  query: Query,
): Promise<Page<DutyRow>> {
  const after = decodeCursor(sort, z.tuple([z.string(), z.string(), z.int()]), query.cursor);
  const rows = (await describeDuties(deps, site))
    .filter((row) => fits(row, query, actor))
    .map((row) => ({ row, key: [row.dueOn ?? never, row.tag, row.dutyId] as const }))
    .toSorted((first, second) => compare(first.key, second.key))
    .filter(({ key }) => after === undefined || compare(key, after) > 0)
    .slice(0, rowsToRead(query));
  return toPage(
    rows,
    query,
    ({ row }) => row,
    ({ key }) => encodeCursor(sort, [...key]),
  );
}

/** Every calibration duty of the site as it stands now; also for the day's overview. */
export async function describeDuties(
  deps: Pick<Deps, 'clock' | 'db'>,
  site: SiteScope,
): Promise<DutyRow[]> {
  const now = deps.clock.now();
  const validity = await loadSiteValidity(deps.db, site, now.getTime());
  const newest = groupBy(
    await listNewestRecords(deps.db, site.id),
    ({ instrumentId }) => instrumentId,
  );
  const bookings = groupBy(
    await listBookingsByInstrument(deps.db, site.id, now),
    ({ instrumentId }) => instrumentId,
  );
  return (await listDutyRows(deps.db, site.id)).map((row) => {
    const { instrumentId } = row.duty;
    const badge = validity.badgeOf(instrumentId, isOfDuty(row.duty));
    const dueOn = badge?.dueOn ?? row.duty.nextDueOn;
    const ahead = bookings.get(instrumentId) ?? [];
    const idOf = (state: string) =>
      newest.get(instrumentId)?.find((record) => record.state === state)?.id ?? null;
    return presentDuty(row, {
      badge,
      daysLeft: dueOn === null ? null : daysUntil(validity.calendar, now.getTime(), dueOn),
      lastCalibrationId: idOf('approved'),
      awaitingApprovalId: idOf('awaiting-approval'),
      bookingsPastDue: countPast(validity.calendar, dueOn, ahead),
      atRisk: ahead.filter(({ isAtRisk }) => isAtRisk).length,
    });
  });
}

type DutyScope = Pick<DutyRecord['duty'], 'channelId' | 'function' | 'meterRangeId'>;

/** What a duty leaves open stands for all of it. */
export function isOfDuty(duty: DutyScope): (scope: ScopeFacts) => boolean {
  return (scope) =>
    isEither(duty.channelId, scope.channelId) &&
    isEither(duty.function, scope.function) &&
    isEither(duty.meterRangeId, scope.meterRangeId);
}

function isEither<Value>(wanted: Value | null, value: Value | null): boolean {
  return wanted === null || wanted === value;
}

function countPast(
  calendar: CalendarIndex,
  dueOn: string | null,
  ahead: readonly { readonly endsAt: Date }[],
): number {
  if (dueOn === null) {
    return ahead.length;
  }
  const dueMs = startOfDayMs(calendar, dueOn, 1);
  return ahead.filter(({ endsAt }) => endsAt.getTime() > dueMs).length;
}

const dayMs = 86_400_000;

function daysUntil(calendar: CalendarIndex, nowMs: number, day: string): number {
  return Date.parse(`${day}T00:00:00Z`) / dayMs - findCalendarDay(calendar, nowMs).dayNumber;
}

function fits(row: DutyRow, query: Query, actor: SignedIn): boolean {
  const text = query.text?.trim().toLowerCase() ?? '';
  return (
    (query.badge?.includes(row.badge) ?? true) &&
    (query.kind?.includes(row.instrumentKind) ?? true) &&
    isDueBefore(row, query.dueBefore) &&
    isOwn(row, query, actor) &&
    [row.tag, row.model].some((value) => value.toLowerCase().includes(text))
  );
}

function isOwn(row: DutyRow, query: Query, actor: SignedIn): boolean {
  return query.mine !== 'true' || row.custodian?.id === actor.personId;
}

function isDueBefore(row: DutyRow, day: string | undefined): boolean {
  return day === undefined || row.dueOn === null || row.dueOn < day;
}

type Key = readonly [string, string, number];

function compare(first: Key, second: Key): number {
  return (
    first[0].localeCompare(second[0], 'en') ||
    first[1].localeCompare(second[1], 'en') ||
    first[2] - second[2]
  );
}
