import type { SiteScope } from '#server/actor.ts';
import type { Reader } from '#server/db/client.ts';
import { getSitePolicy, getWorkingCalendar } from '#server/features/settings/settings.service.ts';
import { siteDay } from '#shared/domain/calendar/site-day.ts';
import type { CalendarIndex } from '#shared/domain/calendar/types.ts';
import { calibrationBadge } from '#shared/domain/calibration-validity/calibration-badge.ts';
import type { BadgeState } from '#shared/domain/calibration-validity/calibration-badge.ts';
import type { ServiceState, ValiditySpan } from '#shared/domain/facility/types.ts';
import type { Span } from '#shared/domain/intervals/types.ts';
import type {
  CalibratedFunction,
  CalibrationBadge,
  InstrumentKind,
} from '#shared/domain/states.ts';
import {
  listApprovedCalibrations,
  listCalibrationScopes,
  listLimitations,
} from './calibration-records.repository.ts';
import type { CalibrationScopeRow } from './calibration-records.repository.ts';
import { listInstruments } from './equipment.repository.ts';
import type { InstrumentRow } from './equipment.repository.ts';
import { groupBy } from './group-by.ts';
import { listUnavailabilities } from './plan.repository.ts';
import { calendarOf } from './site-calendar.ts';
import { stateOf } from './to-equipment.ts';
import { buildValidity, limitSpans, toBreaks } from './to-validity.ts';
import { listRangeLabels, listSiteChannels } from './validity.repository.ts';
import type { RangeLabelRow, SiteChannelRow } from './validity.repository.ts';

const dayMs = 86_400_000;
/** Older records decide nothing any more, not even since when something is overdue. */
const rememberedDays = 800;

/** One channel × function × range of an instrument, or the whole of one without channels. */
export type ScopeFacts = {
  readonly channelId: number | null;
  readonly channelLabel: string | null;
  readonly unitId: number | null;
  readonly function: CalibratedFunction;
  readonly meterRangeId: number | null;
  readonly rangeLabel: string | null;
  readonly spans: readonly ValiditySpan[];
  readonly badge: BadgeState;
};

export type SiteValidity = {
  readonly calendar: CalendarIndex;
  readonly instruments: ReadonlyMap<number, InstrumentRow>;
  /** The state that counts: an instrument is in service only as long as what it is mounted in. */
  readonly stateOf: (instrumentId: number) => ServiceState;
  readonly scopesOf: (instrumentId: number) => readonly ScopeFacts[];
  /** The instrument and everything it is mounted in. */
  readonly chainOf: (instrumentId: number) => readonly number[];
  /** The worst of its scopes, or of a part of them; null where nothing has to be calibrated. */
  readonly badgeOf: (
    instrumentId: number,
    isMeant?: (scope: ScopeFacts) => boolean,
  ) => BadgeState | null;
};

/** What every instrument of a site is calibrated for now; for the register, the board and the due list. */
export async function loadSiteValidity(
  reader: Reader,
  site: Pick<SiteScope, 'id' | 'code'>,
  nowMs: number,
  instrumentIds?: readonly number[],
): Promise<SiteValidity> {
  const policy = await getSitePolicy({ db: reader }, site.id);
  const calendar = calendarOf(site.code, await getWorkingCalendar({ db: reader }, site.id));
  const instruments = new Map(
    (await listInstruments(reader, site.id)).map((row) => [row.id, row] as const),
  );
  const ids = instrumentIds ?? [...instruments.keys()];
  const records = await readRecords(reader, site, { ids, nowMs, calendar });
  const dueSoonDays = Math.max(...policy.reminderLeadDays);
  const known = new Map<number, readonly ScopeFacts[]>();
  const scopesOf = (instrumentId: number): readonly ScopeFacts[] => {
    const found =
      known.get(instrumentId) ??
      describeScopes(records, {
        instrument: instruments.get(instrumentId),
        state: stateOf(instruments, instrumentId),
        nowMs,
        calendar,
        dueSoonDays,
      });
    known.set(instrumentId, found);
    return found;
  };
  return {
    calendar,
    instruments,
    stateOf: (instrumentId) => stateOf(instruments, instrumentId),
    scopesOf,
    chainOf: (instrumentId) => chainOf(instruments, instrumentId),
    badgeOf: (instrumentId, isMeant = () => true) =>
      worstOf(scopesOf(instrumentId).filter((scope) => isMeant(scope))),
  };
}

