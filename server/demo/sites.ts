import { DateTime } from 'luxon';
import { buildCalendarIndex } from '#shared/domain/calendar/build-calendar-index.ts';
import type { CalendarIndex } from '#shared/domain/calendar/types.ts';
import type { DayHours } from '#shared/domain/facility/types.ts';
import { stamped, type DemoContext } from './demo-context.ts';
import { dayMs } from './demo-days.ts';

export type SiteKey = 'larkfen' | 'otterholm';
export type DemoSite = {
  readonly id: number;
  readonly key: SiteKey;
  readonly zone: string;
  readonly calendar: CalendarIndex;
  readonly rooms: ReadonlyMap<string, number>;
};
export type Sites = Readonly<Record<SiteKey, DemoSite>>;

type Exception = { readonly day: string; readonly hours: DayHours[]; readonly reason: string };

const rooms = {
  larkfen: [
    { name: 'Room 1', maxEnergyWh: 6000, temperatureSwingK: 0.8, note: null },
    { name: 'Room 2', maxEnergyWh: 8000, temperatureSwingK: 1, note: null },
    {
      name: 'Room 3',
      maxEnergyWh: 20_000,
      temperatureSwingK: 1.5,
      note: 'Large cells. Gas extraction; two persons when loading.',
    },
    { name: 'Standards room', maxEnergyWh: null, temperatureSwingK: 0.3, note: '23 °C ± 1 K.' },
  ],
  otterholm: [
    { name: 'Hall A', maxEnergyWh: 9000, temperatureSwingK: 1.2, note: null },
    {
      name: 'Hall B',
      maxEnergyWh: 12_000,
      temperatureSwingK: 2,
      note: 'South side, warm at noon.',
    },
  ],
} as const;

export function laySites(context: DemoContext): Sites {
  return {
    larkfen: laySite(context, {
      key: 'larkfen',
      name: 'Larkfen',
      zone: 'Europe/Dublin',
      open: { fromMin: 480, toMin: 1080 },
      exceptions: [
        ...holidays(context, [
          [12, 25],
          [12, 26],
          [1, 1],
        ]),
        ...saturdays(context),
      ],
    }),
    otterholm: laySite(context, {
      key: 'otterholm',
      name: 'Otterholm',
      zone: 'America/Toronto',
      open: { fromMin: 450, toMin: 1050 },
      exceptions: holidays(context, [
        [12, 25],
        [12, 26],
        [1, 1],
        [7, 1],
      ]),
    }),
  };
}

function laySite(
  context: DemoContext,
  site: {
    readonly key: SiteKey;
    readonly name: string;
    readonly zone: string;
    readonly open: DayHours;
    readonly exceptions: readonly Exception[];
  },
): DemoSite {
  const id = context.number('sites');
  const made = stamped(context.nowMs - 1150 * dayMs);
  const hours = [site.open];
  const weekly = { '1': hours, '2': hours, '3': hours, '4': hours, '5': hours };
  context.rows.sites.push({
    id,
    code: site.key,
    name: site.name,
    zone: site.zone,
    workingHours: weekly,
    ...made,
  });
  for (const exception of site.exceptions) {
    context.rows.siteExceptions.push({
      id: context.number('siteExceptions'),
      siteId: id,
      ...exception,
      ...made,
    });
  }
  const roomIds = new Map<string, number>();
  for (const room of rooms[site.key]) {
    const roomId = context.number('rooms');
    roomIds.set(room.name, roomId);
    context.rows.rooms.push({ id: roomId, siteId: id, ...room, ...made });
  }
  const { zone, exceptions } = site;
  return {
    id,
    key: site.key,
    zone,
    calendar: buildCalendarIndex({ zone, weekly, exceptions }),
    rooms: roomIds,
  };
}

/** Public holidays on fixed dates, from two years back to one year ahead. */
function holidays(
  context: DemoContext,
  dates: readonly (readonly [number, number])[],
): Exception[] {
  const year = new Date(context.nowMs).getUTCFullYear();
  return [year - 2, year - 1, year, year + 1].flatMap((of) =>
    dates.map(([month, day]) => ({
      day: DateTime.utc(of, month, day).toFormat('yyyy-MM-dd'),
      hours: [],
      reason: 'Public holiday',
    })),
  );
}

/** Every fourth Saturday some people work in the morning. */
function saturdays(context: DemoContext): Exception[] {
  const today = DateTime.fromMillis(context.nowMs, { zone: 'Europe/Dublin' });
  const next = today.plus({ days: 6 - (today.weekday % 7) });
  return Array.from({ length: 24 }, (_, index) => next.plus({ weeks: 4 * (index - 20) }))
    .filter((day) => !['12-25', '12-26', '01-01'].includes(day.toFormat('MM-dd')))
    .map((day) => ({
      day: day.toFormat('yyyy-MM-dd'),
      hours: [{ fromMin: 540, toMin: 780 }],
      reason: 'Saturday shift',
    }));
}
