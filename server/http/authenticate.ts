import { timingSafeEqual } from 'node:crypto';
import type { Request } from 'express';
import type { SignedIn } from '#server/actor.ts';
import type { Deps } from '#server/deps.ts';
import { findSignedIn } from '#server/features/people/people.service.ts';
import { problem } from '#server/problem.ts';
import { scopeOf } from './request-scope.ts';

const changing = new Set(['POST', 'PUT', 'PATCH', 'DELETE']);

/** Who calls. Roles are read from the database at each call, so that a revocation acts at once. */
export async function authenticate(deps: Deps, request: Request): Promise<SignedIn | null> {
  const { personId } = request.session;
  if (personId === undefined) {
    return null;
  }
  const actor = await findSignedIn(deps, personId);
  if (actor !== null) {
    scopeOf(request).actorId = actor.personId;
  }
  return actor;
}

/** A change must carry the token that `GET /api/session` told this session. */
export function requireCsrfToken(request: Request, given: string | undefined): void {
  if (changing.has(request.method) && !isSame(given, request.session.csrfToken)) {
    throw problem('session.csrf', {
      detail: 'The page was opened under an earlier sign-in. Reload it, then do this again.',
    });
  }
}

function isSame(given: string | undefined, expected: string | undefined): boolean {
  if (given === undefined || expected === undefined) {
    return false;
  }
  const [left, right] = [Buffer.from(given), Buffer.from(expected)];
  return left.length === right.length && timingSafeEqual(left, right);
}
