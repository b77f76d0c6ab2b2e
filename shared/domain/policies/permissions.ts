import type { Action, Role } from './actions.ts';

/**
 * How far a role's permission reaches: everything at the site, own requests and bookings only, cells of
 * own projects only, or own ones where the site's policy says so.
 */
export type Reach = 'any' | 'own' | 'own-project' | 'own-by-policy';

type Permission = {
  readonly reach: Readonly<Partial<Record<Role, Reach>>>;
  /** The author of the record never decides about it, whatever roles they hold. */
  readonly secondPerson?: true;
};

/** Who may do what at a site. A role that is not named may not. */
export const permissions: Readonly<Record<Action, Permission>> = {
  'request.create': { reach: { engineer: 'any', scheduler: 'any' } },
  'request.edit': { reach: { engineer: 'own', scheduler: 'own' } },
  'request.withdraw': { reach: { engineer: 'own', scheduler: 'own' } },
  'request.propose': { reach: { engineer: 'own', scheduler: 'own' } },
  'request.decline': { reach: { scheduler: 'any' } },
  'request.prioritise': { reach: { scheduler: 'any' } },
  'booking.confirm': { reach: { engineer: 'own-by-policy', scheduler: 'any' } },
  'booking.move': { reach: { scheduler: 'any' } },
  'booking.cancel': { reach: { engineer: 'own', scheduler: 'any' } },
  'load.close': { reach: { scheduler: 'any' } },
  'cell.register': { reach: { engineer: 'own-project', scheduler: 'any', metrologist: 'any' } },
  'equipment.edit': { reach: { metrologist: 'any', admin: 'any' } },
  'cell-type.draft': { reach: { engineer: 'any', metrologist: 'any' } },
  'outage.plan': { reach: { scheduler: 'any', metrologist: 'any' } },
  'breakdown.report': {
    reach: { engineer: 'any', scheduler: 'any', metrologist: 'any', safety: 'any' },
  },
  'equipment.take-out-of-service': {
    reach: { scheduler: 'any', metrologist: 'any', manager: 'any', safety: 'any' },
  },
  'calibration.record': { reach: { metrologist: 'any' } },
  'calibration.approve': { reach: { metrologist: 'any', manager: 'any' }, secondPerson: true },
  'stability.assess': { reach: { metrologist: 'any' } },
  'equipment.release': { reach: { metrologist: 'any' } },
  'deviation.grant': { reach: { metrologist: 'any', manager: 'any' }, secondPerson: true },
  'cell-type.release': { reach: { safety: 'any' } },
  'policy.edit': { reach: { manager: 'any', admin: 'any' } },
  'people.manage': { reach: { admin: 'any' } },
  'audit.read': { reach: { auditor: 'any', admin: 'any' } },
};
