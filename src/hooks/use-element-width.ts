import { useEffect, useRef, useState, type RefObject } from 'react';

/** The width an element really has, so that a drawing is laid out anew instead of shrunk. */
export function useElementWidth<Element extends HTMLElement>(
  initial: number,
): readonly [RefObject<Element | null>, number] {
  const ref = useRef<Element>(null);
  const [width, setWidth] = useState(initial);
  useEffect(() => {
    const element = ref.current;
    if (element === null) {
      return undefined;
    }
    const observer = new ResizeObserver((entries) => {
      const measured = entries[0]?.contentRect.width ?? 0;
      if (measured > 0) {
        setWidth(Math.floor(measured));
      }
    });
    observer.observe(element);
    return () => {
      observer.disconnect();
    };
  }, []);
  return [ref, width] as const;
}
