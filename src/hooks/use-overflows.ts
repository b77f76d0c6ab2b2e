import { useEffect, useRef, useState, type RefObject } from 'react';

/** Whether the content is wider than its frame: only then must the frame take the focus. */
export function useOverflows(): readonly [RefObject<HTMLDivElement | null>, boolean] {
  const ref = useRef<HTMLDivElement>(null);
  const [overflows, setOverflows] = useState(false);
  useEffect(() => {
    const element = ref.current;
    if (element === null) {
      return undefined;
    }
    const observer = new ResizeObserver(() => {
      setOverflows(element.scrollWidth > element.clientWidth + 1);
    });
    observer.observe(element);
    if (element.firstElementChild !== null) {
      observer.observe(element.firstElementChild);
    }
    return () => {
      observer.disconnect();
    };
  }, []);
  return [ref, overflows] as const;
}
