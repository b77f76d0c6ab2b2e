import { useEffect, useState } from 'react';
import { emptyDraft, requestDraftSchema, type RequestDraft } from './request-draft.view.ts';

function readKept(key: string): RequestDraft | null {
  const kept = sessionStorage.getItem(key);
  if (kept === null) {
    return null;
  }
  try {
    const parsed = requestDraftSchema.safeParse(JSON.parse(kept));
    return parsed.success ? parsed.data : null;
  } catch (error) {
    if (error instanceof SyntaxError) {
      return null;
    }
    throw error;
  }
}

/** What is typed survives a reload, a wrong link and an ended session, until it is saved. */
export function useRequestDraft(storageKey: string, initial: RequestDraft | null) {
  const [kept] = useState(() => readKept(storageKey));
  const [draft, setDraft] = useState<RequestDraft>(() => kept ?? initial ?? emptyDraft());
  const [isTouched, setIsTouched] = useState(kept !== null);
  useEffect(() => {
    if (isTouched) {
      sessionStorage.setItem(storageKey, JSON.stringify(draft));
    }
  }, [draft, isTouched, storageKey]);
  return {
    draft,
    isTouched,
    wasRestored: kept !== null,
    set: (change: Partial<RequestDraft>) => {
      setIsTouched(true);
      setDraft((current) => ({ ...current, ...change }));
    },
    forget: () => {
      sessionStorage.removeItem(storageKey);
      setIsTouched(false);
    },
    startAfresh: () => {
      sessionStorage.removeItem(storageKey);
      setIsTouched(false);
      setDraft(initial ?? emptyDraft());
    },
  };
}
export type DraftState = ReturnType<typeof useRequestDraft>;
