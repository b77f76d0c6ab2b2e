import { validitySpans } from '#shared/domain/calibration-validity/validity-spans.ts';
import type {
  ApprovedCalibration,
  CalibrationScope,
  ValidityBreak,
  ValidityKey,
} from '#shared/domain/calibration-validity/types.ts';
import type { CalendarIndex } from '#shared/domain/calendar/types.ts';
import type { ValiditySpan } from '#shared/domain/facility/types.ts';
import type {
  CalibrationRow,
  CalibrationScopeRow,
  LimitationRow,
} from './calibration-records.repository.ts';
import type { UnavailabilityRow } from './plan.repository.ts';

/** What an instrument has that a scope without channel or range stands for. */
export type CalibratedThings = {
  readonly sourceChannelIds: readonly number[];
  readonly meterChannelIds: readonly number[];
  readonly rangeIdsByChannel: ReadonlyMap<number, readonly number[]>;
};

type Record = { readonly row: CalibrationRow; readonly scope: CalibrationScope };

/**
 * The validity of every channel × function × range of one instrument. A temperature indication has no
 * channel: its key carries the chamber's own number.
 */
export function buildValidity(input: {
  readonly instrumentId: number;
  readonly things: CalibratedThings;
  readonly calibrations: readonly CalibrationRow[];
  readonly scopes: ReadonlyMap<number, readonly CalibrationScopeRow[]>;
  readonly breaks: readonly ValidityBreak[];
  readonly site: CalendarIndex;
}): (key: ValidityKey) => readonly ValiditySpan[] {
  const replaced = new Set(input.calibrations.map((row) => row.replacesId));
  const byKey = new Map<string, Record[]>();
  for (const row of input.calibrations) {
    if (replaced.has(row.id)) {
      continue;
    }
    for (const [name, scope] of expandScopes(input, row)) {
      byKey.set(name, [...(byKey.get(name) ?? []), { row, scope }]);
    }
  }
  const known = new Map<string, readonly ValiditySpan[]>();
  return (key) => {
    const records = byKey.get(nameOf(key)) ?? [];
    const breaks = input.breaks.filter(
      (gap) => gap.channelId === null || gap.channelId === key.channelId,
    );
    // Channels calibrated together have the same stretches: work them out once.
    const signature = JSON.stringify([
      records.map(({ row, scope }) => [row.id, scope.limitation]),
      breaks,
    ]);
    const spans =
      known.get(signature) ??
      validitySpans({ site: input.site, key, calibrations: records.map(toApproved), breaks });
    known.set(signature, spans);
    return spans;
  };
}

function expandScopes(
  input: Pick<Parameters<typeof buildValidity>[0], 'instrumentId' | 'things' | 'scopes'>,
  row: CalibrationRow,
): Map<string, CalibrationScope> {
  const expanded = new Map<string, CalibrationScope>();
  // What names its channel and range wins over what stands for all of them.
  const scopes = (input.scopes.get(row.id) ?? []).toSorted(
    (first, second) => preciseness(first) - preciseness(second),
  );
  for (const scope of scopes) {
    for (const key of keysOf(input, scope)) {
      expanded.set(nameOf(key), {
        ...key,
        conformityAsLeft: row.conformityAsLeft,
        limitation: scope.limitation,
      });
    }
  }
  return expanded;
}

function keysOf(
  input: Pick<Parameters<typeof buildValidity>[0], 'instrumentId' | 'things'>,
  scope: CalibrationScopeRow,
): ValidityKey[] {
  const { things } = input;
  switch (scope.function) {
    case 'temperature':
      return [{ channelId: input.instrumentId, function: 'temperature', rangeId: null }];
    case 'source':
      return (scope.channelId === null ? things.sourceChannelIds : [scope.channelId]).map(
        (channelId) => ({ channelId, function: 'source', rangeId: null }),
      );
    case 'measure':
      return (scope.channelId === null ? things.meterChannelIds : [scope.channelId]).flatMap(
        (channelId) =>
          (scope.meterRangeId === null
            ? (things.rangeIdsByChannel.get(channelId) ?? [])
            : [scope.meterRangeId]
          ).map((rangeId): ValidityKey => ({ channelId, function: 'measure', rangeId })),
      );
  }
}

function toApproved({ row, scope }: Record): ApprovedCalibration {
  return {
    id: row.id,
    performedOn: row.performedOn,
    dueOn: row.dueOn,
    approvedAtMs: row.decidedAt?.getTime() ?? 0,
    replacesId: row.replacesId,
    extendedDueOn: null,
    scopes: [scope],
  };
}

function preciseness(scope: CalibrationScopeRow): number {
  return (scope.channelId === null ? 0 : 2) + (scope.meterRangeId === null ? 0 : 1);
}

function nameOf(key: ValidityKey): string {
  return `${key.function}/${key.channelId}/${key.rangeId ?? 'all'}`;
}

/**
 * The times that take the worth of a calibration away: a failed calibration and a withdrawal. A mere
 * breakdown makes the unit unavailable; whether it must be calibrated again is decided with a record.
 */
export function toBreaks(
  unavailabilities: readonly UnavailabilityRow[],
  channelIdOfUnit: (unitId: number) => number | null,
): ValidityBreak[] {
  return unavailabilities
    .filter((row) => row.reason === 'failed-calibration' || row.reason === 'withdrawn')
    .map((row) => ({
      channelId: row.unitId === null ? null : channelIdOfUnit(row.unitId),
      startMs: row.startsAt.getTime(),
      endMs: row.endsAt?.getTime() ?? null,
    }));
}

/** Marks the stretches of validity during which the unit's own limitations hold. */
export function limitSpans(
  spans: readonly ValiditySpan[],
  limitations: readonly LimitationRow[],
): readonly ValiditySpan[] {
  if (limitations.length === 0) {
    return spans;
  }
  const edges = limitations.flatMap((row) => [
    row.startsAt.getTime(),
    ...(row.endsAt === null ? [] : [row.endsAt.getTime()]),
  ]);
  return spans.flatMap((span) => {
    const cuts = [
      ...new Set([span.startMs, ...edges.filter((edge) => isInside(span, edge)), span.endMs]),
    ].toSorted((first, second) => first - second);
    return cuts.slice(0, -1).map((startMs, position): ValiditySpan => {
      const endMs = cuts[position + 1] ?? span.endMs;
      const notes = limitations
        .filter((row) => row.startsAt.getTime() <= startMs && endMs <= endOf(row))
        .map((row) => row.note);
      const all = [span.limitation, ...notes].filter((note) => note !== null);
      return {
        ...span,
        startMs,
        endMs,
        dueOn: endMs === span.endMs ? span.dueOn : null,
        limitation: all.length === 0 ? null : all.join('; '),
      };
    });
  });
}

function isInside(span: ValiditySpan, edgeMs: number): boolean {
  return span.startMs < edgeMs && edgeMs < span.endMs;
}

function endOf(row: LimitationRow): number {
  return row.endsAt?.getTime() ?? Number.MAX_SAFE_INTEGER;
}