function chainOf(
  instruments: ReadonlyMap<number, InstrumentRow>,
  instrumentId: number,
): readonly number[] {
  const parentId = instruments.get(instrumentId)?.parentId ?? null;
  return parentId === null ? [instrumentId] : [instrumentId, ...chainOf(instruments, parentId)];
}

/** A reported time out of use, of an instrument or of one unit. */
export type UnavailableSpan = {
  readonly instrumentId: number | null;
  readonly unitId: number | null;
  readonly note: string;
  readonly startMs: number;
  /** Null: nobody knows when it ends. */
  readonly endMs: number | null;
};

export async function findUnavailabilities(
  reader: Reader,
  wish: {
    readonly instrumentIds: readonly number[];
    readonly unitIds: readonly number[];
    readonly window: Span;
  },
): Promise<UnavailableSpan[]> {
  const rows = await listUnavailabilities(reader, wish, wish.window);
  return rows.map((row) => ({
    instrumentId: row.instrumentId,
    unitId: row.unitId,
    note: row.note,
    startMs: row.startsAt.getTime(),
    endMs: row.endsAt?.getTime() ?? null,
  }));
}

async function readRecords(
  reader: Reader,
  site: Pick<SiteScope, 'id'>,
  input: {
    readonly ids: readonly number[];
    readonly nowMs: number;
    readonly calendar: CalendarIndex;
  },
) {
  const { ids, nowMs, calendar } = input;
  const channels = await listSiteChannels(reader, site.id, ids);
  const sinceDay = siteDay(calendar, nowMs - rememberedDays * dayMs);
  const calibrations = await listApprovedCalibrations(reader, ids, sinceDay);
  const unitIds = channels.map((row) => row.unitId);
  return {
    channels: groupBy(channels, (row) => row.instrumentId),
    ranges: groupBy(await listRangeLabels(reader, ids), (row) => row.instrumentId),
    calibrations: groupBy(calibrations, (row) => row.instrumentId),
    scopes: groupBy(
      await listCalibrationScopes(
        reader,
        calibrations.map((row) => row.id),
      ),
      (row) => row.calibrationId,
    ),
    limitations: groupBy(await listLimitations(reader, unitIds), (row) => row.unitId),
    unavailabilities: await listUnavailabilities(
      reader,
      { instrumentIds: ids, unitIds },
      { startMs: nowMs - rememberedDays * dayMs, endMs: nowMs + rememberedDays * dayMs },
    ),
  };
}
type Records = Awaited<ReturnType<typeof readRecords>>;

type Part = Omit<ScopeFacts, 'spans' | 'badge'>;

function describeScopes(
  records: Records,
  of: {
    readonly instrument: InstrumentRow | undefined;
    readonly state: ServiceState;
    readonly nowMs: number;
    readonly calendar: CalendarIndex;
    readonly dueSoonDays: number;
  },
): readonly ScopeFacts[] {
  const { instrument } = of;
  if (instrument === undefined) {
    return [];
  }
  const channels = records.channels.get(instrument.id) ?? [];
  const calibrations = records.calibrations.get(instrument.id) ?? [];
  const vouchedFor = calibrations.flatMap((row) => records.scopes.get(row.id) ?? []);
  const parts =
    channels.length === 0
      ? wholeParts(instrument, vouchedFor)
      : channelParts(channels, records.ranges.get(instrument.id) ?? []);
  const channelOfUnit = new Map(channels.map((row) => [row.unitId, row.channelId]));
  const validityOf = buildValidity({
    instrumentId: instrument.id,
    things: thingsOf(instrument, parts),
    calibrations,
    scopes: records.scopes,
    breaks: toBreaks(
      records.unavailabilities.filter(
        (row) =>
          row.instrumentId === instrument.id ||
          (row.unitId !== null && channelOfUnit.has(row.unitId)),
      ),
      (unitId) => channelOfUnit.get(unitId) ?? null,
    ),
    site: of.calendar,
  });
  return parts.map((part) => {
    const limitations = part.unitId === null ? [] : (records.limitations.get(part.unitId) ?? []);
    const spans = limitSpans(
      validityOf({
        channelId: part.channelId ?? instrument.id,
        function: part.function,
        rangeId: part.meterRangeId,
      }),
      limitations,
    );
    const badge = calibrationBadge({
      state: of.state,
      spans,
      nowMs: of.nowMs,
      site: of.calendar,
      dueSoonDays: of.dueSoonDays,
    });
    return { ...part, spans, badge: dateLapse(badge, spans, of) };
  });
}

