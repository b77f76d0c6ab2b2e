import { useEffect, useState } from 'react';

/** The present moment, renewed every `everyMs`: for clocks, ages and the board's upright. */
export function useNow(everyMs = 20_000): number {
  const [nowMs, setNowMs] = useState(() => Date.now());
  useEffect(() => {
    const timer = window.setInterval(() => {
      setNowMs(Date.now());
    }, everyMs);
    return () => {
      window.clearInterval(timer);
    };
  }, [everyMs]);
  return nowMs;
}
