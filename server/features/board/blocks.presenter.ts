import { groupBy } from '#server/features/availability/group-by.ts';
import type { ScopeFacts, SiteValidity } from '#server/features/availability/validity.service.ts';
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
  readonly seesProject: (projectId: number) => boolean;
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
function outageBlocks(input: Input, row: DrawnRow): BoardBlock[] {
  const { taken, window, validity } = input;
  const planned = taken.filter(
    (each) => each.bookingId === null && row.unitIds.includes(each.unitId),
  );
  const groups = groupBy(planned, (each) => `${each.outageId ?? ''}/${each.otherWorkId ?? ''}`);
  return [...groups.values()].flatMap((group) => {
    const [first] = group;
    if (first === undefined || (row.isWhole && group.length < row.unitIds.length)) {
      return [];
    }
    const until = formatSiteTime(validity.calendar, first.during.endMs);
    return block(row, window, {
      ...first.during,
      kind: 'outage',
      sentence: `${first.outageTitle ?? otherWorkTitle(input, first)}, until ${until}`,
    });
  });
}

/** What it is for is its project's own; everybody sees that the place is taken. */
function otherWorkTitle({ seesProject }: Input, row: TakenRow): string {
  const isSeen = row.otherWorkProjectId === null || seesProject(row.otherWorkProjectId);
  return isSeen && row.otherWorkTitle !== null ? row.otherWorkTitle : 'Taken by other work';
}

function unavailableBlocks({ unavailable, window, validity }: Input, row: DrawnRow): BoardBlock[] {
  return unavailable
    .filter(({ rowKey }) => rowKey === row.key)
    .flatMap(({ span }) =>
      block(row, window, {
        startMs: span.startMs,
        endMs: span.endMs ?? window.endMs,
        kind: 'unavailable',
        sentence: `${span.note.trim().replace(/[.;]+$/, '')}; ${
          span.endMs === null
            ? 'nobody knows until when.'
            : `until ${formatSiteTime(validity.calendar, span.endMs)}.`
        }`,
      }),
    );
}

const stateWords: Partial<Record<ServiceState, string>> = {
  'awaiting-release': 'awaits release',
  'out-of-service': 'is out of service',
  retired: 'is retired',
};

/** Out of service as a whole; left out where a report with no end says why already. */
function stateBlocks(input: Input, row: DrawnRow): BoardBlock[] {
  const { validity, window, nowMs, unavailable } = input;
  const word = stateWords[validity.stateOf(row.instrumentId)];
  const isReported = unavailable.some(
    ({ rowKey, span }) => rowKey === row.key && span.startMs <= nowMs && span.endMs === null,
  );
  return word === undefined || isReported
    ? []
    : block(row, window, {
        startMs: nowMs,
        endMs: window.endMs,
        kind: 'unavailable',
        sentence: `${validity.instruments.get(row.instrumentId)?.tag ?? ''} ${word}.`,
      });
}

/** Whether what is calibrated there is what a row draws: its own channels, or the whole instrument. */
export function concernsRow(row: DrawnRow, scope: Pick<ScopeFacts, 'unitId'>): boolean {
  return scope.unitId === null || row.unitIds.includes(scope.unitId);
}

/** Where not one range of the row is valid any more nothing can be booked; said once. */
function dueBlocks({ validity, window, nowMs }: Input, row: DrawnRow): BoardBlock[] {
  if (validity.stateOf(row.instrumentId) !== 'in-service') {
    return [];
  }
  const scopes = validity.scopesOf(row.instrumentId).filter((scope) => concernsRow(row, scope));
  const tag = validity.instruments.get(row.instrumentId)?.tag ?? '';
  const ends = scopes.map(({ badge }) => badge.validUntilMs ?? nowMs);
  if (ends.length === 0) {
    return [];
  }
  const startMs = Math.max(...ends);
  const dueOn = scopes.find(({ badge }) => (badge.validUntilMs ?? nowMs) === startMs)?.badge.dueOn;
  const sentence =
    dueOn === undefined || dueOn === null
      ? `Not bookable: ${tag} is not in calibration.`
      : `Not bookable: ${tag} falls due ${formatSiteDay(dueOn)}.`;
  return block(row, window, { startMs, endMs: window.endMs, kind: 'not-bookable', sentence });
}
