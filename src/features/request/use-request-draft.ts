import { useEffect, useRef, useState } from 'react';
import { forgetKept, keep, readKept, type Kept } from './kept-draft.ts';
import type { RequestDraft } from './request-draft.view.ts';

/**
 * The form as typed. It survives a reload, a wrong link and an ended session until it is saved, and it
 * remembers on which version of the request it was begun: a newer one never replaces what was typed.
 */
export function useRequestDraft(storageKey: string, saved: Kept) {
  const [kept] = useState(() => readKept(storageKey));
  const [form, setForm] = useState<Kept>(() => kept ?? saved);
  const [isTouched, setIsTouched] = useState(kept !== null);
  const [wasRestored, setWasRestored] = useState(kept !== null);
  // Leaving follows right on saving, before the page is drawn again.
  const isDone = useRef(false);
  // Nothing typed yet: whatever was saved meanwhile is simply shown.
  const shown = isTouched ? form : saved;
  useEffect(() => {
    if (isTouched && !isDone.current) {
      keep(storageKey, form);
    }
  }, [form, isTouched, storageKey]);
  return {
    draft: shown.draft,
    version: shown.version,
    isTouched,
    wasRestored,
    /** Somebody saved another version while this was being typed. */
    isBehind: shown.version !== saved.version,
    mayLeave: () => !isTouched || isDone.current,
    set: (change: Partial<RequestDraft>) => {
      setIsTouched(true);
      setForm((current) => {
        const { version, draft } = isTouched ? current : saved;
        return { version, draft: { ...draft, ...change } };
      });
    },
    /** It is saved: nothing is kept, and leaving asks nothing. */
    finish: () => {
      isDone.current = true;
      forgetKept(storageKey);
    },
    startAfresh: () => {
      forgetKept(storageKey);
      setIsTouched(false);
      setWasRestored(false);
      setForm(saved);
    },
    /** Holds on to what was typed and puts it over what somebody else saved. */
    keepMine: () => {
      setForm((current) => ({ ...current, version: saved.version }));
    },
  };
}
export type DraftState = ReturnType<typeof useRequestDraft>;
