import { known, stamped, type DemoContext } from './demo-context.ts';
import { dayMs, hourMs, weekdayAt } from './demo-days.ts';
import type { Register } from './instruments.ts';
import type { Occupancy } from './occupancy.ts';
import type { People } from './people.ts';
import type { Sites } from './sites.ts';

type OutagePlan = {
  readonly tag: string;
  readonly title: string;
  readonly reason: string;
  readonly from: { readonly plusDays: number; readonly hour: number };
  readonly to: { readonly plusDays: number; readonly hour: number };
  readonly by: 'metrologist' | 'secondMetrologist' | 'scheduler';
};
const plans: readonly OutagePlan[] = [
  {
    tag: 'C05',
    title: 'mapping at 25 °C and 45 °C',
    reason: 'Mapping falls due; nine sensors, two set temperatures.',
    from: { plusDays: -1, hour: 9 },
    to: { plusDays: 2, hour: 12 },
    by: 'metrologist',
  },
  {
    tag: 'C04',
    title: 'door seal, repair',
    reason: 'Seal is brittle at the hinge side; spare part is in the house.',
    from: { plusDays: 1, hour: 8 },
    to: { plusDays: 3, hour: 14 },
    by: 'scheduler',
  },
  {
    tag: 'S03',
    title: 'away for calibration',
    reason: 'Goes to Quellmoor, back by courier.',
    from: { plusDays: 2, hour: 14 },
    to: { plusDays: 7, hour: 12 },
    by: 'metrologist',
  },
  {
    tag: 'S05',
    title: 'away for calibration',
    reason: 'Least disruptive week before it falls due.',
    from: { plusDays: 21, hour: 14 },
    to: { plusDays: 25, hour: 12 },
    by: 'metrologist',
  },
  {
    tag: 'C13',
    title: 'mapping at 25 °C and 45 °C',
    reason: 'New shelf; the map is no longer true.',
    from: { plusDays: 16, hour: 9 },
    to: { plusDays: 18, hour: 16 },
    by: 'secondMetrologist',
  },
  {
    tag: 'C08',
    title: 'fan bearing, exchange',
    reason: 'Noise since spring.',
    from: { plusDays: -34, hour: 8 },
    to: { plusDays: -32, hour: 16 },
    by: 'scheduler',
  },
];

/** What is known to be out of use, planned or not; taken before any work is laid. */
export function layOutages(
  context: DemoContext,
  input: {
    readonly register: Register;
    readonly sites: Sites;
    readonly people: People;
    readonly occupancy: Occupancy;
  },
): void {
  const { register, sites, people, occupancy } = input;
  for (const plan of plans) {
    const instrument = known(register.byTag, plan.tag);
    const site = sites[instrument.site];
    const span = {
      startMs: weekdayAt(context.nowMs, plan.from, site.zone),
      endMs: weekdayAt(context.nowMs, plan.to, site.zone),
    };
    if (span.endMs <= span.startMs) {
      span.endMs = span.startMs + 6 * hourMs;
    }
    const id = context.number('outages');
    const plannedMs = Math.min(span.startMs, context.nowMs) - 5 * dayMs;
    context.rows.outages.push({
      id,
      siteId: site.id,
      title: plan.title,
      reason: plan.reason,
      state: span.endMs <= context.nowMs ? 'done' : 'planned',
      during: span,
      plannedById: people[plan.by],
      ...stamped(plannedMs),
    });
    context.rows.outageInstruments.push({ outageId: id, instrumentId: instrument.id });
    for (const unit of context.rows.units.filter((row) => row.instrumentId === instrument.id)) {
      if (unit.id !== undefined) {
        occupancy.take(unit.id, span);
        context.rows.allocations.push({
          id: context.number('allocations'),
          unitId: unit.id,
          during: span,
          live: true,
          outageId: id,
          createdAt: new Date(plannedMs),
        });
      }
    }
    if (instrument.kind === 'chamber') {
      occupancy.closeChamber(instrument.id, span);
    }
  }
  layBreakdowns(context, register, people);
}

/** Since when C09 and M11 cannot be used; bookings over them are at risk. */
export function brokenSinceMs(nowMs: number): Readonly<Record<string, number>> {
  return { C09: nowMs - 5 * hourMs, M11: nowMs - 4 * dayMs };
}

function layBreakdowns(context: DemoContext, register: Register, people: People): void {
  const { nowMs } = context;
  const lines = [
    {
      tag: 'C09',
      reason: 'breakdown',
      note: 'Heater trips its breaker above 40 °C; the electrician comes tomorrow.',
      fromMs: brokenSinceMs(nowMs)['C09'] ?? nowMs,
      toMs: null,
      by: people.engineer,
    },
    {
      tag: 'M11',
      reason: 'failed-calibration',
      note: 'As found out of tolerance on the 2 µA range; adjusted, waits for approval.',
      fromMs: brokenSinceMs(nowMs)['M11'] ?? nowMs,
      toMs: null,
      by: people.secondMetrologist,
    },
    {
      tag: 'S13',
      reason: 'breakdown',
      note: 'Channel 3 lost its sense line; connector exchanged.',
      fromMs: nowMs - 71 * dayMs,
      toMs: nowMs - 70 * dayMs,
      by: people.otterholmEngineer,
    },
    {
      tag: 'C03',
      reason: 'other',
      note: 'Power of the building switched off over the weekend.',
      fromMs: nowMs - 140 * dayMs,
      toMs: nowMs - 138 * dayMs,
      by: people.scheduler,
    },
  ] as const;
  for (const line of lines) {
    context.rows.unavailabilities.push({
      id: context.number('unavailabilities'),
      instrumentId: known(register.byTag, line.tag).id,
      reason: line.reason,
      note: line.note,
      startsAt: new Date(line.fromMs),
      endsAt: line.toMs === null ? null : new Date(line.toMs),
      reportedById: line.by,
      endedById: line.toMs === null ? null : people.metrologist,
      ...stamped(line.fromMs, line.toMs ?? line.fromMs),
    });
  }
}
