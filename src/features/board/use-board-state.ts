import { boardGroups, type BoardGroup } from '#shared/contracts/board.contract.ts';
import { useUrlChoice, useUrlState } from '#src/hooks/use-url-state.ts';
import { boardViews } from './board-window.view.ts';

const allGroups = boardGroups.join(',');

/** The board's state, all of it in the address, so that a link shows the same board. */
export function useBoardState(today: string) {
  const [view, setView] = useUrlChoice('view', boardViews, 'week');
  const [day, setDay] = useUrlState('day', today);
  const [groupText, setGroupText] = useUrlState('groups', allGroups);
  const [openText, setOpenText] = useUrlState('open');
  const [text, setText] = useUrlState('text');
  const [offsetText, setOffsetText] = useUrlState('row', '0');
  const groups = boardGroups.filter((group) => groupText.split(',').includes(group));
  const open = new Set(openText.split(',').filter((key) => key !== ''));
  return {
    view,
    setView,
    day,
    setDay,
    groups: groups.length === 0 ? boardGroups : groups,
    setGroups: (next: readonly BoardGroup[]) => {
      setGroupText(next.join(','));
    },
    open,
    toggle: (key: string) => {
      const next = new Set(open);
      if (!next.delete(key)) {
        next.add(key);
      }
      setOpenText([...next].join(','));
    },
    text,
    setText,
    offset: Math.max(0, Number.parseInt(offsetText, 10) || 0),
    setOffset: (offset: number) => {
      setOffsetText(String(offset));
    },
  };
}
export type BoardState = ReturnType<typeof useBoardState>;
