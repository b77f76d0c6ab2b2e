import { useCallback } from 'react';
import { useSearchParams } from 'react-router-dom';

type SetUrlState<Value> = (value: Value) => void;

/** One value of the query string. The fallback leaves the URL, so that links stay short. */
export function useUrlState(key: string, fallback = ''): readonly [string, SetUrlState<string>] {
  const [params, setParams] = useSearchParams();
  const set = useCallback(
    (value: string) => {
      setParams(
        (current) => {
          const next = new URLSearchParams(current);
          if (value === fallback) {
            next.delete(key);
          } else {
            next.set(key, value);
          }
          return next;
        },
        { replace: true },
      );
    },
    [fallback, key, setParams],
  );
  return [params.get(key) ?? fallback, set] as const;
}

/** As {@link useUrlState}, held to a fixed list: a foreign value in the URL counts as the fallback. */
export function useUrlChoice<Value extends string>(
  key: string,
  options: readonly Value[],
  fallback: Value,
): readonly [Value, SetUrlState<Value>] {
  const [text, set] = useUrlState(key, fallback);
  return [options.find((option) => option === text) ?? fallback, set] as const;
}

/** Removes the named values from the query string at once. */
export function useClearUrlState(keys: readonly string[]): () => void {
  const [, setParams] = useSearchParams();
  return () => {
    setParams(
      (current) => new URLSearchParams([...current].filter(([key]) => !keys.includes(key))),
      { replace: true },
    );
  };
}
