import { groupBy } from '#server/features/availability/group-by.ts';
import type { SiteValidity } from '#server/features/availability/validity.service.ts';
import type { BoardBlock } from '#shared/contracts/board.contract.ts';
import { formatSiteTime } from '#shared/domain/calendar/format-site-time.ts';
import { formatSiteDay } from '#shared/domain/calendar/format-site-day.ts';
import type { ServiceState } from '#shared/domain/facility/types.ts';
import type { Span } from '#shared/domain/intervals/types.ts';
import type { TakenRow } from './board.repository.ts';
import type { DrawnRow } from './drawing.service.ts';
import type { RowUnavailability } from './unavailability.service.ts';

type Input = {
  readonly rows: readonly DrawnRow[];
  readonly window: Span;
  readonly validity: SiteValidity;
  readonly taken: readonly TakenRow[];
  readonly unavailable: readonly RowUnavailability[];
  readonly nowMs: number;
};

/** The stretches of rows that nothing can be booked in, each with its sentence. */
export function drawBlocks(input: Input): BoardBlock[] {
  return input.rows.flatMap((row) => [
    ...outageBlocks(input, row),
    ...unavailableBlocks(input, row),
    ...stateBlocks(input, row),
    ...dueBlocks(input, row),
  ]);
}

function block(
  row: DrawnRow,
  window: Span,
  what: Span & Pick<BoardBlock, 'kind' | 'sentence'>,
): BoardBlock[] {
  const startMs = Math.max(window.startMs, what.startMs);
  const endMs = Math.min(window.endMs, what.endMs);
  return startMs >= endMs
    ? []
    : [
        {
          rowKey: row.key,
          kind: what.kind,
          startAt: new Date(startMs).toISOString(),
          endAt: new Date(endMs).toISOString(),
          sentence: what.sentence,
        },
      ];
}

/** A whole instrument is closed by an outage only where it takes every unit of it. */
function outageBlocks({ taken, window, validity }: Input, row: DrawnRow): BoardBlock[] {
  const planned = taken.filter(
    (each) => each.bookingId === null && row.unitIds.includes(each.unitId),
  );
  const groups = groupBy(planned, (each) => `${each.outageId ?? ''}/${each.otherWorkId ?? ''}`);
  return [...groups.values()].flatMap((group) => {
    const [first] = group;
    if (first === undefined || (row.isWhole && group.length < row.unitIds.length)) {
      return [];
    }
    const title = first.outageTitle ?? first.otherWorkTitle ?? 'planned';
    const until = formatSiteTime(validity.calendar, first.during.endMs);
    return block(row, window, {
      ...first.during,
      kind: 'outage',
      sentence: `${title}, until ${until}`,
    });
  });
}

function unavailableBlocks({ unavailable, window, validity }: Input, row: DrawnRow): BoardBlock[] {
  return unavailable
    .filter(({ rowKey }) => rowKey === row.key)
    .flatMap(({ span }) =>
      block(row, window, {
        startMs: span.startMs,
        endMs: span.endMs ?? window.endMs,
        kind: 'unavailable',
        sentence:
          span.endMs === null
            ? `${span.note} Nobody knows until when.`
            : `${span.note} Until ${formatSiteTime(validity.calendar, span.endMs)}.`,
      }),
    );
}

const stateWords: Partial<Record<ServiceState, string>> = {
  'awaiting-release': 'awaits release',
  'out-of-service': 'is out of service',
  retired: 'is retired',
};

function stateBlocks({ validity, window, nowMs }: Input, row: DrawnRow): BoardBlock[] {
  const word = stateWords[validity.stateOf(row.instrumentId)];
  return word === undefined
    ? []
    : block(row, window, {
        startMs: nowMs,
        endMs: window.endMs,
        kind: 'unavailable',
        sentence: `${validity.instruments.get(row.instrumentId)?.tag ?? ''} ${word}.`,
      });
}

/** After the due day nothing can be booked; said once, from the upright on. */
function dueBlocks({ validity, window, nowMs }: Input, row: DrawnRow): BoardBlock[] {
  if (validity.stateOf(row.instrumentId) !== 'in-service') {
    return [];
  }
  const scopes = validity
    .scopesOf(row.instrumentId)
    .filter((scope) => row.isWhole || scope.unitId === null || row.unitIds.includes(scope.unitId));
  const tag = validity.instruments.get(row.instrumentId)?.tag ?? '';
  const ends = scopes.map(({ badge }) => badge.validUntilMs ?? nowMs);
  if (ends.length === 0) {
    return [];
  }
  const startMs = Math.min(...ends);
  const dueOn = scopes.find(({ badge }) => (badge.validUntilMs ?? nowMs) === startMs)?.badge.dueOn;
  const sentence =
    dueOn === undefined || dueOn === null
      ? `Not bookable: ${tag} is not in calibration.`
      : `Not bookable: ${tag} falls due ${formatSiteDay(dueOn)}.`;
  return block(row, window, { startMs, endMs: window.endMs, kind: 'not-bookable', sentence });
}
