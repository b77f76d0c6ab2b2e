import { createContext, useContext } from 'react';
import type { Action, Role } from '#shared/domain/policies/actions.ts';
import { may } from '#shared/domain/policies/may.ts';
import type { Actor, Subject } from '#shared/domain/policies/types.ts';

export type SiteContextValue = {
  readonly code: string;
  readonly name: string;
  readonly zone: string;
  readonly roles: readonly Role[];
  readonly actor: Actor;
  readonly personName: string;
};

export const SiteContext = createContext<SiteContextValue | null>(null);

/** The site the page is about and the person at it. Only below a site's address. */
export function useSite() {
  const site = useContext(SiteContext);
  if (site === null) {
    throw new Error('useSite is used outside a page of a site.');
  }
  return site;
}

/** `may` for the person and site of the page: hides what the server would refuse. */
export function useMay(): (action: Action, subject?: Subject) => boolean {
  const { actor, code } = useSite();
  return (action, subject) => may(actor, action, code, subject);
}