/** What a failed calibration ended has no due day of its own: it was last in date the day before. */
function dateLapse(
  badge: BadgeState,
  spans: readonly ValiditySpan[],
  at: { readonly nowMs: number; readonly calendar: CalendarIndex },
): BadgeState {
  const last = spans.findLast((span) => span.endMs <= at.nowMs);
  return badge.word === 'overdue' && badge.dueOn === null && last !== undefined
    ? { ...badge, dueOn: siteDay(at.calendar, last.endMs - 1) }
    : badge;
}

/** What an instrument without channels is calibrated for before it has any record. */
const wholeFunctions: Partial<Record<InstrumentKind, CalibratedFunction>> = {
  chamber: 'temperature',
  logger: 'temperature',
  probe: 'temperature',
  standard: 'source',
  'check-standard': 'source',
};

/** A standard may hold a voltage, a resistance or a temperature: its records say which. */
function wholeParts(
  instrument: InstrumentRow,
  vouchedFor: readonly CalibrationScopeRow[],
): readonly Part[] {
  const fallback = wholeFunctions[instrument.kind];
  if (fallback === undefined) {
    return [];
  }
  const recorded = [...new Set(vouchedFor.map((scope) => scope.function))];
  return (recorded.length === 0 ? [fallback] : recorded).map((use) => ({
    channelId: null,
    channelLabel: null,
    unitId: null,
    function: use,
    meterRangeId: null,
    rangeLabel: null,
  }));
}

function channelParts(
  channels: readonly SiteChannelRow[],
  ranges: readonly RangeLabelRow[],
): readonly Part[] {
  return channels.flatMap((channel): Part[] => {
    const base = {
      channelId: channel.channelId,
      channelLabel: channel.label,
      unitId: channel.unitId,
    };
    return channel.function === 'source'
      ? [{ ...base, function: 'source', meterRangeId: null, rangeLabel: null }]
      : ranges
          .filter((range) => range.channelId === null || range.channelId === channel.channelId)
          .map((range) => ({
            ...base,
            function: 'measure',
            meterRangeId: range.id,
            rangeLabel: range.label,
          }));
  });
}

function thingsOf(instrument: InstrumentRow, parts: readonly Part[]) {
  const meters = parts.filter((part) => part.function === 'measure');
  return {
    sourceChannelIds: parts
      .filter((part) => part.function === 'source')
      .map((part) => part.channelId ?? instrument.id),
    meterChannelIds: [...new Set(meters.map((part) => part.channelId ?? instrument.id))],
    rangeIdsByChannel: groupedRanges(instrument, meters),
  };
}

function groupedRanges(instrument: InstrumentRow, meters: readonly Part[]) {
  const groups = groupBy(meters, (part) => part.channelId ?? instrument.id);
  return new Map(
    [...groups].map(([channelId, parts]) => [
      channelId,
      parts.map((part) => part.meterRangeId).filter((id) => id !== null),
    ]),
  );
}

/** Worst first: one range that is overdue makes the instrument read overdue. */
const order: readonly CalibrationBadge[] = [
  'awaiting-release',
  'out-of-service',
  'not-calibrated',
  'overdue',
  'due-soon',
  'limited',
  'in-date',
];

function worstOf(scopes: readonly ScopeFacts[]): BadgeState | null {
  const worst = scopes.toSorted(
    (first, second) => order.indexOf(first.badge.word) - order.indexOf(second.badge.word),
  )[0];
  const dueDays = scopes.map((scope) => scope.badge.dueOn).filter((day) => day !== null);
  return worst === undefined
    ? null
    : { ...worst.badge, dueOn: dueDays.toSorted((a, b) => a.localeCompare(b))[0] ?? null };
}
