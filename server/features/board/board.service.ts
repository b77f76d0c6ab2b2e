import type { z } from 'zod';
import type { SignedIn, SiteScope } from '#server/actor.ts';
import type { Deps } from '#server/deps.ts';
import { groupBy } from '#server/features/availability/group-by.ts';
import { loadSiteValidity } from '#server/features/availability/validity.service.ts';
import type { SiteValidity } from '#server/features/availability/validity.service.ts';
import { problem } from '#server/problem.ts';
import { boardGroups } from '#shared/contracts/board.contract.ts';
import type {
  BoardRow,
  BoardWindow,
  getBoard as contract,
  Tide,
} from '#shared/contracts/board.contract.ts';
import { findCalendarDay } from '#shared/domain/calendar/find-calendar-day.ts';
import { getCalendarDay } from '#shared/domain/calendar/get-calendar-day.ts';
import type { CalendarIndex } from '#shared/domain/calendar/types.ts';
import type { Span } from '#shared/domain/intervals/types.ts';
import { concernsRow } from './blocks.presenter.ts';
import { listRows } from './board-rows.presenter.ts';
import type { ListedRow } from './board-rows.presenter.ts';
import { listTemperaturePhases, listUnits } from './board.repository.ts';
import type { TakenRow, UnitRow } from './board.repository.ts';
import { drawRows } from './drawing.service.ts';
import { isInUse, takenSteps, temperatureLine } from './tides.presenter.ts';

type Reading = Pick<Deps, 'clock' | 'db'>;

const dayMs = 86_400_000;
const longestWindowMs = 36 * dayMs;
const rowsAtOnce = 40;

/** The window asked for, refused where it is turned round or too long to draw. */
export function requireWindow(query: { readonly from: string; readonly to: string }): Span {
  const window = { startMs: Date.parse(query.from), endMs: Date.parse(query.to) };
  const isFit = window.startMs < window.endMs && window.endMs - window.startMs <= longestWindowMs;
  if (!isFit) {
    const detail = 'A window ends after it starts and is at most 36 days long.';
    throw problem('input.invalid', { detail, errors: [{ detail, pointer: '#/query/to' }] });
  }
  return window;
}

/** One window of the board: only the rows and the hours that are shown are read. */
export async function getBoard(
  deps: Reading,
  actor: SignedIn,
  site: SiteScope,
  query: z.output<typeof contract.query>,
): Promise<BoardWindow> {
  const window = requireWindow(query);
  const units = await listUnits(deps.db, site.id);
  const all = listRows(units, {
    groups: query.groups ?? boardGroups,
    open: new Set((query.open ?? '').split(',')),
    text: query.text ?? '',
  });
  const offset = query.offset ?? 0;
  const shown = all.slice(offset, offset + (query.limit ?? rowsAtOnce));
  const instrumentIds = [...new Set(shown.map(({ drawn }) => drawn.instrumentId))];
  const nowMs = deps.clock.now().getTime();
  const validity = await loadSiteValidity(deps.db, site, nowMs, instrumentIds);
  const drawing = await drawRows(deps, actor, site, {
    rows: shown.map(({ drawn }) => drawn),
    window,
    validity,
  });
  return {
    from: new Date(window.startMs).toISOString(),
    to: new Date(window.endMs).toISOString(),
    rows: shown.map((listed) => ({ ...listed.row, badge: badgeOf(listed, validity) })),
    rowCount: all.length,
    bars: drawing.bars,
    blocks: drawing.blocks,
    tides: await drawTides(deps, { shown, units, taken: drawing.taken, window }),
    staffed: staffedSpans(validity.calendar, window),
  };
}

/** A position is not calibrated by itself; a channel is, apart from its neighbours. */
function badgeOf({ row, drawn }: ListedRow, validity: SiteValidity): BoardRow['badge'] {
  return row.group === 'chambers' && !drawn.isWhole
    ? null
    : (validity.badgeOf(drawn.instrumentId, (scope) => concernsRow(drawn, scope))?.word ?? null);
}

async function drawTides(
  deps: Reading,
  input: {
    readonly shown: readonly ListedRow[];
    readonly units: readonly UnitRow[];
    readonly taken: readonly TakenRow[];
    readonly window: Span;
  },
): Promise<Tide[]> {
  const { window } = input;
  const whole = input.shown.filter(({ drawn }) => drawn.isWhole);
  const chambers = whole.filter(({ row }) => row.group === 'chambers');
  const phases = groupBy(
    await listTemperaturePhases(
      deps.db,
      chambers.map(({ drawn }) => drawn.instrumentId),
      window,
    ),
    (row) => row.chamberId,
  );
  const takenOf = groupBy(input.taken, (row) => row.unitId);
  const idleOf = new Map(input.units.map((unit) => [unit.instrumentId, unit.idleTempMdegc]));
  return whole.map(({ row, drawn }) => {
    const idle = idleOf.get(drawn.instrumentId) ?? null;
    return {
      rowKey: row.key,
      positions: drawn.unitIds.length,
      taken: takenSteps(
        drawn.unitIds.flatMap((unitId) => takenOf.get(unitId) ?? []).filter(isInUse),
        window,
      ),
      temperature:
        idle === null ? [] : temperatureLine(phases.get(drawn.instrumentId) ?? [], idle, window),
    };
  });
}

/** Working hours inside a window. */
export function staffedSpans(
  calendar: CalendarIndex,
  window: Span,
): { startAt: string; endAt: string }[] {
  const first = findCalendarDay(calendar, window.startMs).dayNumber;
  const last = findCalendarDay(calendar, window.endMs - 1).dayNumber;
  const spans: { startAt: string; endAt: string }[] = [];
  for (let day = first; day <= last; day += 1) {
    for (const { startMs, endMs } of getCalendarDay(calendar, day).working) {
      if (startMs < window.endMs && endMs > window.startMs) {
        spans.push({
          startAt: new Date(Math.max(startMs, window.startMs)).toISOString(),
          endAt: new Date(Math.min(endMs, window.endMs)).toISOString(),
        });
      }
    }
  }
  return spans;
}
