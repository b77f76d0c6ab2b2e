import { groupBy } from '#server/features/availability/group-by.ts';
import type { SiteValidity } from '#server/features/availability/validity.service.ts';
import type { BoardGroup, BoardRow } from '#shared/contracts/board.contract.ts';
import { boardGroups } from '#shared/contracts/board.contract.ts';
import type { UnitRow } from './board.repository.ts';
import type { DrawnRow } from './drawing.service.ts';

export type ListedRow = { readonly row: BoardRow; readonly drawn: DrawnRow };

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
    readonly validity: SiteValidity;
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
        return first === undefined || !isWanted ? [] : rowsOf(group, first, ofOne, wish);
      });
    });
}

function rowsOf(
  group: BoardGroup,
  first: UnitRow,
  units: readonly UnitRow[],
  wish: { readonly open: ReadonlySet<string>; readonly validity: SiteValidity },
): ListedRow[] {
  const key = `${first.instrumentKind}s` === group ? first.tag : `${first.tag}:${group}`;
  const href = `/equipment/${first.tag}`;
  const parent: ListedRow = {
    row: {
      key,
      group,
      parentKey: null,
      label: first.tag,
      note: first.model,
      badge: wish.validity.badgeOf(first.instrumentId)?.word ?? null,
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
  if (!wish.open.has(key)) {
    return [parent];
  }
  const children = units.map((unit): ListedRow => ({
    row: {
      key: unit.label,
      group,
      parentKey: key,
      label: unit.label,
      note: (unit.formats ?? []).join(', '),
      badge: null,
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
