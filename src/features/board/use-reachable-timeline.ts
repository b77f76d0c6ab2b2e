import { useEffect, type RefObject } from 'react';

const tableRoles = ['grid', 'rowgroup', 'row', 'gridcell', 'columnheader', 'rowheader']
  .map((role) => `[role="${role}"]`)
  .join(',');

/**
 * The calendar calls its layout tables a grid and hides the one that holds the lanes from screen
 * readers, although its bookings take the focus. Whenever it has drawn, the tables become layout and
 * nothing more, so that what is read out are the rows' links and the bookings, each with its sentence.
 */
export function useReachableTimeline(frame: RefObject<HTMLElement | null>): void {
  useEffect(() => {
    const board = frame.current;
    if (board === null) {
      return undefined;
    }
    const putRight = () => {
      for (const part of board.querySelectorAll(tableRoles)) {
        part.setAttribute('role', 'presentation');
      }
      for (const lanes of board.querySelectorAll('table[aria-hidden="true"]')) {
        if (lanes.querySelector('[tabindex], a, button') !== null) {
          lanes.removeAttribute('aria-hidden');
          lanes.setAttribute('role', 'presentation');
        }
      }
    };
    const observer = new MutationObserver(putRight);
    observer.observe(board, { childList: true, subtree: true });
    putRight();
    return () => {
      observer.disconnect();
    };
  }, [frame]);
}
