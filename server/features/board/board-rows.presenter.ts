import { groupBy } from '#server/features/availability/group-by.ts';
import type { BoardGroup, BoardRow } from '#shared/contracts/board.contract.ts';
import { boardGroups } from '#shared/contracts/board.contract.ts';
import type { UnitRow } from './board.repository.ts';
import type { DrawnRow } from './drawing.service.ts';

/** A row in its place. Its badge is judged only once it is known to be shown. */
export type ListedRow = { readonly row: Omit<BoardRow, 'badge'>; readonly drawn: DrawnRow };

const groupOf: Readonly<Record<UnitRow['kind'], BoardGroup>> = {
  'chamber-position': 'chambers',
  'source-channel': 'sources',
  'meter-channel': 'meters',
};

/**
 * All rows of the board in reading order: chambers, sources, meters, each folded or followed by its
 * channels or positions. An instrument that sources and measures stands in both groups.
 */
export function listRows(
  units: readonly UnitRow[],
  wish: {
    readonly groups: readonly BoardGroup[];
    readonly open: ReadonlySet<string>;
    readonly text: string;
  },
): ListedRow[] {
  const text = wish.text.trim().toUpperCase();
  return boardGroups
    .filter((group) => wish.groups.includes(group))
    .flatMap((group) => {
      const members = units.filter((unit) => groupOf[unit.kind] === group);
      return [...groupBy(members, (unit) => unit.instrumentId).values()].flatMap((ofOne) => {
        const [first] = ofOne;
        const isWanted = first?.tag.includes(text) === true;
        return first === undefined || !isWanted ? [] : rowsOf(group, first, ofOne, wish.open);
      });
    });
}

function rowsOf(
  group: BoardGroup,
  first: UnitRow,
  units: readonly UnitRow[],
  open: ReadonlySet<string>,
): ListedRow[] {
  const key = `${first.instrumentKind}s` === group ? first.tag : `${first.tag}:${group}`;
  const href = `/equipment/${first.tag}`;
  const noun = group === 'chambers' ? 'position' : 'channel';
  const parent: ListedRow = {
    row: {
      key,
      group,
      parentKey: null,
      label: first.tag,
      note: `${units.length} ${units.length === 1 ? noun : `${noun}s`}`,
      childCount: units.length,
      href,
    },
    drawn: {
      key,
      instrumentId: first.instrumentId,
      unitIds: units.map(({ unitId }) => unitId),
      isWhole: true,
      hasBars: false,
    },
  };
  if (!open.has(key)) {
    return [parent];
  }
  const children = units.map((unit): ListedRow => ({
    row: {
      key: unit.label,
      group,
      parentKey: key,
      label: unit.label,
      note: (unit.formats ?? []).join(', '),
      childCount: 0,
      href,
    },
    drawn: {
      key: unit.label,
      instrumentId: unit.instrumentId,
      unitIds: [unit.unitId],
      isWhole: false,
      hasBars: true,
    },
  }));
  return [parent, ...children];
}
