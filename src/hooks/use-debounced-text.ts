import { useEffect, useState } from 'react';

/** The text as it stood once it had been left alone for `delayMs`. */
export function useDebouncedText(text: string, delayMs = 400): string {
  const [settled, setSettled] = useState('');
  useEffect(() => {
    const timer = window.setTimeout(() => {
      setSettled(text);
    }, delayMs);
    return () => {
      window.clearTimeout(timer);
    };
  }, [text, delayMs]);
  return settled;
}
