import type { Action } from './actions.ts';
import { permissions } from './permissions.ts';
import type { Reach } from './permissions.ts';
import { rolesAt } from './roles-at.ts';
import type { Actor, Subject } from './types.ts';

/**
 * Decides whether a person may do something at a site. Screens hide buttons with it, the server decides
 * with it; both read the same table (`permissions.ts`).
 *
 * Without a subject the question is "at all": an engineer may cancel *some* booking, namely their own.
 * With a subject it is about this one; a part of the subject that is left out is not held against them,
 * so a service names every part its rule depends on.
 *
 * @example
 * const engineer = { personId: 7, grants: [{ role: 'engineer', siteCode: 'larkfen' }], projectIds: [] };
 * may(engineer, 'booking.cancel', 'larkfen', { ownerId: 7 }); // true
 * may(engineer, 'booking.cancel', 'larkfen', { ownerId: 8 }); // false
 */
export function may(actor: Actor, action: Action, siteCode: string, subject?: Subject): boolean {
  const permission = permissions[action];
  if (permission.secondPerson === true && subject?.authorId === actor.personId) {
    return false;
  }
  return rolesAt(actor, siteCode).some((role) => reaches(permission.reach[role], actor, subject));
}

function reaches(reach: Reach | undefined, actor: Actor, subject: Subject | undefined): boolean {
  const isOwn = subject?.ownerId === undefined || subject.ownerId === actor.personId;
  switch (reach) {
    case undefined:
      return false;
    case 'any':
      return true;
    case 'own':
      return isOwn;
    case 'own-project':
      return subject?.projectId === undefined || actor.projectIds.includes(subject.projectId);
    case 'own-by-policy':
      return isOwn && subject?.engineersMayConfirm !== false;
  }
}
