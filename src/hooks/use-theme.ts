import { useEffect, useSyncExternalStore } from 'react';

export const themeChoices = ['system', 'light', 'dark'] as const;
export type ThemeChoice = (typeof themeChoices)[number];

/** `public/theme.js` reads the same key before the first paint. */
const storageKey = 'millpond.theme';
const darkQuery = '(prefers-color-scheme: dark)';

function readChoice(): ThemeChoice {
  try {
    const stored = window.localStorage.getItem(storageKey);
    return themeChoices.find((choice) => choice === stored) ?? 'system';
  } catch {
    // Storage is shut off in this browser: the choice lives as long as the page.
    return 'system';
  }
}

function keepChoice(choice: ThemeChoice): void {
  try {
    window.localStorage.setItem(storageKey, choice);
  } catch {
    // As above: nothing to keep it in.
  }
}

let current: ThemeChoice | undefined;
const listeners = new Set<() => void>();

function getChoice(): ThemeChoice {
  current ??= readChoice();
  return current;
}

function subscribe(listener: () => void): () => void {
  listeners.add(listener);
  return () => {
    listeners.delete(listener);
  };
}

function choose(choice: ThemeChoice): void {
  current = choice;
  keepChoice(choice);
  listeners.forEach((listener) => {
    listener();
  });
}

/** Follows the system unless the person chose; every switch on the page shows the same choice. */
export function useTheme(): readonly [ThemeChoice, (choice: ThemeChoice) => void] {
  const choice = useSyncExternalStore(subscribe, getChoice);
  useEffect(() => {
    const system = window.matchMedia(darkQuery);
    const apply = () => {
      const followed = system.matches ? 'dark' : 'light';
      document.documentElement.dataset['theme'] = choice === 'system' ? followed : choice;
    };
    apply();
    system.addEventListener('change', apply);
    return () => {
      system.removeEventListener('change', apply);
    };
  }, [choice]);
  return [choice, choose] as const;
}
