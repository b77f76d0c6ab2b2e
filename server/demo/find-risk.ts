import { formatSiteTime } from '#shared/domain/calendar/format-site-time.ts';
import { startOfDayMs } from '#shared/domain/calendar/start-of-day-ms.ts';
import type { DemoContext } from './demo-context.ts';
import type { DueDays } from './metrology.ts';
import { brokenSinceMs } from './outages.ts';
import type { PlannedBooking, PlannedLoad } from './planned-work.ts';
import type { Sites } from './sites.ts';

/** Why a booking that is still to come could fail, in one sentence; null where nothing is known. */
export function findRisk(
  tools: { readonly context: DemoContext; readonly sites: Sites; readonly dueDays: DueDays },
  load: PlannedLoad,
  booking: PlannedBooking,
): string | null {
  const { calendar } = tools.sites[load.chamber.plan.site];
  const broken = brokenSinceMs(tools.context.nowMs);
  const tags = new Set([
    load.chamber.plan.tag,
    ...booking.paths.flatMap((path) => [path.source.instrument.tag, path.meter.instrument.tag]),
  ]);
  for (const tag of tags) {
    const brokenMs = broken[tag];
    if (brokenMs !== undefined) {
      return `${tag} cannot be used since ${formatSiteTime(calendar, brokenMs)}; nobody has said yet when it will be back.`;
    }
    const dueOn = tools.dueDays.get(tag);
    const dueMs = dueOn === undefined ? Infinity : startOfDayMs(calendar, dueOn, 1);
    if (dueMs < load.span.endMs) {
      return `${tag} falls due on ${dueOn ?? ''} and the booking runs beyond that day.`;
    }
  }
  return null;
}
