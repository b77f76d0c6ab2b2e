import 'express-session';
import type { SignInAttempt } from '#server/integrations/identity.ts';

declare module 'express-session' {
  interface SessionData {
    personId: number;
    csrfToken: string;
    /** Shown to the provider at sign-out. */
    idToken?: string;
    /** Between leaving for the provider and coming back. */
    attempt?: SignInAttempt & { readonly returnTo: string };
  }
}
