import type { Role } from './actions.ts';
import { rolesAt } from './roles-at.ts';
import type { Actor } from './types.ts';

const rolesThatSeeEveryProject: readonly Role[] = [
  'scheduler',
  'metrologist',
  'manager',
  'safety',
  'auditor',
];

/**
 * Decides whether a person sees a project's name and cells at a site: members do, and roles whose work
 * needs it. Everybody else sees only that a place is taken. (An administrator sees names and members
 * where people and projects are managed, not the cells.)
 *
 * @example
 * seesProject({ personId: 1, grants: [{ role: 'engineer', siteCode: 'larkfen' }], projectIds: [3] }, 'larkfen', 4); // false
 */
export function seesProject(actor: Actor, siteCode: string, projectId: number): boolean {
  return (
    actor.projectIds.includes(projectId) ||
    rolesAt(actor, siteCode).some((role) => rolesThatSeeEveryProject.includes(role))
  );
}
