import { randomBytes } from 'node:crypto';
import express from 'express';
import type { Request, Router } from 'express';
import { z } from 'zod';
import type { Deps } from '#server/deps.ts';
import { admitPerson } from '#server/features/people/sign-in.service.ts';
import { problem } from '#server/problem.ts';
import { requireCsrfToken } from './authenticate.ts';
import { scopeOf } from './request-scope.ts';

const formSchema = z.object({ csrf: z.string().optional() }).optional();

/** The three addresses a browser visits to sign in and out; they answer with redirects. */
export function authPages(base: Deps): Router {
  const router = express.Router();

  router.get('/auth/sign-in', async (request, response) => {
    const deps = depsOf(base, request);
    const hint = deps.config.oidc.isStandIn ? textOf(request.query['as']) : null;
    const { url, attempt } = await deps.identity.startSignIn(hint);
    request.session.attempt = { ...attempt, returnTo: ownPath(textOf(request.query['return'])) };
    await saveSession(request);
    response.redirect(303, url);
  });

  router.get('/auth/callback', async (request, response) => {
    const deps = depsOf(base, request);
    const { attempt } = request.session;
    if (attempt === undefined) {
      throw problem('session.missing', {
        detail: 'This sign-in was started in another browser or too long ago. Start again.',
      });
    }
    delete request.session.attempt;
    const callbackUrl = new URL(request.originalUrl, deps.config.publicUrl);
    const identity = await deps.identity.finishSignIn(callbackUrl, attempt);
    const personId = await admitPerson(deps, identity);
    await renewSession(request);
    request.session.personId = personId;
    request.session.csrfToken = randomBytes(24).toString('base64url');
    request.session.idToken = identity.idToken;
    await saveSession(request);
    response.redirect(303, attempt.returnTo);
  });

  router.post(
    '/auth/sign-out',
    express.urlencoded({ extended: false, limit: '4kb' }),
    async (request, response) => {
      const deps = depsOf(base, request);
      if (request.session.personId !== undefined) {
        const form = formSchema.safeParse(request.body);
        requireCsrfToken(request, request.get('X-Millpond-Csrf') ?? form.data?.csrf);
      }
      const idToken = request.session.idToken ?? null;
      await destroySession(request);
      response.clearCookie('millpond_session', { path: '/' });
      const elsewhere = await endAtProvider(deps, idToken);
      response.redirect(303, elsewhere ?? '/');
    },
  );

  return router;
}

/** Our session is gone already; a provider that does not answer must not turn that into a failure. */
async function endAtProvider(deps: Deps, idToken: string | null): Promise<string | null> {
  try {
    return await deps.identity.endSessionUrl(idToken);
  } catch (error) {
    deps.log.warn({ requestId: deps.requestId, err: error }, 'provider not told of sign-out');
    return null;
  }
}

function depsOf(base: Deps, request: Request): Deps {
  return { ...base, requestId: scopeOf(request).requestId };
}

function textOf(value: unknown): string | null {
  return typeof value === 'string' && value !== '' ? value : null;
}

/** Only a path on this site: `//elsewhere` and `/\elsewhere` would leave it. */
function ownPath(wanted: string | null): string {
  if (wanted === null || !/^\/(?![/\\])/.test(wanted)) {
    return '/';
  }
  const url = new URL(wanted, 'http://own.invalid');
  return url.host === 'own.invalid' ? `${url.pathname}${url.search}${url.hash}` : '/';
}

function saveSession(request: Request): Promise<void> {
  return promise((done) => request.session.save(done));
}
/** A new number for the session, so that one planted before the sign-in is worth nothing. */
function renewSession(request: Request): Promise<void> {
  return promise((done) => request.session.regenerate(done));
}
function destroySession(request: Request): Promise<void> {
  return promise((done) => request.session.destroy(done));
}

function promise(start: (done: (error: unknown) => void) => unknown): Promise<void> {
  return new Promise((resolve, reject) => {
    start((error) => {
      if (error === undefined || error === null) {
        resolve();
      } else {
        reject(error instanceof Error ? error : new Error('The session store failed.'));
      }
    });
  });
}
